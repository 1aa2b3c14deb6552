import { useQueryClient } from '@tanstack/react-query';
import { reasonRequest } from '#shared/schemas/lots.ts';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { sendPullLot } from '../api/certificates.ts';
import { ReasonForm } from './reason-form.tsx';

type PullLotFormProps = { code: string; sellerName: string };

/** Takes a lot out of the market; a route may also put it on the page of the lot. */
export function PullLotForm({ code, sellerName }: PullLotFormProps) {
  const client = useQueryClient();
  return (
    <ReasonForm
      label="Pull the lot"
      fieldLabel="Reason for pulling it"
      hint="The seller reads it in the lot’s history and in a mail."
      schema={reasonRequest}
      send={(input) => sendPullLot(code, input)}
      onDone={() => {
        confirmDone(`Lot ${code} is withdrawn.`);
        return client.invalidateQueries();
      }}
      look="danger"
      submitText="Pull the lot"
      question="Take this lot out of the market?"
      counterparty={`${sellerName}, lot ${code}`}
      consequence="The lot is withdrawn for good; the seller can draft a copy. Not possible while a deal runs over it."
      confirmText={`Pull lot ${code}`}
    />
  );
}
