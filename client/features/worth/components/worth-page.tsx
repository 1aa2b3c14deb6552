import { useMutation, useQuery } from '@tanstack/react-query';
import { useState, type SubmitEvent } from 'react';
import type { ValuationBody } from '#shared/schemas/valuations.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { ErrorSummary, type SummaryItem } from '../../../components/ui/error-summary.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { ApiProblem } from '../../../lib/api-client.ts';
import { quotesQuery } from '../../../lib/quotes.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { valueMetal } from '../api/value-metal.ts';
import { useKeptState } from '../../../lib/use-kept-state.ts';
import {
  blankRow,
  blankWorth,
  errorsOfProblems,
  isWorthForm,
  nextMetal,
  readWorth,
  type WorthErrors,
  type WorthForm,
  type WorthRow,
} from '../worth-form.ts';
import { WorthMassFields } from './worth-mass-fields.tsx';
import { WorthMetalFields } from './worth-metal-fields.tsx';
import { WorthResult } from './worth-result.tsx';

type Told = { errors: WorthErrors; general: string[] };
const nothingTold: Told = { errors: {}, general: [] };

function useWorth(form: WorthForm) {
  const [told, setTold] = useState(nothingTold);
  const [attempt, setAttempt] = useState(0);
  const tell = (next: Told) => {
    setTold(next);
    setAttempt((count) => count + 1);
  };
  const valuation = useMutation({
    mutationFn: async (body: ValuationBody) => ({ body, answer: await valueMetal(body) }),
    onError: (error) => {
      if (error instanceof ApiProblem && error.errors.length > 0) tell(errorsOfProblems(error.errors, form));
    },
  });
  const submit = (event: SubmitEvent) => {
    event.preventDefault();
    if (valuation.isPending) return;
    const read = readWorth(form);
    if (Object.keys(read.errors).length > 0) {
      valuation.reset();
      return tell({ errors: read.errors, general: [] });
    }
    setTold(nothingTold);
    valuation.mutate(read.body);
  };
  const items: SummaryItem[] = [
    ...told.general.map((message) => ({ fieldId: null, message })),
    ...Object.entries(told.errors).map(([fieldId, message]) => ({ fieldId, message })),
  ];
  return { valuation, submit, errors: told.errors, items, attempt };
}

/** Values any mass and assay, for anybody. */
export function WorthPage() {
  const { weightUnit } = useReader();
  const [form, setForm] = useKeptState('scruple.worth', blankWorth(weightUnit), isWorthForm);
  const { data: quotes } = useQuery(quotesQuery);
  const { valuation, submit, errors, items, attempt } = useWorth(form);
  const change = (next: Partial<WorthForm>) => setForm({ ...form, ...next });
  const changeRow = (id: number, next: Partial<WorthRow>) =>
    change({ rows: form.rows.map((row) => (row.id === id ? { ...row, ...next } : row)) });
  const further = nextMetal(form.rows);
  const addRow = () =>
    further &&
    change({ rows: [...form.rows, blankRow(Math.max(...form.rows.map(({ id }) => id)) + 1, further)] });
  const hasToldFields = items.length > 0;
  return (
    <Page
      title="What is it worth?"
      sub="Mass and fineness make the fine metal, the quote makes its value. Needs no account; nothing is stored."
      className="mx-auto max-w-4xl"
    >
      <OfflineNotice />
      <form noValidate onSubmit={submit} aria-label="What is it worth?">
        <ErrorSummary items={items} attempt={attempt} />
        <WorthMassFields form={form} errors={errors} onChange={change} />
        <h2 className="mb-3 mt-8">The metals in it</h2>
        <div className="flex flex-col gap-5">
          {form.rows.map((row) => (
            <WorthMetalFields
              key={row.id}
              row={row}
              quote={quotes?.quotes.find((quote) => quote.metal === row.metal)}
              errors={errors}
              onChange={(next) => changeRow(row.id, next)}
              onRemove={
                form.rows.length > 1
                  ? () => change({ rows: form.rows.filter((other) => other.id !== row.id) })
                  : null
              }
            />
          ))}
        </div>
        <div className="mt-6 flex flex-wrap gap-3 border-t border-rule pt-5">
          <Button type="submit" busy={valuation.isPending} busyText="Reckoning">
            Reckon its worth
          </Button>
          {further && (
            <Button look="second" onClick={addRow}>
              There is another metal in it
            </Button>
          )}
        </div>
      </form>
      {valuation.isError && !hasToldFields && (
        <div className="mt-6">
          <ErrorState error={valuation.error} what="The value" />
        </div>
      )}
      {valuation.data && !hasToldFields && (
        <WorthResult valuation={valuation.data.answer} body={valuation.data.body} />
      )}
      <p className="mt-8 max-w-prose text-note text-ink-2">
        A figure is only as good as the fineness behind it: marks can lie, plating hides what is under it, and
        tungsten has the density of gold. Acids and heat are dangerous; nothing here tells you to use them.
        Check your local rules before you sell; this is not legal advice.
      </p>
    </Page>
  );
}
