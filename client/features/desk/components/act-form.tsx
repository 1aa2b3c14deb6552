import type { ReactNode } from 'react';
import { Button, type ButtonLook } from '../../../components/ui/button.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { ErrorSummary, type SummaryItem } from '../../../components/ui/error-summary.tsx';

type ActFormProps = {
  label: string;
  form: {
    items: SummaryItem[];
    attempt: number;
    isConfirming: boolean;
    isBusy: boolean;
    ask: () => void;
    confirm: () => unknown;
    cancel: () => void;
  };
  submitText: ReactNode;
  look?: ButtonLook;
  question: ReactNode;
  counterparty: ReactNode;
  consequence: ReactNode;
  confirmText: ReactNode;
  children: ReactNode;
};

/** The fields of an act, and in their place, once they are right, the act restated. */
export function ActForm({ label, form, submitText, look = 'main', children, ...confirm }: ActFormProps) {
  return (
    <form
      noValidate
      aria-label={label}
      onSubmit={(event) => {
        event.preventDefault();
        form.ask();
      }}
    >
      <ErrorSummary items={form.items} attempt={form.attempt} />
      <div hidden={form.isConfirming} className="flex flex-col gap-5">
        {children}
        <div>
          <Button type="submit" look={look}>
            {submitText}
          </Button>
        </div>
      </div>
      {form.isConfirming && (
        <ConfirmPanel
          title={confirm.question}
          sum={null}
          counterparty={confirm.counterparty}
          consequence={confirm.consequence}
          confirmText={confirm.confirmText}
          onConfirm={form.confirm}
          onCancel={form.cancel}
          busy={form.isBusy}
          danger={look === 'danger'}
        />
      )}
    </form>
  );
}
