import type { MassEntry, MassUnit } from '#shared/mass.ts';
import { compareReceivedMass } from '#shared/received-mass.ts';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { MassDifference } from '../../../components/figures/mass-difference.tsx';
import { scalesWord } from '../../../components/figures/deal-words.ts';

type Quantity = DealAnswer['lot']['gross'];
const entryOf = ({ value, unit }: Quantity): MassEntry => ({ value, unit: unit as MassUnit });

type ScalesAgreeProps = { lot: DealAnswer['lot']; typed: MassEntry | null };

/** Says while typing whether the two weighings may be of one piece, by the rule that the server uses. */
export function ScalesAgree({ lot, typed }: ScalesAgreeProps) {
  const comparison =
    typed &&
    compareReceivedMass(
      { gross: entryOf(lot.gross), readability: lot.readability && entryOf(lot.readability) },
      typed,
    );
  return (
    <p role="status" className="max-w-prose">
      {comparison && (
        <span className={comparison.isWithinScales ? 'text-verdigris' : 'text-litharge'}>
          Difference: <MassDifference grams={comparison.differenceGrams} />.{' '}
          {scalesWord(comparison.isWithinScales)}
        </span>
      )}
    </p>
  );
}
