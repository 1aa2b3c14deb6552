import { INSPECT_DAYS } from './limits.ts';

/**
 * The version of the texts below; lots and deals keep the one that was confirmed. A test holds the texts against it, so that
 * no wording changes without a new version.
 */
export const RULES_VERSION = '2026-12.2';

/** What a buyer confirms with a purchase, word for word. */
export const BUYER_CONFIRMATIONS = {
  age: 'I am 18 or older.',
  rules: 'I buy at the stated assay, and I will weigh and check what arrives before I accept it.',
  rulesHint: `A difference in mass or metal is reported before accepting; then the money stays in escrow and the assay desk looks at it. You have ${INSPECT_DAYS} days from the delivery to look; nothing is accepted by silence. Licences and tax are yours: check your local rules; this is not legal advice.`,
} as const;

/** What a seller confirms with a submission, word for word. */
export const SELLER_CONFIRMATIONS = {
  cautions: 'I have read the cautions, and the lot is clean, dry and free of what may not be posted.',
  title: 'The metal is mine to sell, and nobody else has a claim on it.',
} as const;

/** The cautions that the seller confirms to have read: those of every lot, and those of some forms and metals. */
export const CAUTIONS = {
  everyLot: [
    'Acids and their fumes burn skin, eyes and lungs. Nothing that still holds acid may be posted; most carriers also refuse wet, oily or dusty goods.',
    'A density alone proves no gold: tungsten has the same.',
    'Send it insured for the full price, by a carrier that takes precious metal. Many do not, or only up to a sum.',
    'Dealing in or refining precious metal may need a licence where you live. Hallmarking, second-hand-goods and money-laundering rules may apply, and tax: Scruple computes none.',
  ],
  byForm: {
    button: [
      'A button can hold residual acid or chloride in pores and under slag. Melt, boil out, rinse and dry it before you weigh it.',
    ],
    bar: [
      'A bar with a mark that imitates a refiner’s is a matter for the police, whatever its fineness. Say who cast it.',
    ],
    grain: [
      'Grain and powder hold water, acid and chloride between their pieces. Rinse until neutral and dry to constant mass.',
    ],
  } as Readonly<Record<string, readonly string[]>>,
  silver:
    'Silver that met ammonia or azides can form compounds that explode when dry. Never post silver residue that was not melted.',
  toxic:
    'Cadmium, lead, mercury, arsenic and beryllium are poisonous as fume and dust. Say in the description that they are there.',
  localRules: 'Check your local rules; this is not legal advice.',
} as const;
