import { useEffect, useRef, type ReactNode } from 'react';
import { Button } from './button.tsx';

type ConfirmPanelProps = {
  /** The act as a question: "Pay into escrow?" */
  title: ReactNode;
  /** The sum that moves and who gets it, as they will stand in the books; null when no money moves. */
  sum: ReactNode | null;
  counterparty: ReactNode;
  consequence?: ReactNode;
  /** Says the act and who gets what: "Accept: US$ 4,059.95 to the seller". */
  confirmText: ReactNode;
  onConfirm: () => void;
  onCancel: () => void;
  busy?: boolean;
  danger?: boolean;
  problem?: ReactNode;
};

/** Stands in the page where the act was chosen, restates it, and asks once. */
export function ConfirmPanel(props: ConfirmPanelProps) {
  const {
    title,
    sum,
    counterparty,
    consequence,
    confirmText,
    onConfirm,
    onCancel,
    busy = false,
    danger = false,
    problem,
  } = props;
  const panel = useRef<HTMLElement>(null);
  useEffect(() => panel.current?.focus(), []);
  return (
    <section
      ref={panel}
      tabIndex={-1}
      aria-label="Confirm"
      onKeyDown={(event) => event.key === 'Escape' && !busy && onCancel()}
      className={`rounded-box border-2 bg-sheet p-5 ${danger ? 'border-litharge' : 'border-verdigris'}`}
    >
      <h3>{title}</h3>
      <dl className="mt-3 grid grid-cols-[auto_minmax(0,1fr)] gap-x-5 gap-y-1.5">
        {sum !== null && (
          <>
            <dt className="text-ink-2">Sum</dt>
            <dd className="font-semibold">{sum}</dd>
          </>
        )}
        <dt className="text-ink-2">With</dt>
        <dd>{counterparty}</dd>
      </dl>
      {consequence && <div className="mt-3 max-w-prose text-ink-2">{consequence}</div>}
      {problem && (
        <div role="alert" className="mt-3 font-medium text-litharge">
          {problem}
        </div>
      )}
      <div className="mt-4 flex flex-wrap gap-3">
        <Button look={danger ? 'danger' : 'main'} busy={busy} onClick={onConfirm}>
          {confirmText}
        </Button>
        <Button look="quiet" disabled={busy} onClick={onCancel}>
          Not now
        </Button>
      </div>
    </section>
  );
}
