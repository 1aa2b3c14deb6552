import { useState } from 'react';
import { MeasureError } from '#shared/domain-error.ts';
import { checkPrice } from '#shared/lot-pricing.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { explainCommission } from '#shared/settlement/commission.ts';
import { percentOfMelt } from '#shared/settlement/percent-of-melt.ts';
import { typedDecimal } from '#shared/typed-number.ts';
import { Money } from '../../../components/figures/money.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { useErrorTitle } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/inputs.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';
import { formatMoney, formatPercent } from '../../../lib/format.ts';
import { useLotAct } from '../hooks/use-lot-act.ts';

type Read = { minor: bigint; error: null } | { minor: null; error: string };

function readPrice(text: string): Read {
  try {
    const { minor } = fromAmount(typedDecimal(text, '/price', 'Enter a price.'), '/price');
    checkPrice(minor);
    return { minor, error: null };
  } catch (error) {
    if (error instanceof MeasureError) return { minor: null, error: error.message };
    throw error;
  }
}

/** The share of melt that a price comes to at the quotes of the lot's sheet; null where there is none. */
function shareOf(lot: LotAnswer, priceMinor: bigint): string | null {
  return lot.sheet && percentOfMelt(priceMinor, fromAmount(lot.sheet.melt.value).minor);
}

function netText(lot: LotAnswer, priceMinor: bigint): string {
  const shipping = fromAmount(lot.shipping?.amount ?? '0.00').minor;
  return lot.nets
    .map(({ method, percent, minimum }) => {
      const { minor } = explainCommission(priceMinor, {
        percent,
        minimumMinor: fromAmount(minimum.amount).minor,
      });
      const net = minorToAmount(priceMinor - minor + shipping);
      return `${formatMoney(net)} when paid by ${method === 'card' ? 'card' : 'bank debit'}`;
    })
    .join(', ');
}

type PriceFormProps = { lot: LotAnswer; onClose: () => void };

/** Another price for an open lot: its share of melt follows while typing and is restated before it counts. */
export function PriceForm({ lot, onClose }: PriceFormProps) {
  const [text, setText] = useState(lot.price?.amount ?? '');
  const [tries, setTries] = useState(0);
  const [asked, setAsked] = useState<bigint | null>(null);
  const change = useLotAct(lot.code, onClose);
  const read = readPrice(text);
  const share = read.minor === null ? null : shareOf(lot, read.minor);
  const error = tries > 0 ? (read.error ?? undefined) : undefined;
  useErrorTitle(error !== undefined);
  const refusal = change.error instanceof ApiProblem ? change.error.errors[0]?.message : undefined;
  if (asked !== null) {
    const percent = shareOf(lot, asked);
    const sum = minorToAmount(asked);
    return (
      <ConfirmPanel
        title="Change the price?"
        sum={
          <>
            <Money value={sum} /> {percent && `· ${formatPercent(percent)} of melt`}
          </>
        }
        counterparty="whoever buys the lot from now on"
        consequence={
          <>
            Until now it was {formatMoney(lot.price?.amount ?? '0.00')}. To you: {netText(lot, asked)}.
          </>
        }
        confirmText={`Change the price to ${formatMoney(sum)}`}
        busy={change.isPending}
        problem={refusal ?? change.error?.message}
        onConfirm={() => change.mutate({ act: 'price', price: sum })}
        onCancel={() => setAsked(null)}
      />
    );
  }
  return (
    <form
      noValidate
      aria-label="Change the price"
      className="sheet max-w-xl p-5"
      onSubmit={(event) => {
        event.preventDefault();
        setTries(tries + 1);
        if (read.minor === null) document.getElementById('new-price')?.focus();
        else setAsked(read.minor);
      }}
    >
      <Field
        id="new-price"
        label="New price of the metal, US$"
        error={error}
        beside={
          share === null
            ? 'There is no quote to hold it against.'
            : `${formatPercent(share)} of melt at the newest quotes`
        }
      >
        {(ties) => (
          <NumberInput
            {...ties}
            autoFocus
            value={text}
            maxLength={20}
            onChange={(event) => setText(event.target.value)}
          />
        )}
      </Field>
      <div className="mt-4 flex flex-wrap gap-3">
        <Button type="submit">Go on with this price</Button>
        <Button look="quiet" onClick={onClose}>
          Keep the price as it is
        </Button>
      </div>
    </form>
  );
}
