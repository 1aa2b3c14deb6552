import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { cx } from '../../../lib/cx.ts';

type Row = CaseAnswer['comparison'][number];

const VERDICTS = {
  differs: { word: 'differs', sign: 'M1 4.2h10M1 7.8h10M3 11 9 1', look: 'font-semibold text-litharge' },
  agrees: { word: 'agrees', sign: 'M1 4.2h10M1 7.8h10', look: 'text-ink-2' },
  look: { word: 'look yourself', sign: 'M1 6q5-6 10 0-5 6-10 0M6 5.9v.2', look: 'font-semibold text-ink' },
};

/** The sign is drawn and the word is written: neither rests on colour. */
function Verdict({ row }: { row: Row }) {
  const { word, sign, look } = VERDICTS[row.differs ? 'differs' : row.isByEye ? 'look' : 'agrees'];
  return (
    <span className={cx('inline-flex items-center gap-1.5 text-note', look)}>
      <svg
        viewBox="0 0 12 12"
        className="size-3"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.6"
        aria-hidden="true"
      >
        <path d={sign} />
      </svg>
      {word}
    </span>
  );
}

function ComparedRow({ row }: { row: Row }) {
  const mark = row.differs ? 'border-l-4 border-litharge pl-2' : 'pl-3';
  return (
    <tbody className="border-b border-rule">
      <tr>
        <th scope="row" className={cx('py-2 pr-3 text-left align-top font-medium', mark)}>
          {row.label}
        </th>
        <td className="px-1 py-2 align-top">{row.onReport}</td>
        <td className="py-2 pl-1 align-top">{row.onLot}</td>
      </tr>
      <tr>
        <td colSpan={3} className={cx('pb-2', mark)}>
          <Verdict row={row} />
          {row.note && <span className="text-note text-ink-2">: {row.note}</span>}
        </td>
      </tr>
    </tbody>
  );
}

/** The report's figures beside the lot's. */
export function ComparisonTable({ rows }: { rows: readonly Row[] }) {
  const differing = rows.filter((row) => row.differs).length;
  const byEye = rows.filter((row) => row.isByEye).length;
  return (
    <section aria-labelledby="comparison-heading">
      <h2 id="comparison-heading">Report and lot compared</h2>
      <p className="mb-3 text-ink-2">
        {differing === 0 ? 'No line differs.' : `${differing} of ${rows.length} lines differ.`}
        {byEye > 0 && ` ${byEye} can only be compared by eye.`}
      </p>
      <table className="w-full table-fixed border-collapse">
        <thead>
          <tr className="border-b border-line text-left text-note text-ink-2">
            <th scope="col" className="w-[34%] py-1 pl-3 pr-3 font-medium">
              What
            </th>
            <th scope="col" className="px-1 py-1 font-medium">
              On the report
            </th>
            <th scope="col" className="py-1 pl-1 font-medium">
              On the lot
            </th>
          </tr>
        </thead>
        {rows.map((row) => (
          <ComparedRow key={row.label} row={row} />
        ))}
      </table>
    </section>
  );
}
