import { screen, within } from '@testing-library/react';
import { http, HttpResponse } from 'msw';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import type { QuotesAnswer } from '#shared/schemas/quotes.ts';
import { buildMember, buildQuote, buildQuotes } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

afterEach(() => vi.restoreAllMocks());

function serve(answer: QuotesAnswer) {
  const day = (date: string, usdPerTroyOunce: string) => ({
    day: date,
    usdPerTroyOunce,
    at: `${date}T00:00:10.000Z`,
    source: 'Vale quotes',
  });
  apiServer.use(
    http.get('/api/v1/quotes', () => HttpResponse.json(answer)),
    http.get('/api/v1/quotes/history', ({ request }) =>
      HttpResponse.json({
        metal: new URL(request.url).searchParams.get('metal'),
        points: [day('2026-11-29', '3110.34768'), day('2026-11-30', '4182.40')],
      }),
    ),
  );
}

describe('the page of quotes', () => {
  it('tells each metal in the reader’s unit with time and source, and its history as line and table', async () => {
    openPage('/quotes', buildMember());
    serve(buildQuotes());
    const gold = within(await screen.findByRole('region', { name: 'Gold Au' }));
    // 4182.40 ÷ 31.1034768 = 134.46728…, by hand.
    expect(gold.getByText(/^US\$\s134\.4673$/)).toBeVisible();
    expect(gold.getByText(/4,182\.40$/)).toBeVisible();
    expect(gold.getByText(/14:02 UTC/)).toBeVisible();
    expect(gold.getByText('from Vale quotes')).toBeVisible();
    expect(
      await gold.findByRole('img', { name: /^Gold per g: US\$ 100\.0000 on 29 November 2026/ }),
    ).toBeVisible();
    const table = gold.getByRole('table', { hidden: true });
    expect(
      within(table).getByRole('row', { name: '29 November 2026 100.0000', hidden: true }),
    ).toBeInTheDocument();
  });

  it('keeps the troy ounce’s own figure for who reads in troy ounces', async () => {
    openPage('/quotes', buildMember({ weightUnit: 'ozt' }));
    serve(buildQuotes());
    const silver = within(await screen.findByRole('region', { name: 'Silver Ag' }));
    expect(silver.getByText('per oz t').parentElement).toHaveTextContent(/50\.12 per oz t/);
  });

  it('says which metal is stale, set aside or missing', async () => {
    openPage('/quotes');
    serve(
      buildQuotes({
        state: 'partly',
        quotes: [
          { ...buildQuote('Au', '4182.40'), isQuarantined: true },
          { ...buildQuote('Ag', '50.12'), isFresh: false },
          buildQuote('Pt', '1611.00'),
        ],
      }),
    );
    expect(await screen.findByText('Some quotes are stale')).toBeVisible();
    expect(screen.getByRole('region', { name: 'Gold Au' })).toHaveTextContent(
      /set aside until it is confirmed/,
    );
    expect(screen.getByRole('region', { name: 'Silver Ag' })).toHaveTextContent(/Stale: too old/);
    expect(screen.getByRole('region', { name: 'Palladium Pd' })).toHaveTextContent(
      'No quote has been accepted yet',
    );
  });

  it('says until when the market is closed', async () => {
    openPage('/quotes');
    serve(buildQuotes({ state: 'closed', marketUntil: '2026-12-02T23:00:00.000Z' }));
    expect((await screen.findByText('The market is closed')).parentElement).toHaveTextContent(
      /opens again Wed 2 Dec, 23:00 UTC/,
    );
  });
});
