import { FINENESS_UNIT_LABELS, FINENESS_UNITS, type FinenessUnit } from '#shared/fineness.ts';
import { METAL_NAMES, METALS, type Metal } from '#shared/metals.ts';
import type { QuoteAnswer } from '#shared/schemas/quotes.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { NumberInput, Select } from '../../../components/ui/inputs.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { fieldIds, uncertaintyUnit, type WorthErrors, type WorthRow } from '../worth-form.ts';

type WorthMetalFieldsProps = {
  row: WorthRow;
  quote: QuoteAnswer | undefined;
  errors: WorthErrors;
  onChange: (change: Partial<WorthRow>) => void;
  onRemove: (() => void) | null;
};

/** One metal: how much of the piece it is, how sure that is, and what it is quoted at. */
export function WorthMetalFields({ row, quote, errors, onChange, onRemove }: WorthMetalFieldsProps) {
  const ids = {
    metal: fieldIds.metal(row),
    fineness: fieldIds.fineness(row),
    unit: fieldIds.finenessUnit(row),
    uncertainty: fieldIds.uncertainty(row),
  };
  return (
    <fieldset className="min-w-0 border-t border-rule pt-4">
      <legend className="sr-only">{METAL_NAMES[row.metal]}</legend>
      <div className="grid gap-4 sm:grid-cols-2 lg:grid-cols-[10rem_minmax(0,1fr)_8rem_minmax(0,1fr)]">
        <Field id={ids.metal} label="Metal" error={errors[ids.metal]}>
          {(ties) => (
            <Select
              {...ties}
              value={row.metal}
              onChange={(event) => onChange({ metal: event.target.value as Metal, quote: null })}
            >
              {METALS.map((metal) => (
                <option key={metal} value={metal}>
                  {METAL_NAMES[metal]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field id={ids.fineness} label="Fineness" error={errors[ids.fineness]}>
          {(ties) => (
            <NumberInput
              {...ties}
              value={row.fineness}
              onChange={(event) => onChange({ fineness: event.target.value })}
            />
          )}
        </Field>
        <Field id={ids.unit} label="In" error={errors[ids.unit]}>
          {(ties) => (
            <Select
              {...ties}
              value={row.finenessUnit}
              onChange={(event) => onChange({ finenessUnit: event.target.value as FinenessUnit })}
            >
              {FINENESS_UNITS.map((unit) => (
                <option key={unit} value={unit}>
                  {FINENESS_UNIT_LABELS[unit]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field
          id={ids.uncertainty}
          label="Give or take"
          error={errors[ids.uncertainty]}
          optional
          beside="As the report says it (k = 2)."
        >
          {(ties) => (
            <NumberInput
              {...ties}
              value={row.uncertainty}
              unit={FINENESS_UNIT_LABELS[uncertaintyUnit(row)]}
              onChange={(event) => onChange({ uncertainty: event.target.value })}
            />
          )}
        </Field>
      </div>
      <div className="mt-4 flex flex-wrap items-end justify-between gap-4">
        <QuoteField row={row} quote={quote} error={errors[fieldIds.quote(row)]} onChange={onChange} />
        {onRemove && (
          <Button look="quiet" onClick={onRemove}>
            Leave {METAL_NAMES[row.metal].toLowerCase()} out
          </Button>
        )}
      </div>
    </fieldset>
  );
}

type QuoteFieldProps = {
  row: WorthRow;
  quote: QuoteAnswer | undefined;
  error: string | undefined;
  onChange: (change: Partial<WorthRow>) => void;
};

/** Holds the accepted quote until somebody writes another; emptied, it is the accepted one again. */
function QuoteField({ row, quote, error, onChange }: QuoteFieldProps) {
  const isOwn = row.quote !== null;
  const beside = isOwn ? (
    'Your own quote. Empty the field and leave it to take the accepted one again.'
  ) : quote ? (
    <>
      Accepted quote of <Time at={quote.at} />
      {!quote.isFresh && <span className="font-medium text-litharge">, not fresh</span>}. Write another to see
      what it would make.
    </>
  ) : (
    <span className="font-medium text-litharge">There is no accepted quote; write one of your own.</span>
  );
  return (
    <Field
      id={fieldIds.quote(row)}
      label="Quote for fine metal"
      error={error}
      optional
      beside={beside}
      className="w-full max-w-md"
    >
      {(ties) => (
        <NumberInput
          {...ties}
          value={row.quote ?? quote?.usdPerTroyOunce ?? ''}
          unit="US$ per oz t"
          onChange={(event) => onChange({ quote: event.target.value })}
          onBlur={(event) => event.target.value.trim() === '' && onChange({ quote: null })}
        />
      )}
    </Field>
  );
}
