import { useSuspenseQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { PriceFixPanel } from '../../../components/figures/price-fix-panel.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { lotQuery } from '../../../lib/lot-query.ts';
import { usePurchase } from '../hooks/use-purchase.ts';
import { totalOf } from '../../../lib/shown-figures.ts';
import { stateWords } from '../../../components/figures/lot-state-words.ts';
import { PurchaseFields } from './purchase-fields.tsx';
import { PurchaseMade } from './purchase-made.tsx';
import { PurchaseRefusal } from './purchase-refusal.tsx';

/** From the address to the hosted payment page. */
export function PurchasePage({ code }: { code: string }) {
  const { data: lot } = useSuspenseQuery(lotQuery(code));
  const { purchase, payment } = usePurchase(code);
  const total = totalOf(lot);
  const deal = purchase.data;
  return (
    <Page
      title={`Buy: ${lot.title}`}
      sub={
        <>
          Lot <span className="fig">{lot.code}</span> ·{' '}
          <Link to={paths.lot(lot.code)} className="link">
            back to the lot
          </Link>
        </>
      }
      className="mx-auto max-w-3xl"
    >
      <OfflineNotice />
      {deal ? (
        <PurchaseMade
          dealCode={deal.code}
          total={deal.total.amount}
          error={payment.error}
          isPending={payment.isPending}
          onPay={() => payment.mutate(deal.code)}
        />
      ) : total && (lot.can.buy || purchase.isPending) ? (
        <>
          <div className="mb-6">
            <PriceFixPanel lot={lot} />
          </div>
          <PurchaseFields lot={lot} total={total} purchase={purchase} />
        </>
      ) : purchase.error ? (
        <PurchaseRefusal error={purchase.error} code={code} totalBefore={null} totalNow={total} />
      ) : (
        <NotForSale lot={lot} />
      )}
    </Page>
  );
}

function NotForSale({ lot }: { lot: LotAnswer }) {
  return (
    <Notice title={lot.isMine ? 'This lot is your own' : 'This lot cannot be bought now'}>
      {lot.linkedPercent === null ? <p>{stateWords(lot)}</p> : <PriceFixPanel lot={lot} />}
      <div className="mt-3 flex flex-wrap gap-3">
        {lot.dealCode && <LinkButton to={paths.deal(lot.dealCode)}>Open deal {lot.dealCode}</LinkButton>}
        <LinkButton look="second" to={paths.lot(lot.code)}>
          Back to the lot
        </LinkButton>
      </div>
    </Notice>
  );
}
