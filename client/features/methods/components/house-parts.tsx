import { useQuery } from '@tanstack/react-query';
import { EVIDENCE_GRADE_LABELS, EVIDENCE_GRADE_MEANINGS, EVIDENCE_GRADES } from '#shared/assay/evidence.ts';
import {
  ARRIVE_DAYS,
  CONTESTED_DESK_DAYS,
  FUND_MINUTES,
  INSPECT_DAYS,
  QUOTE_ALARM_POLLS,
  QUOTE_CONFIRM_PERCENT,
  QUOTE_CONFIRM_POLLS,
  QUOTE_JUMP_PERCENT,
  QUOTE_POLL_SECONDS,
  QUOTE_STALE_SECONDS,
  SHIP_BUSINESS_DAYS,
} from '#shared/limits.ts';
import { METAL_NAMES, METALS } from '#shared/metals.ts';
import { Money } from '../../../components/figures/money.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { formatPercent } from '../../../lib/format.ts';
import { feesQuery } from '../../../lib/lots.ts';
import { FigureTable, MethodPart, Prose } from './method-part.tsx';

export function EvidencePart() {
  return (
    <MethodPart
      id="evidence"
      title="Evidence grades"
      source="what a laboratory’s report states, ISO/IEC 17025:2017, clause 7.8.2.1; the grades are a rule of this house."
    >
      <FigureTable
        caption="The grades and what each means"
        heads={[{ text: 'grade' }, { text: 'means' }]}
        rows={EVIDENCE_GRADES.map((grade) => ({
          key: grade,
          cells: [
            EVIDENCE_GRADE_LABELS[grade],
            <span key="meaning" className="block max-w-prose">
              {EVIDENCE_GRADE_MEANINGS[grade]}
            </span>,
          ],
        }))}
      />
      <Prose>
        Two masses count as the same piece when they differ by no more than one unit of the last digit of each
        together. In the register lots that are declared or examined rank at the lower end of their range, so
        that no boast is rewarded.
      </Prose>
    </MethodPart>
  );
}

export function QuotesPart() {
  return (
    <MethodPart
      id="quotes"
      title="Quotes"
      source="the quote service named beside each quote; the limits are defaults of this house."
    >
      <Prose>
        A rate is the middle of the newest accepted quote, in US dollars per troy ounce of fine metal. The
        service is asked every {QUOTE_POLL_SECONDS} seconds. A quote older than {QUOTE_STALE_SECONDS / 60}{' '}
        minutes is stale, and every screen that shows a price says so; when the market is closed it is not
        stale, and the screen says until when.
      </Prose>
      <Prose>
        A value that jumps is kept apart until the next {QUOTE_CONFIRM_POLLS} answers confirm it within{' '}
        {formatPercent(QUOTE_CONFIRM_PERCENT)}; after {QUOTE_ALARM_POLLS} answers without agreement it stands
        in the audit trail, where an admin reads it. Values of nothing, below nothing or in another currency
        are refused.
      </Prose>
      <FigureTable
        caption="How far a quote may move before it has to be confirmed"
        heads={[{ text: 'metal' }, { text: 'a jump is more than', isFigure: true }]}
        rows={METALS.map((metal) => ({
          key: metal,
          cells: [`${METAL_NAMES[metal]} (${metal})`, formatPercent(QUOTE_JUMP_PERCENT[metal])],
        }))}
      />
    </MethodPart>
  );
}

const methodNames = { card: 'card', bank_debit: 'bank debit' } as const;

export function CommissionPart() {
  const fees = useQuery(feesQuery);
  return (
    <MethodPart id="commission" title="Commission">
      <Prose>
        The seller bears it, on the price of the metal without the parcel; the buyer’s total never depends on
        it. It is the percentage of the price rounded once to the cent, at least the minimum, and never more
        than the price. The house bears the payment provider’s fee, on refunds too. A deal keeps the rates of
        the day on which it was agreed.
      </Prose>
      {fees.isPending && <Skeleton lines={3} label="Loading the rates" />}
      {fees.isError && <ErrorState error={fees.error} what="The rates" onRetry={() => void fees.refetch()} />}
      {fees.data && (
        <FigureTable
          caption="Commission by payment method"
          heads={[
            { text: 'paid by' },
            { text: 'of the price', isFigure: true },
            { text: 'at least', isFigure: true },
          ]}
          rows={fees.data.rates.map(({ method, percent, minimum }) => ({
            key: method,
            cells: [
              methodNames[method],
              formatPercent(percent),
              <Money key="minimum" value={minimum.amount} />,
            ],
          }))}
        />
      )}
    </MethodPart>
  );
}

const deadlines = [
  {
    what: 'Pay',
    time: `${FUND_MINUTES} minutes`,
    silence: 'the purchase lapses; the lot is open again',
  },
  {
    what: 'Ship',
    time: `${SHIP_BUSINESS_DAYS} business days`,
    silence: 'cancelled; everything goes back to the buyer',
  },
  { what: 'Arrive', time: `${ARRIVE_DAYS} days`, silence: 'the buyer can contest' },
  {
    what: 'Inspect',
    time: `${INSPECT_DAYS} days`,
    silence: 'the money stays held; the desk can take up the deal',
  },
  {
    what: 'Rule on a contest',
    time: `${CONTESTED_DESK_DAYS} days`,
    silence: 'the money stays held until the desk has ruled',
  },
];

export function DealPart() {
  return (
    <MethodPart
      id="deal"
      title="Weighing on arrival, and deadlines"
      source="comparing two displays by their steps is common practice; the deadlines are rules of this house."
    >
      <Prose>
        The received mass agrees with the stated one when their difference is no larger than one step of the
        display of each balance together. The seller’s step is the stated readability, or one unit of the last
        digit where none was given; the buyer’s is one unit of the last digit typed.
      </Prose>
      <FigureTable
        caption="Deadlines of a deal"
        heads={[{ text: 'to do' }, { text: 'within' }, { text: 'silence means' }]}
        rows={deadlines.map(({ what, time, silence }) => ({ key: what, cells: [what, time, silence] }))}
      />
      <Prose>
        Business days are Monday to Friday in the zone of who has to act; public holidays are not known.
      </Prose>
    </MethodPart>
  );
}
