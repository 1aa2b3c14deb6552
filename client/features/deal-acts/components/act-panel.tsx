import { useEffect, useRef, type ReactNode } from 'react';
import { Button, type ButtonLook } from '../../../components/ui/button.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { ErrorSummary, type SummaryItem } from '../../../components/ui/error-summary.tsx';

type ActPanelProps = {
  title: string;
  form: {
    items: SummaryItem[];
    attempt: number;
    isBusy: boolean;
    isAsking: boolean;
    submit: () => void;
    ask: () => void;
    confirm: () => unknown;
    cancel: () => void;
  };
  submitText: string;
  busyText: string;
  look?: ButtonLook;
  onClose: () => void;
  /** An act that is restated before it happens; without one it is sent at once. */
  confirm?: {
    title: string;
    sum: ReactNode | null;
    counterparty: ReactNode;
    consequence: ReactNode;
    confirmText: string;
    danger?: boolean;
  };
  children: ReactNode;
};

/** The fields of one act; in their place, where the act has to be restated, the act in words. */
export function ActPanel(props: ActPanelProps) {
  const { title, form, submitText, busyText, look = 'main', onClose, confirm, children } = props;
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus(), []);
  return (
    <form
      noValidate
      aria-label={title}
      className="sheet mt-5 p-5"
      onSubmit={(event) => {
        event.preventDefault();
        if (form.isBusy) return;
        if (confirm) form.ask();
        else form.submit();
      }}
    >
      <h2 ref={heading} tabIndex={-1} className="mb-4 text-lead">
        {title}
      </h2>
      <ErrorSummary items={form.items} attempt={form.attempt} />
      <div hidden={form.isAsking} className="flex flex-col gap-5">
        {children}
        <div className="flex flex-wrap gap-3">
          <Button type="submit" look={look} busy={form.isBusy} busyText={busyText}>
            {submitText}
          </Button>
          <Button look="quiet" disabled={form.isBusy} onClick={onClose}>
            Not now
          </Button>
        </div>
      </div>
      {form.isAsking && confirm && (
        <ConfirmPanel {...confirm} onConfirm={form.confirm} onCancel={form.cancel} busy={form.isBusy} />
      )}
    </form>
  );
}
