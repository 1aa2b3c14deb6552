import { useSuspenseQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { formName } from '../../../components/figures/lot-words.tsx';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { paths } from '../../../lib/paths.ts';
import { useMember } from '../../../lib/session.ts';
import { lotQuery } from '../../../lib/lot-query.ts';
import { LotCautions } from './lot-cautions.tsx';
import { LotEvidence } from './lot-evidence.tsx';
import { LotHistory } from './lot-history.tsx';
import { dealsText, LotParticulars } from './lot-particulars.tsx';
import { LotPricePanel } from './lot-price-panel.tsx';
import { stateWord } from '../../../components/figures/lot-state-words.ts';
import { sheetQuotedAt } from './lot-words.ts';
import { PhotoViewer } from './photo-viewer.tsx';
import { QuoteStateNotice } from '../../../components/figures/quote-state-notice.tsx';
import { lotFormOf } from './register-row-parts.tsx';
import { SellerNets } from './seller-nets.tsx';

type LotPageProps = { code: string };

/** All that is public of one lot: what it is, who says so, what it is worth, what it costs. */
export function LotPage({ code }: LotPageProps) {
  const { data: lot } = useSuspenseQuery(lotQuery(code));
  const member = useMember();
  return (
    <Page
      title={lot.title || `Lot ${lot.code}`}
      heading={<LotHeading lot={lot} />}
      sub={
        <>
          Lot <span className="fig">{lot.code}</span> · {formName(lotFormOf(lot.form))} · sold by a member,{' '}
          {lot.seller.region} · {dealsText(lot.seller.completedDeals)} ·{' '}
          <Link to={paths.register()} className="link no-print">
            Register of lots
          </Link>
        </>
      }
    >
      <OfflineNotice />
      {lot.stateReason && (
        <Notice tone="attention" title="Said about this lot" className="mb-5">
          {lot.stateReason}
        </Notice>
      )}
      <QuoteStateNotice state={lot.quoteState} at={lot.sheet && sheetQuotedAt(lot.sheet)} className="mb-5" />
      <div className="grid gap-x-10 gap-y-8 lg:grid-cols-2 lg:grid-rows-[auto_1fr]">
        <PhotoViewer lot={lot} />
        <div className="flex min-w-0 flex-col gap-6 lg:col-start-2 lg:row-span-2 lg:row-start-1">
          <LotPricePanel lot={lot} isSignedIn={member !== null} />
          {lot.sheet && <SettlementSheetView sheet={lot.sheet} />}
          {lot.sellerSheet && <SettlementSheetView sheet={lot.sellerSheet} title="Your side of the sheet" />}
          <SellerNets nets={lot.nets} />
        </div>
        <div className="flex min-w-0 flex-col gap-8">
          <LotEvidence lot={lot} />
          <LotParticulars lot={lot} />
        </div>
      </div>
      <div className="mt-10 grid gap-x-10 gap-y-8 border-t border-rule pt-8 lg:grid-cols-2">
        <LotCautions lot={lot} />
        <LotHistory history={lot.history} />
      </div>
    </Page>
  );
}

function LotHeading({ lot }: { lot: LotAnswer }) {
  const word = stateWord(lot.state);
  return (
    <>
      {lot.title || `Lot ${lot.code}`}
      {word && (
        <span className="ml-3 align-middle">
          <Stamp>{word}</Stamp>
        </span>
      )}
    </>
  );
}
