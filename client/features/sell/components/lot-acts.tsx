import { useState } from 'react';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { useLotAct } from '../hooks/use-lot-act.ts';
import { LinkedPercentForm } from './linked-percent-form.tsx';
import { NewLotButton } from './new-lot-button.tsx';
import { PriceForm } from './price-form.tsx';
import { WithdrawForm } from './withdraw-form.tsx';

type LotActsProps = { lot: LotAnswer; onRedrafted: (lot: LotAnswer) => void };

/** What the seller may do with the lot as it stands; the abilities come with it. */
export function LotActs({ lot, onRedrafted }: LotActsProps) {
  const [open, setOpen] = useState<'price' | 'withdraw' | null>(null);
  const plain = useLotAct(lot.code, (after) => after.can.edit && onRedrafted(after));
  const { can } = lot;
  const ChangeForm = lot.linkedPercent === null ? PriceForm : LinkedPercentForm;
  const close = () => setOpen(null);
  const act = (name: 'redraft' | 'pause' | 'reopen') => () => plain.mutate({ act: name });
  const busy = plain.isPending;
  return (
    <div className="no-print mb-10">
      {open === 'price' && can.changePrice && <ChangeForm lot={lot} onClose={close} />}
      {open === 'withdraw' && can.withdraw && <WithdrawForm lot={lot} onClose={close} />}
      {open === null && (
        <div className="flex flex-wrap items-start gap-3">
          {can.redraft && (
            <Button busy={busy} onClick={act('redraft')}>
              Work on it again
            </Button>
          )}
          {can.reopen && (
            <Button busy={busy} onClick={act('reopen')}>
              Reopen it on the register
            </Button>
          )}
          {can.changePrice && <Button onClick={() => setOpen('price')}>Change the price</Button>}
          {can.pause && (
            <Button look="second" busy={busy} onClick={act('pause')}>
              Pause it
            </Button>
          )}
          {can.copy && <NewLotButton copyOf={lot.code} look="second" />}
          {can.withdraw && (
            <Button look="quiet" onClick={() => setOpen('withdraw')}>
              Withdraw it
            </Button>
          )}
        </div>
      )}
      {plain.isError && (
        <Notice tone="attention" role="alert" title="That was not done" className="mt-3">
          {plain.error.message}
        </Notice>
      )}
    </div>
  );
}
