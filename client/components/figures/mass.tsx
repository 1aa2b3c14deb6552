import { MASS_UNIT_LABELS, type MassEntry } from '#shared/mass.ts';
import { cx } from '../../lib/cx.ts';
import { useReader } from '../../lib/reader-context.ts';
import { massIn, readingUnits } from './mass-conversion.ts';
import { Quantity } from './quantity.tsx';

type MassProps = {
  entry: MassEntry;
  /** Show the other units beside the reader's own. */ others?: boolean;
  className?: string;
};

/** A mass in the reader's unit, and beside it in the others. */
export function Mass({ entry, others = false, className }: MassProps) {
  const first = useReader().weightUnit;
  const rest = readingUnits(first).slice(1);
  return (
    <span className={cx('inline-flex flex-wrap items-baseline gap-x-3', className)}>
      <Quantity value={massIn(entry, first)} unit={MASS_UNIT_LABELS[first]} />
      {others &&
        rest.map((unit) => (
          <span key={unit} className="text-note text-ink-2">
            <Quantity value={massIn(entry, unit)} unit={MASS_UNIT_LABELS[unit]} />
          </span>
        ))}
    </span>
  );
}
