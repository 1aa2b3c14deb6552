import { useEffect, useRef, useState, type SubmitEvent } from 'react';
import type { UseMutationResult } from '@tanstack/react-query';
import type { DealAnswer, PurchaseRequest } from '#shared/schemas/deals.ts';
import { FUND_MINUTES } from '#shared/limits.ts';
import { BUYER_CONFIRMATIONS } from '#shared/rules.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ErrorSummary } from '../../../components/ui/error-summary.tsx';
import { FieldError } from '../../../components/ui/field.tsx';
import { Checkbox } from '../../../components/ui/inputs.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';
import { formatMoney } from '../../../lib/format.ts';
import { useKeptState } from '../../../lib/use-kept-state.ts';
import {
  blankPurchase,
  fieldErrorsOf,
  isPurchaseForm,
  readPurchase,
  type FieldErrors,
  type PurchaseForm,
} from '../purchase-form.ts';
import { DeliveryFields } from './delivery-fields.tsx';
import { PurchaseRefusal } from './purchase-refusal.tsx';
import { PurchaseSum } from './purchase-sum.tsx';

type PurchaseFieldsProps = {
  lot: LotAnswer;
  total: string;
  purchase: UseMutationResult<DealAnswer, Error, PurchaseRequest>;
};

/** Address, confirmations and the sum once more; a refusal stands above the button that caused it. */
export function PurchaseFields({ lot, total, purchase }: PurchaseFieldsProps) {
  const only = lot.destinations.length === 1 ? (lot.destinations[0] ?? '') : '';
  const [form, setForm, forget] = useKeptState(
    `scruple.purchase.${lot.code}`,
    blankPurchase(only),
    isPurchaseForm,
  );
  const [errors, setErrors] = useState<FieldErrors>({});
  const [attempt, setAttempt] = useState(0);
  const refusal = useRef<HTMLDivElement>(null);
  const fail = (found: FieldErrors) => {
    setErrors(found);
    setAttempt((count) => count + 1);
  };
  const submit = (event: SubmitEvent) => {
    event.preventDefault();
    if (purchase.isPending) return;
    const read = readPurchase(form, total);
    if (read.errors) {
      purchase.reset();
      return fail(read.errors);
    }
    setErrors({});
    purchase.mutate(read.request, {
      onSuccess: forget,
      onError: (error) => {
        if (error instanceof ApiProblem && error.errors.length > 0) fail(fieldErrorsOf(error.errors));
      },
    });
  };
  const change = (next: Partial<PurchaseForm>) => setForm({ ...form, ...next });
  const isAtFields = Object.keys(errors).length > 0;
  const shownRefusal = isAtFields ? null : purchase.error;
  useEffect(() => {
    if (shownRefusal) refusal.current?.focus();
  }, [shownRefusal]);

  return (
    <form noValidate onSubmit={submit} aria-label="Purchase">
      <ErrorSummary
        attempt={attempt}
        items={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      <fieldset className="min-w-0">
        <legend className="mb-3 text-title font-semibold">Where the parcel goes</legend>
        <DeliveryFields
          delivery={form.delivery}
          destinations={lot.destinations}
          errors={errors}
          onChange={(field, value) => change({ delivery: { ...form.delivery, [field]: value } })}
        />
        <p className="mt-3 max-w-prose text-note text-ink-2">
          The seller sees this address only when the money is in escrow. It cannot be changed afterwards.
        </p>
      </fieldset>
      <Confirmations form={form} errors={errors} onChange={change} />
      <section aria-labelledby="purchase-sum" className="mt-8">
        <h2 id="purchase-sum" className="mb-3">
          What you agree to
        </h2>
        <PurchaseSum lot={lot} total={total} />
      </section>
      {shownRefusal && (
        <div ref={refusal} tabIndex={-1} className="mt-5">
          <PurchaseRefusal
            error={shownRefusal}
            code={lot.code}
            totalBefore={purchase.variables?.total ?? null}
            totalNow={total}
          />
        </div>
      )}
      <div className="mt-5">
        <Button type="submit" busy={purchase.isPending} busyText="Agreeing with the seller">
          Agree, and pay {formatMoney(total)} into escrow
        </Button>
        <p className="mt-2 max-w-prose text-note text-ink-2">
          The payment provider’s page opens next. The lot stays reserved for you for {FUND_MINUTES} minutes;
          without a payment it is offered again.
        </p>
      </div>
    </form>
  );
}

type ConfirmationsProps = {
  form: PurchaseForm;
  errors: FieldErrors;
  onChange: (next: Partial<PurchaseForm>) => void;
};

function Confirmations({ form, errors, onChange }: ConfirmationsProps) {
  const box = (field: 'confirmsAge' | 'confirmsRules', label: string, hint?: string) => (
    <div>
      {errors[field] && <FieldError id={`${field}-error`}>{errors[field]}</FieldError>}
      <Checkbox
        id={field}
        label={label}
        hint={hint}
        checked={form[field]}
        aria-required
        aria-invalid={errors[field] ? true : undefined}
        aria-describedby={errors[field] ? `${field}-error` : undefined}
        onChange={(event) => onChange({ [field]: event.target.checked })}
      />
    </div>
  );
  return (
    <fieldset className="mt-8 flex min-w-0 flex-col gap-3">
      <legend className="mb-3 text-title font-semibold">What you confirm</legend>
      {box('confirmsAge', BUYER_CONFIRMATIONS.age)}
      {box('confirmsRules', BUYER_CONFIRMATIONS.rules, BUYER_CONFIRMATIONS.rulesHint)}
    </fieldset>
  );
}
