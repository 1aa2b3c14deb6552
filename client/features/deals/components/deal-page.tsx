import { useSuspenseQuery } from '@tanstack/react-query';
import type { ComponentType } from 'react';
import { Link } from 'react-router-dom';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { paths } from '../../../lib/paths.ts';
import { dealQuery } from '../../../lib/deals.ts';
import { partyText, stateWord } from '../../../components/figures/deal-words.ts';
import { DealOutcome } from './deal-outcome.tsx';
import { DealPapers } from './deal-papers.tsx';
import { DealParcel } from './deal-parcel.tsx';
import { DealSums } from './deal-sums.tsx';

function sidesText(deal: DealAnswer): string {
  if (deal.side === 'buyer') return `You buy from ${partyText(deal.seller)}`;
  if (deal.side === 'seller') return `You sell to ${partyText(deal.buyer)}`;
  return `${partyText(deal.buyer)}, buys from ${partyText(deal.seller)}`;
}

function DealSub({ deal }: { deal: DealAnswer }) {
  return (
    <>
      {sidesText(deal)} · lot{' '}
      <Link to={paths.lot(deal.lot.code)} className="link">
        <span className="fig">{deal.lot.code}</span>
      </Link>{' '}
      · agreed <Time at={deal.agreedAt} /> ·{' '}
      <Link to={deal.side === 'desk' ? paths.deskDeals() : paths.deals()} className="link no-print">
        {deal.side === 'desk' ? 'Deals for the desk' : 'Where I stand'}
      </Link>
    </>
  );
}

type DealPageProps = {
  code: string;
  /** The book of the deal with the acts that are open to the reader. */
  Register: ComponentType<{ deal: DealAnswer }>;
};

/** One deal from agreement to payout: its book, its money, its parcel, its papers. */
export function DealPage({ code, Register }: DealPageProps) {
  const { data: deal, isError } = useSuspenseQuery(dealQuery(code));
  return (
    <Page
      title={`Deal ${deal.code}, ${deal.lot.title}`}
      heading={
        <>
          Deal {deal.code}, {deal.lot.title}
          <span className="ml-3 align-middle tracking-normal">
            <Stamp>{stateWord(deal.state)}</Stamp>
          </span>
        </>
      }
      sub={<DealSub deal={deal} />}
    >
      <OfflineNotice />
      {isError && (
        <Notice tone="attention" role="status" title="This may be out of date" className="mb-6">
          The last look at the deal did not succeed. It is tried again by itself.
        </Notice>
      )}
      <div className="grid gap-x-10 gap-y-8 lg:grid-cols-[minmax(0,5fr)_minmax(0,3fr)] lg:grid-rows-[auto_1fr]">
        <Register deal={deal} />
        <div className="flex min-w-0 flex-col gap-6 lg:col-start-2 lg:row-span-2 lg:row-start-1">
          <DealOutcome deal={deal} />
          <DealSums deal={deal} />
          <DealParcel deal={deal} />
        </div>
        <DealPapers deal={deal} />
      </div>
    </Page>
  );
}
