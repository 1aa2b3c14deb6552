import { cx } from '../../lib/cx.ts';
import { formatAmount, formatMoney, formatMoneyRange } from '../../lib/format.ts';

type MoneyProps = {
  value: string;
  /** In a column whose head names the currency. */ bare?: boolean;
  className?: string;
};

/** A sum, exact to the cent. */
export function Money({ value, bare = false, className }: MoneyProps) {
  return <span className={cx('fig', className)}>{bare ? formatAmount(value) : formatMoney(value)}</span>;
}

/** A range of sums, in three figures. */
export function MoneyRange({ low, high, className }: { low: string; high: string; className?: string }) {
  return <span className={cx('fig', className)}>{formatMoneyRange(low, high)}</span>;
}
