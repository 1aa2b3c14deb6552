import { useState } from 'react';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { reasonRequest } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { useErrorTitle } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Textarea } from '../../../components/ui/inputs.tsx';
import { useLotAct } from '../hooks/use-lot-act.ts';

type WithdrawFormProps = { lot: LotAnswer; onClose: () => void };

/** Takes a lot off for good; the reason stands in its history. */
export function WithdrawForm({ lot, onClose }: WithdrawFormProps) {
  const [reason, setReason] = useState('');
  const [tries, setTries] = useState(0);
  const withdrawal = useLotAct(lot.code, onClose);
  const parsed = reasonRequest.safeParse({ reason });
  const fault = parsed.success ? undefined : parsed.error.issues[0]?.message;
  const error = (tries > 0 ? fault : undefined) ?? withdrawal.error?.message;
  useErrorTitle(error !== undefined);
  return (
    <form
      noValidate
      aria-label="Withdraw the lot"
      className="max-w-xl rounded-box border-2 border-litharge bg-sheet p-5"
      onSubmit={(event) => {
        event.preventDefault();
        setTries(tries + 1);
        if (parsed.success) withdrawal.mutate({ act: 'withdraw', reason: parsed.data.reason });
        else document.getElementById('withdraw-reason')?.focus();
      }}
    >
      <h3>Withdraw “{lot.title}” for good?</h3>
      <p className="mb-4 mt-1 text-ink-2">
        It leaves the register and cannot be reopened; a copy can be drafted, and its certificate is free for
        it. To take it off for a while, pause it instead.
      </p>
      <Field id="withdraw-reason" label="Reason" hint="Stands in the lot’s history." error={error}>
        {(ties) => (
          <Textarea
            {...ties}
            autoFocus
            rows={2}
            maxLength={1000}
            value={reason}
            onChange={(event) => setReason(event.target.value)}
          />
        )}
      </Field>
      <div className="mt-4 flex flex-wrap gap-3">
        <Button type="submit" look="danger" busy={withdrawal.isPending}>
          Withdraw the lot for good
        </Button>
        <Button look="quiet" onClick={onClose}>
          Leave it where it is
        </Button>
      </div>
    </form>
  );
}
