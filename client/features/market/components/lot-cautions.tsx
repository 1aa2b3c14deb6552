import { Link } from 'react-router-dom';
import { isMetal } from '#shared/metals.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { paths } from '../../../lib/paths.ts';

const forButtons =
  'A button, foil or powder can hold residual acid or chloride: keep it away from skin and from steel balances, and rinse before you weigh or melt.';
const forGold =
  'Tungsten has the density of gold: mass and volume alone do not tell a filled bar from a sound one. The certificate and your own test do.';
const forSilver =
  'Some compounds that silver forms can become explosive. Do not scrape at dark crusts, and do not dry them.';

/** What a buyer has to know before the parcel arrives, as far as it touches this lot. */
export function cautionsFor(lot: Pick<LotAnswer, 'form' | 'contents'>): string[] {
  const metals = lot.contents.filter(({ isPaidFor }) => isPaidFor).map(({ element }) => element);
  const cautions: string[] = [];
  if (lot.form !== 'bar') cautions.push(forButtons);
  if (metals.includes('Au')) cautions.push(forGold);
  if (metals.includes('Ag')) cautions.push(forSilver);
  if (metals.some(isMetal))
    cautions.push(
      'Precious metal by post: carriers exclude or limit it, and an insured parcel has conditions of its own.',
      'Dealing in precious metal can need a licence, and hallmarking, money-laundering, second-hand-goods and tax law may apply to you. Scruple computes no tax.',
    );
  return cautions;
}

type LotCautionsProps = { lot: LotAnswer };

export function LotCautions({ lot }: LotCautionsProps) {
  return (
    <section aria-labelledby="lot-cautions">
      <h2 id="lot-cautions">Cautions</h2>
      <ul className="mt-3 flex max-w-prose list-disc flex-col gap-2 pl-5">
        {cautionsFor(lot).map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
      <p className="mt-3 max-w-prose text-ink-2">
        Check your local rules; this is not legal advice.{' '}
        <Link to={paths.cautions()} className="link">
          All cautions
        </Link>
      </p>
    </section>
  );
}
