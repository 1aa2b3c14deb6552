import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { leaveTo } from '../../../lib/leave-to.ts';
import { buildLot, buildMember } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

vi.mock('../../../lib/leave-to.ts', () => ({ leaveTo: vi.fn() }));
beforeEach(() => vi.mocked(leaveTo).mockReset());
afterEach(() => vi.restoreAllMocks());

const HERE = '/lots/S-2K7F0A/buy';
type Sent = { key: string | null; body: unknown };

function serveLot(lot: () => LotAnswer) {
  apiServer.use(http.get('/api/v1/lots/S-2K7F0A', () => HttpResponse.json(lot())));
}

/** Answers purchases one after the other, the last for good, and keeps what was sent. */
function servePurchase(...answers: (() => Response)[]) {
  const sent: Sent[] = [];
  apiServer.use(
    http.post('/api/v1/lots/S-2K7F0A/purchase', async ({ request }) => {
      sent.push({ key: request.headers.get('idempotency-key'), body: await request.json() });
      return (answers[sent.length - 1] ?? answers.at(-1))!();
    }),
  );
  return sent;
}

function servePayment(...answers: (() => Response)[]) {
  const keys: (string | null)[] = [];
  apiServer.use(
    http.post('/api/v1/deals/D-81QX00/payment', ({ request }) => {
      keys.push(request.headers.get('idempotency-key'));
      return (answers[keys.length - 1] ?? answers.at(-1))!();
    }),
  );
  return keys;
}

const refuse =
  (status: number, code: string, detail: string, errors: object[] = []) =>
  () =>
    HttpResponse.json({ code, title: detail, detail, errors }, { status });
const agreed = () =>
  HttpResponse.json({ code: 'D-81QX00', total: { currency: 'USD', amount: '4121.35' } }, { status: 201 });
const paymentPage = () =>
  HttpResponse.json({ url: 'http://pay.example/c/1', expiresAt: '2026-12-01T14:40:00.000Z' });

/** Types the whole form by keyboard and presses the button by Enter. */
async function fillByKeyboard() {
  const user = userEvent.setup();
  (await screen.findByLabelText('Name of who receives it')).focus();
  await user.keyboard('Orla Venn{Tab}7 Kiln Lane{Tab}{Tab}K-204{Tab}Kestle{Tab}North{Tab}');
  await user.selectOptions(screen.getByLabelText('Country'), 'Canada');
  await user.keyboard('{Tab}+1 555 010 0199{Tab} {Tab} {Tab}');
  expect(screen.getByRole('button', { name: /^Agree, and pay/ })).toHaveFocus();
  await user.keyboard('{Enter}');
  return user;
}

