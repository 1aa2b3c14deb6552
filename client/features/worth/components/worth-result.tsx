import { useEffect, useRef } from 'react';
import { METAL_NAMES } from '#shared/metals.ts';
import type { ValuationBody } from '#shared/schemas/valuations.ts';
import { Mass } from '../../../components/figures/mass.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { Time } from '../../../components/ui/time.tsx';
import type { Valuation } from '../api/value-metal.ts';
import { assumedWhat, finenessAsTyped, workingOf } from '../worth-working.ts';

type WorthResultProps = { valuation: Valuation; body: ValuationBody };

/** What the metal in the piece is worth, how sure that is, and how it was reckoned. */
export function WorthResult({ valuation, body }: WorthResultProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus(), [valuation]);
  const { total, metals, assumed } = valuation;
  return (
    <section aria-labelledby="worth-result" className="sheet mt-10 p-5 sm:p-6">
      <h2 id="worth-result" ref={heading} tabIndex={-1} className="text-lead font-medium text-ink-2">
        The metal in it is worth
      </h2>
      <p className="mt-1 text-head">
        <Money value={total.value} />
      </p>
      <p className="text-ink-2">
        with 95 % confidence between <Money value={total.low} /> and <Money value={total.high} />
      </p>
      <p className="mt-2 max-w-prose text-note text-ink-2">
        This is fine metal at the quote, before anybody’s terms: who buys it pays less by what refining,
        testing and carriage cost.
      </p>
      <ul className="mt-5">
        {metals.map((metal) => (
          <li key={metal.metal} className="border-t border-rule py-3">
            <div className="flex flex-wrap items-baseline justify-between gap-x-5">
              <h3 className="text-body">
                {METAL_NAMES[metal.metal]}, {finenessAsTyped(metal, body)}
              </h3>
              <Money value={metal.value} className="font-medium" />
            </div>
            <p className="mt-0.5 text-note text-ink-2">
              fine content <Mass entry={{ value: metal.fineGrams, unit: 'g' }} others />
            </p>
            <p className="text-note text-ink-2">
              at <Money value={metal.quote.usdPerTroyOunce} /> per oz t,{' '}
              {metal.quote.at ? (
                <>
                  quote of <Time at={metal.quote.at} />, {metal.quote.source}
                </>
              ) : (
                'your own quote'
              )}
            </p>
            <details className="mt-1 text-note">
              <summary className="inline-block min-h-6 py-0.5 underline underline-offset-4">
                Show the working<span className="sr-only"> for {METAL_NAMES[metal.metal].toLowerCase()}</span>
              </summary>
              <ol className="mt-1 font-mono leading-relaxed text-ink-2">
                {workingOf(metal, body).map((step) => (
                  <li key={step}>{step}</li>
                ))}
              </ol>
            </details>
          </li>
        ))}
      </ul>
      {assumed.length > 0 && (
        <div className="border-t border-rule pt-3 text-note">
          <h3 className="text-note">Not given, therefore assumed</h3>
          <ul className="mt-1 list-disc pl-5 text-ink-2">
            {assumed.map((item) => (
              <li key={item.field}>
                {assumedWhat(item.field, body)}: <span className="fig">{item.value}</span>. {item.reason}
              </li>
            ))}
          </ul>
        </div>
      )}
    </section>
  );
}
