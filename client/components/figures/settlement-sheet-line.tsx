import { useEffect, useState, type ReactNode } from 'react';
import type { SheetLine } from '#shared/settlement/sheet-types.ts';
import { cx } from '../../lib/cx.ts';
import { formatAmount, formatDecimal } from '../../lib/format.ts';
import { Money } from './money.tsx';
import { Quantity } from './quantity.tsx';

type SettlementSheetLineProps = { line: SheetLine; isOpen: boolean; remark: ReactNode };

function rowClass(kind: SheetLine['kind']): string {
  if (kind === 'total')
    return 'border-b-4 border-t border-double border-b-ink border-t-ink text-lead font-semibold [border-top-style:solid]';
  if (kind === 'sum') return 'border-t border-ink font-medium';
  if (kind === 'price') return 'border-t border-rule font-medium';
  return 'border-t border-rule';
}

/** One line of the statement. On a narrow sheet quantity and rate stand under the label instead of in columns. */
export function SettlementSheetLine({ line, isOpen, remark }: SettlementSheetLineProps) {
  return (
    <tr className={cx('align-baseline', rowClass(line.kind))}>
      <th scope="row" className="px-(--pad) py-2 text-left [font-weight:inherit]">
        <Working line={line} isOpen={isOpen}>
          {line.label} {remark}
          {(line.quantity || line.rate) && (
            <span className="block pl-4 text-note font-normal text-ink-2 @md:hidden">
              {line.quantity && <Quantity {...line.quantity} />}
              {line.quantity && line.rate && ' × '}
              {line.rate && <Rate rate={line.rate} hasUnit />}
            </span>
          )}
        </Working>
      </th>
      <td className="hidden py-2 pr-4 text-right @md:table-cell">
        {line.quantity && <Quantity {...line.quantity} />}
      </td>
      <td className="hidden py-2 pr-4 text-right @md:table-cell">{line.rate && <Rate rate={line.rate} />}</td>
      <td className="py-2 pr-(--pad) text-right">
        {line.amount !== null && <Money bare value={line.amount} />}
      </td>
    </tr>
  );
}

type RateProps = { rate: NonNullable<SheetLine['rate']>; hasUnit?: boolean };

function Rate({ rate, hasUnit = false }: RateProps) {
  const isPrice = rate.unit.startsWith('US$');
  if (isPrice && !hasUnit) return <span className="fig">{formatAmount(rate.value)}</span>;
  if (isPrice)
    return (
      <span className="fig whitespace-normal">{`US$ ${formatAmount(rate.value)} / ${rate.unit.replace('US$/', '')}`}</span>
    );
  return rate.unit === '' ? <span className="fig">{formatDecimal(rate.value)}</span> : <Quantity {...rate} />;
}

type WorkingProps = { line: SheetLine; isOpen: boolean; children: ReactNode };

/**
 * The working may spread over the whole sheet without widening the first column: its holder has no width of its own,
 * and the figures of the line stand above it.
 */
function Working({ line, isOpen, children }: WorkingProps) {
  const [open, setOpen] = useState(isOpen);
  useEffect(() => setOpen(isOpen), [isOpen]);
  if (line.working.length === 0) return <div className="pl-4">{children}</div>;
  return (
    <details open={open} onToggle={(event) => setOpen(event.currentTarget.open)} className="group">
      <summary
        title="Show the working"
        className="relative min-h-6 list-none pl-4 before:absolute before:left-0 before:font-mono before:text-ink-2 before:content-['+'] group-open:before:content-['–'] hover:underline hover:decoration-1 hover:underline-offset-4 [&::-webkit-details-marker]:hidden"
      >
        {children}
        <span className="sr-only">, show the working</span>
      </summary>
      <div className="w-0">
        <ul className="w-[calc(100cqi-2*var(--pad))] py-1 pl-4 font-mono text-note font-normal leading-relaxed text-ink-2">
          {line.working.map((step) => (
            <li key={step}>{step}</li>
          ))}
        </ul>
      </div>
    </details>
  );
}
