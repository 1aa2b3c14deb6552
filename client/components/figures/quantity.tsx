import { cx } from '../../lib/cx.ts';
import { formatDecimal, THIN } from '../../lib/format.ts';

type QuantityProps = { value: string; unit: string; className?: string };

/** A figure and, after a thin space and in the second ink, its unit. */
export function Quantity({ value, unit, className }: QuantityProps) {
  return (
    <span className={cx('fig', className)}>
      {formatDecimal(value)}
      {THIN}
      <span className="unit">{unit}</span>
    </span>
  );
}
