import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { valuate, type ValuationRequest } from '#shared/settlement/valuation.ts';
import { buildQuotes } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

afterEach(() => vi.restoreAllMocks());

/** Answers as the API does, by the engine that both sides share, and keeps what was sent. */
function serveValuations() {
  const sent: ValuationRequest[] = [];
  const current = buildQuotes().quotes.map((quote) => ({ ...quote }));
  apiServer.use(
    http.post('/api/v1/valuations', async ({ request }) => {
      const body = (await request.json()) as ValuationRequest;
      sent.push(body);
      try {
        return HttpResponse.json(valuate(body, current));
      } catch (error) {
        if (!(error instanceof MeasureError)) throw error;
        const errors = error.issues.map(({ field, code, message }) => ({ pointer: field, code, message }));
        return HttpResponse.json({ code: 'invalid-input', detail: error.message, errors }, { status: 422 });
      }
    }),
  );
  return sent;
}

async function fill(mass: string, fineness: string) {
  await userEvent.type(await screen.findByLabelText('Mass'), mass);
  await userEvent.type(screen.getByLabelText('Fineness'), fineness);
}
const reckon = () => userEvent.click(screen.getByRole('button', { name: 'Reckon its worth' }));

describe('what is it worth', () => {
  it('values mass and fineness at a quote of one’s own, without an account', async () => {
    const sent = serveValuations();
    openPage('/worth');
    await fill('12,34', '916,7');
    await userEvent.type(screen.getByLabelText(/^Balance reads to/), '0.01');
    await userEvent.type(screen.getByLabelText(/^Give or take/), '0.5');
    const quote = screen.getByLabelText(/^Quote for fine metal/);
    expect(quote).toHaveValue('4182.40');
    await userEvent.clear(quote);
    await userEvent.type(quote, '2000.00');
    await reckon();
    const result = within(await screen.findByRole('region', { name: 'The metal in it is worth' }));
    expect(sent[0]).toEqual({
      mass: { value: '12.34', unit: 'g' },
      readability: { value: '0.01', unit: 'g' },
      contents: [
        {
          metal: 'Au',
          fineness: { value: '916.7', unit: 'permille' },
          uncertainty: { value: '0.5', unit: 'permille' },
        },
      ],
      quotes: { Au: '2000.00' },
    });
    expect(result.getAllByText(/727\.38$/)[0]).toBeVisible();
    expect(result.getByText(/726\.86/)).toBeVisible();
    expect(result.getByText(/727\.90/)).toBeVisible();
    expect(result.getByText(/your own quote/)).toBeVisible();
    expect(screen.getByRole('heading', { name: 'The metal in it is worth' })).toHaveFocus();
  });

  it('leaves the accepted quote to the server and lists what was assumed', async () => {
    const sent = serveValuations();
    openPage('/worth');
    await fill('10.0', '14');
    await userEvent.selectOptions(screen.getByLabelText('In'), 'karat');
    await reckon();
    expect(await screen.findByText('Gold, 14 karat')).toBeVisible();
    expect(sent[0]!.quotes).toEqual({});
    expect(screen.getByText(/How finely the balance reads/)).toHaveTextContent('0.1 g');
    expect(screen.getByText(/How sure the fineness of the gold is/)).toHaveTextContent('5 ‰');
    expect(screen.getByText('10.0 g × 14 ÷ 24 = 5.833333 g fine')).toBeInTheDocument();
  });

  it('refuses at the field what could be read in two ways, and sends nothing', async () => {
    const sent = serveValuations();
    openPage('/worth');
    await fill('1,234', '999');
    await reckon();
    expect(await screen.findByText('One thing needs another look')).toBeVisible();
    expect(screen.getByLabelText('Mass')).toBeInvalid();
    expect(screen.getByLabelText('Mass')).toHaveAccessibleDescription(/Is 1,234 1\.234 or 1234\?/);
    expect(document.title).toMatch(/^Error: What is it worth/);
    expect(sent).toEqual([]);
  });

  it.each([
    ['0', '999', 'Mass', /above 0/],
    ['-5', '999', 'Mass', /above 0/],
    ['1000000000', '999', 'Mass', /at most 1000 kg/],
    ['1.123456789012345', '999', 'Mass', /at most 6 digits/],
    ['10', '0', 'Fineness', /above zero/],
    ['10', '1000.1', 'Fineness', /Pure metal is 1000 ‰/],
  ])('tells at its field why %s g of %s ‰ is refused', async (mass, fineness, label, message) => {
    serveValuations();
    openPage('/worth');
    await fill(mass, fineness);
    await reckon();
    await waitFor(() => expect(screen.getByLabelText(label)).toBeInvalid());
    expect(screen.getByLabelText(label)).toHaveAccessibleDescription(message);
    expect(screen.getByLabelText('Mass')).toHaveValue(mass);
  });

  it('tells in the summary what belongs to no single field', async () => {
    serveValuations();
    openPage('/worth');
    await fill('10', '900');
    await userEvent.click(screen.getByRole('button', { name: 'There is another metal in it' }));
    await userEvent.type(screen.getAllByLabelText('Fineness')[1]!, '200');
    await reckon();
    expect(await screen.findByRole('alert')).toHaveTextContent(/more than 1000 ‰/);
  });
});
