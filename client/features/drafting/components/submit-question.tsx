import { typedDecimal } from '#shared/typed-number.ts';
import type { LotDraft } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';

type SubmitQuestionProps = {
  draft: LotDraft;
  submission: { confirm: () => void; cancel: () => void; isBusy: boolean };
};

/** Restates what is handed in; asked only once the whole draft has passed the check. */
export function SubmitQuestion({ draft, submission }: SubmitQuestionProps) {
  return (
    <ConfirmPanel
      title={`Hand “${draft.title.trim()}” to the assay desk?`}
      sum={<Money value={typedDecimal(draft.price, '/price', '')} />}
      counterparty="the assay desk, which compares the certificate with what you entered"
      consequence="Mass, assay and certificate are fixed from here on. Once the desk has verified them, the lot opens at this price."
      confirmText="Hand it to the desk"
      busy={submission.isBusy}
      onConfirm={submission.confirm}
      onCancel={submission.cancel}
    />
  );
}