describe('a purchase', () => {
  it('restates the sum and the seller, agrees, and leaves for the payment page, by keyboard alone', async () => {
    serveLot(buildLot);
    const sent = servePurchase(agreed);
    servePayment(paymentPage);
    openPage(HERE, buildMember());
    expect(await screen.findByText('a member in Harrow Vale')).toBeVisible();
    await fillByKeyboard();
    await waitFor(() => expect(leaveTo).toHaveBeenCalledWith('http://pay.example/c/1'));
    expect(sent).toHaveLength(1);
    expect(sent[0]!.key).toMatch(/^[0-9a-f-]{32,36}$/);
    expect(sent[0]!.body).toEqual({
      total: '4121.35',
      confirmsAge: true,
      confirmsRules: true,
      delivery: {
        name: 'Orla Venn',
        line1: '7 Kiln Lane',
        line2: '',
        postcode: 'K-204',
        city: 'Kestle',
        region: 'North',
        country: 'CA',
        phone: '+1 555 010 0199',
      },
    });
  });

  it('says what is missing, at each field and in the summary, before anything is sent', async () => {
    serveLot(buildLot);
    const sent = servePurchase(agreed);
    openPage(HERE, buildMember());
    await userEvent.click(await screen.findByRole('button', { name: /^Agree/ }));
    expect(await screen.findByText('9 things need another look')).toBeVisible();
    expect(screen.getByLabelText('Country')).toHaveAccessibleDescription(/Choose the country/);
    expect(screen.getByLabelText('I am 18 or older.')).toBeInvalid();
    expect(document.title).toMatch(/^Error: /);
    await userEvent.click(screen.getByRole('link', { name: 'Write the postcode' }));
    expect(screen.getByLabelText('Postcode')).toHaveFocus();
    expect(sent).toEqual([]);
  });

  it('tells the buyer who came second, without a sum owed', async () => {
    let isTaken = false;
    const open = buildLot();
    serveLot(() => (isTaken ? { ...open, state: 'reserved', can: { ...open.can, buy: false } } : open));
    servePurchase(() => {
      isTaken = true;
      return refuse(409, 'lot-taken', 'Another buyer was first')();
    });
    openPage(HERE, buildMember());
    await fillByKeyboard();
    expect(await screen.findByRole('alert')).toHaveTextContent('Another buyer was first');
    expect(screen.getByRole('link', { name: 'Look at the other open lots' })).toHaveAttribute(
      'href',
      '/lots',
    );
    expect(screen.queryByRole('button', { name: /^Agree/ })).toBeNull();
    expect(leaveTo).not.toHaveBeenCalled();
  });

  it('shows a new total and buys at it only when asked again, as another purchase', async () => {
    let price = '4093.35';
    serveLot(() => buildLot({ price: { currency: 'USD', amount: price } }));
    const sent = servePurchase(() => {
      price = '4100.00';
      return refuse(409, 'price-changed', 'Price or parcel charge have changed')();
    }, agreed);
    servePayment(paymentPage);
    openPage(HERE, buildMember());
    const user = await fillByKeyboard();
    const alert = await screen.findByRole('alert');
    expect(alert).toHaveTextContent(/It was US\$\s4,121.35 and is now US\$\s4,128.00/);
    expect(screen.getByLabelText('Postcode')).toHaveValue('K-204');
    await user.click(screen.getByRole('button', { name: /^Agree, and pay US\$\s4,128.00/ }));
    await waitFor(() => expect(leaveTo).toHaveBeenCalledOnce());
    expect(sent[1]!.body).toMatchObject({ total: '4128.00' });
    expect(sent[1]!.key).not.toBe(sent[0]!.key);
  });

  it('puts a destination that is not served at its field', async () => {
    serveLot(buildLot);
    servePurchase(
      refuse(422, 'destination-not-served', 'The seller does not ship there', [
        {
          pointer: '/delivery/country',
          code: 'destination-not-served',
          message: 'The seller does not ship there',
        },
      ]),
    );
    openPage(HERE, buildMember());
    await fillByKeyboard();
    await screen.findByText('One thing needs another look');
    expect(screen.getByLabelText('Country')).toHaveAccessibleDescription(/The seller does not ship there/);
    expect(screen.getByLabelText('Name of who receives it')).toHaveValue('Orla Venn');
  });

  it('sends the same key again when no answer came', async () => {
    serveLot(buildLot);
    const sent = servePurchase(() => HttpResponse.error(), agreed);
    servePayment(paymentPage);
    openPage(HERE, buildMember());
    const user = await fillByKeyboard();
    expect(await screen.findByText('No answer came')).toBeVisible();
    await user.click(screen.getByRole('button', { name: /^Agree/ }));
    await waitFor(() => expect(leaveTo).toHaveBeenCalledOnce());
    expect(sent).toHaveLength(2);
    expect(sent[1]!.key).toBe(sent[0]!.key);
  });

  it('keeps the deal when the payment page does not open, and asks for it again without a second purchase', async () => {
    serveLot(buildLot);
    const sent = servePurchase(agreed);
    const keys = servePayment(
      refuse(503, 'payment-provider-unavailable', 'The payment provider does not answer'),
      paymentPage,
    );
    openPage(HERE, buildMember());
    const user = await fillByKeyboard();
    expect(await screen.findByText('The payment page did not open')).toBeVisible();
    expect(screen.getByRole('link', { name: 'Open the deal' })).toHaveAttribute('href', '/deals/D-81QX00');
    await user.click(screen.getByRole('button', { name: /^Pay US\$\s4,121.35 into escrow/ }));
    await waitFor(() => expect(leaveTo).toHaveBeenCalledOnce());
    expect(sent).toHaveLength(1);
    expect(keys).toHaveLength(2);
    expect(keys[1]).toBe(keys[0]);
  });

  it('says beside the share of melt that there is no fresh quote', async () => {
    serveLot(() => buildLot({ quoteState: 'stale' }));
    openPage(HERE, buildMember());
    expect(await screen.findByText(/There is no fresh quote: the share of melt rests/)).toBeVisible();
  });

  it('sends a visitor to sign in, and back here afterwards', async () => {
    const router = openPage(HERE);
    await waitFor(() => expect(router.state.location.pathname).toBe('/sign-in'));
    expect(router.state.location.search).toBe('?next=%2Flots%2FS-2K7F0A%2Fbuy');
  });

  it('does not offer an own lot', async () => {
    serveLot(() => buildLot({ isMine: true, can: { ...buildLot().can, buy: false } }));
    openPage(HERE, buildMember());
    expect(await screen.findByText('This lot is your own')).toBeVisible();
    expect(screen.queryByRole('button', { name: /^Agree/ })).toBeNull();
  });
});
