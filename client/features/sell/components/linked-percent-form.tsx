import { useState } from 'react';
import { MeasureError } from '#shared/domain-error.ts';
import { percentText, readLinkedPercent } from '#shared/lot-pricing.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { priceAtPercentOfMelt } from '#shared/settlement/percent-of-melt.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { useErrorTitle } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput } from '../../../components/ui/inputs.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';
import { formatMoney, formatPercent } from '../../../lib/format.ts';
import { useLotAct } from '../hooks/use-lot-act.ts';

type Read = { percent: string; error: null } | { percent: null; error: string };

function readPercent(text: string): Read {
  try {
    return { percent: percentText(readLinkedPercent(text)), error: null };
  } catch (error) {
    if (error instanceof MeasureError) return { percent: null, error: error.message };
    throw error;
  }
}

/** What the share of melt comes to at the quotes of the lot's sheet; null where there is none. */
function sumAt(lot: LotAnswer, percent: string): string | null {
  if (lot.sheet === null) return null;
  const sum = minorToAmount(priceAtPercentOfMelt(fromAmount(lot.sheet.melt.value).minor, percent));
  return formatMoney(sum);
}

type LinkedPercentFormProps = { lot: LotAnswer; onClose: () => void };

/** Another share of melt for an open linked lot: what it comes to follows while typing. */
export function LinkedPercentForm({ lot, onClose }: LinkedPercentFormProps) {
  const before = lot.linkedPercent ?? '';
  const [text, setText] = useState(before);
  const [tries, setTries] = useState(0);
  const [asked, setAsked] = useState<string | null>(null);
  const change = useLotAct(lot.code, onClose);
  const read = readPercent(text);
  const sum = read.percent === null ? null : sumAt(lot, read.percent);
  const error = tries > 0 ? (read.error ?? undefined) : undefined;
  useErrorTitle(error !== undefined);
  const refusal = change.error instanceof ApiProblem ? change.error.errors[0]?.message : undefined;
  if (asked !== null)
    return (
      <ConfirmPanel
        title="Change the share of melt?"
        sum={`${formatPercent(asked)} of melt`}
        counterparty="whoever fixes the price from now on"
        consequence={`Until now it was ${formatPercent(before)}.`}
        confirmText={`Change it to ${formatPercent(asked)} of melt`}
        busy={change.isPending}
        problem={refusal ?? change.error?.message}
        onConfirm={() => change.mutate({ act: 'price', linkedPercent: asked })}
        onCancel={() => setAsked(null)}
      />
    );
  return (
    <form
      noValidate
      aria-label="Change the share of melt"
      className="sheet max-w-xl p-5"
      onSubmit={(event) => {
        event.preventDefault();
        setTries(tries + 1);
        if (read.percent === null) document.getElementById('new-percent')?.focus();
        else setAsked(read.percent);
      }}
    >
      <Field
        id="new-percent"
        label="New share of melt, %"
        error={error}
        beside={sum === null ? 'There is no quote to hold it against.' : `${sum} at the newest quotes`}
      >
        {(ties) => (
          <NumberInput
            {...ties}
            autoFocus
            unit="%"
            value={text}
            maxLength={20}
            onChange={(event) => setText(event.target.value)}
          />
        )}
      </Field>
      <div className="mt-4 flex flex-wrap gap-3">
        <Button type="submit">Go on with this share</Button>
        <Button look="quiet" onClick={onClose}>
          Keep it as it is
        </Button>
      </div>
    </form>
  );
}
