import { cx } from '../../lib/cx.ts';
import { formatDecimal, THIN } from '../../lib/format.ts';
import { Quantity } from './quantity.tsx';

type FinenessProps = {
  permille: string;
  /** Expanded uncertainty, k = 2, in ‰. */
  expanded?: string | null;
  isAssumed?: boolean;
  className?: string;
};

/** Parts per thousand, and under it how sure they are. */
export function Fineness({ permille, expanded, isAssumed = false, className }: FinenessProps) {
  return (
    <span className={cx('inline-block', className)}>
      <Quantity value={permille} unit="‰" />
      {expanded && (
        <span className="fig block text-note text-ink-2">
          ±{THIN}
          {formatDecimal(expanded)}
          {THIN}‰{isAssumed && ', assumed'}
        </span>
      )}
    </span>
  );
}
