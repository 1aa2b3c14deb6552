import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { myLotsQuery, ownLotQuery } from '../../../lib/lots.ts';
import { actOnLot, type LotAct } from '../api/act-on-lot.ts';

const done: Record<LotAct['act'], string> = {
  redraft: 'The lot is a draft again.',
  pause: 'The lot is off the register.',
  reopen: 'The lot is back on the register.',
  withdraw: 'The lot is withdrawn.',
  price: 'The price is changed.',
};

/** Does an act and puts the lot as it then stands in place of the old. */
export function useLotAct(code: string, onDone?: (lot: LotAnswer) => void) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (act: LotAct) => actOnLot(code, act),
    onSuccess: (lot, { act }) => {
      client.setQueryData(ownLotQuery(code).queryKey, lot);
      confirmDone(done[act]);
      onDone?.(lot);
      return client.invalidateQueries({ queryKey: myLotsQuery.queryKey });
    },
  });
}
