import { isDeskStaff } from '#shared/roles.ts';
import type { Certificate } from '#server/models/certificate.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';

export type CaseAct = 'open' | 'claim' | 'release' | 'verify' | 'examine' | 'return' | 'pull';

type CaseRows = {
  certificate: Pick<Certificate, 'state' | 'claimedById' | 'assayVersion'>;
  lot: Pick<Lot, 'sellerId' | 'state' | 'assayVersion'>;
};
type Who = Pick<Actor, 'id' | 'role'>;

/** Staff never act on what is their own. */
export function isOwnCase(actor: Who, lot: Pick<Lot, 'sellerId'>): boolean {
  return lot.sellerId === actor.id;
}

/** States from which the desk may withdraw a lot; from reserved on a deal runs and the desk rules on the deal instead. */
const PULLED_FROM: readonly Lot['state'][] = ['submitted', 'open', 'paused'];

export function canPull(actor: Who, lot: Pick<Lot, 'sellerId' | 'state'>): boolean {
  return isDeskStaff(actor.role) && !isOwnCase(actor, lot) && PULLED_FROM.includes(lot.state);
}

/** An examined certificate can be taken up again as long as its lot waits: the laboratory may have come to the register. */
function isWaiting({ certificate, lot }: CaseRows): boolean {
  return (
    lot.state === 'submitted' &&
    certificate.assayVersion === lot.assayVersion &&
    (certificate.state === 'submitted' || certificate.state === 'examined')
  );
}

export function canOnCase(actor: Who, act: CaseAct, rows: CaseRows): boolean {
  if (!isDeskStaff(actor.role) || isOwnCase(actor, rows.lot)) return false;
  const isClaimed = rows.certificate.state === 'claimed';
  const isMine = isClaimed && rows.certificate.claimedById === actor.id;
  switch (act) {
    case 'open':
      return true;
    case 'claim':
      return isWaiting(rows);
    case 'release':
      return isMine || (isClaimed && actor.role === 'admin');
    case 'verify':
    case 'examine':
    case 'return':
      return isMine && rows.lot.state === 'submitted';
    case 'pull':
      return canPull(actor, rows.lot);
  }
}
