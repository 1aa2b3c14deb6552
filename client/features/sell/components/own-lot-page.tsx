import { Link } from 'react-router-dom';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { MeltRule } from '../../../components/figures/melt-rule.tsx';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { PUBLIC_LOT_STATES } from '#shared/lot-states.ts';
import { dec, plain } from '#shared/decimal.ts';
import { paths } from '../../../lib/paths.ts';
import { stateWords } from '../lot-state-words.ts';
import { LotActs } from './lot-acts.tsx';
import { LotFacts } from './lot-facts.tsx';
import { LotHistory } from './lot-history.tsx';
import { NetsList } from './nets-list.tsx';

type OwnLotPageProps = { lot: LotAnswer; onRedrafted: (lot: LotAnswer) => void };

/** An own lot after it was handed in: how it stands, what can be done, what happened. */
export function OwnLotPage({ lot, onRedrafted }: OwnLotPageProps) {
  const { name, next } = stateWords[lot.state];
  return (
    <Page
      title={lot.title}
      sub={
        <>
          Your lot <span className="fig">{lot.code}</span>
        </>
      }
      aside={
        <>
          {PUBLIC_LOT_STATES.includes(lot.state) && (
            <LinkButton look="second" to={paths.lot(lot.code)}>
              See it as buyers do
            </LinkButton>
          )}
          {lot.dealCode && <LinkButton to={paths.deal(lot.dealCode)}>Go to deal {lot.dealCode}</LinkButton>}
        </>
      }
    >
      <OfflineNotice />
      {lot.stateReason && (
        <Notice
          tone={lot.state === 'returned' ? 'attention' : 'plain'}
          title={lot.state === 'returned' ? 'The desk returned this lot' : `${name}: the reason`}
          className="mb-6"
        >
          <p className="whitespace-pre-line">{lot.stateReason}</p>
        </Notice>
      )}
      <div className="mb-8 flex flex-wrap items-center gap-x-4 gap-y-1">
        <Stamp tone={lot.state === 'returned' ? 'attention' : 'plain'}>{name}</Stamp>
        <span className="text-ink-2">{next}</span>
      </div>
      <LotActs lot={lot} onRedrafted={onRedrafted} />
      <div className="grid grid-cols-1 items-start gap-x-10 gap-y-8 lg:grid-cols-[minmax(0,1fr)_27rem]">
        <div className="flex min-w-0 flex-col gap-8">
          <LotFacts lot={lot} />
          <LotHistory history={lot.history} />
        </div>
        <Worth lot={lot} />
      </div>
      <p className="mt-8">
        <Link to={paths.sell()} className="link">
          All lots you sell
        </Link>
      </p>
    </Page>
  );
}

function Worth({ lot }: { lot: LotAnswer }) {
  const sheet = lot.sellerSheet ?? lot.sheet;
  const isFresh = lot.quoteState === 'fresh' || lot.quoteState === 'partly';
  return (
    <div className="flex min-w-0 flex-col gap-5">
      {!isFresh && (
        <Notice
          role="status"
          tone={lot.quoteState === 'closed' ? 'plain' : 'attention'}
          title={lot.quoteState === 'closed' ? 'The market is closed' : 'There is no fresh quote'}
        >
          {sheet ? 'Figures rest on the last accepted quotes.' : 'What the metal is worth now is not known.'}
        </Notice>
      )}
      {sheet && (
        <>
          <div className="sheet p-4">
            <MeltRule
              band={{
                low: plain(dec('100').minus(sheet.melt.expandedPercent)),
                high: plain(dec('100').plus(sheet.melt.expandedPercent)),
              }}
              marks={sheet.percentOfMelt ? [{ kind: 'price', percent: sheet.percentOfMelt }] : []}
              quote={{ at: sheet.quotes.map((quote) => quote.at).sort()[0] ?? null }}
            />
          </div>
          <SettlementSheetView sheet={sheet} title="Your sheet" />
        </>
      )}
      {lot.nets.length > 0 && <NetsList nets={lot.nets} />}
    </div>
  );
}
