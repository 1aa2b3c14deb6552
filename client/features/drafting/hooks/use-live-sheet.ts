import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useMemo } from 'react';
import { draftSheetInput } from '#shared/lot-submission.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import type { FeeScheduleAnswer, LotDraft } from '#shared/schemas/lots.ts';
import type { QuotesAnswer } from '#shared/schemas/quotes.ts';
import { explainCommission } from '#shared/settlement/commission.ts';
import { refinedSheet } from '#shared/settlement/refined-sheet.ts';
import type { QuoteRef, SettlementSheet } from '#shared/settlement/sheet-types.ts';
import { feesQuery } from '../../../lib/lots.ts';
import { quotesQuery } from '../../../lib/quotes.ts';

export type PaymentMethod = FeeScheduleAnswer['rates'][number]['method'];
export type NetLine = {
  method: PaymentMethod;
  percent: string;
  minimum: string;
  commission: string;
  net: string;
};

function quoteRefsOf(answer: QuotesAnswer): QuoteRef[] {
  return answer.quotes.map(({ id, metal, usdPerTroyOunce, at, source }) => ({
    id,
    metal,
    usdPerTroyOunce,
    at,
    source,
  }));
}

/** The method whose commission the seller's own sheet carries: the dearest, so that no other pays out less. */
function shownRate(fees: FeeScheduleAnswer | undefined) {
  return fees?.rates.find((rate) => rate.method === 'card') ?? fees?.rates[0];
}

function sheetOf(draft: LotDraft, quotes: QuoteRef[], fees: FeeScheduleAnswer | undefined) {
  const rate = shownRate(fees);
  const input = rate
    ? draftSheetInput(draft, quotes, {
        audience: 'seller',
        commission: { method: rate.method, percent: rate.percent, minimum: rate.minimum.amount },
      })
    : draftSheetInput(draft, quotes);
  return input ? refinedSheet(input) : null;
}

function netsOf(sheet: SettlementSheet | null, fees: FeeScheduleAnswer | undefined): NetLine[] {
  if (!sheet?.price || !fees) return [];
  const price = fromAmount(sheet.price).minor;
  const shipping = fromAmount(sheet.shipping ?? '0.00').minor;
  return fees.rates.map(({ method, percent, minimum }) => {
    const { minor } = explainCommission(price, { percent, minimumMinor: fromAmount(minimum.amount).minor });
    return {
      method,
      percent,
      minimum: minimum.amount,
      commission: minorToAmount(minor),
      net: minorToAmount(price - minor + shipping),
    };
  });
}

/** The estimated sheet of the draft as it is being typed, at the newest quotes, by the rules of the server. */
export function useLiveSheet(draft: LotDraft) {
  const { data: quotes } = useQuery(quotesQuery);
  const { data: fees } = useQuery(feesQuery);
  const typed = useDeferredValue(draft);
  const refs = useMemo(() => (quotes ? quoteRefsOf(quotes) : []), [quotes]);
  const sheet = useMemo(() => sheetOf(typed, refs, fees), [typed, refs, fees]);
  const nets = useMemo(() => netsOf(sheet, fees), [sheet, fees]);
  return { sheet, nets, quotes };
}

export type LiveSheetFigures = ReturnType<typeof useLiveSheet>;
