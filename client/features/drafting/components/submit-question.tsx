import { percentText, readPricing } from '#shared/lot-pricing.ts';
import { minorToAmount } from '#shared/money.ts';
import type { LotDraft } from '#shared/schemas/lots.ts';
import { Money } from '../../../components/figures/money.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { formatPercent } from '../../../lib/format.ts';

type SubmitQuestionProps = {
  draft: LotDraft;
  submission: { confirm: () => void; cancel: () => void; isBusy: boolean };
};

function AskedSum({ draft }: { draft: LotDraft }) {
  const { priceMinor, linkedPercent } = readPricing(draft);
  if (priceMinor === null) return <>{formatPercent(percentText(linkedPercent))} of melt</>;
  return <Money value={minorToAmount(priceMinor)} />;
}

/** Restates what is handed in; asked only once the whole draft has passed the check. */
export function SubmitQuestion({ draft, submission }: SubmitQuestionProps) {
  return (
    <ConfirmPanel
      title={`Hand “${draft.title.trim()}” to the assay desk?`}
      sum={<AskedSum draft={draft} />}
      counterparty="the assay desk, which compares the certificate with what you entered"
      consequence="Mass, assay and certificate are fixed from here on. Once the desk has verified them, the lot opens at this price."
      confirmText="Hand it to the desk"
      busy={submission.isBusy}
      onConfirm={submission.confirm}
      onCancel={submission.cancel}
    />
  );
}
