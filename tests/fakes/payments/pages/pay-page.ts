import type Stripe from 'stripe';
import express from 'express';
import type { Response, Router } from 'express';
import { lookUp, wallNow } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { paySession } from '../resources/pay-session.ts';
import type { PayResult } from '../resources/pay-session.ts';
import { dollars, errorSummary, escapeHtml, page, textField } from './layout.ts';
import type { FieldError } from './layout.ts';
import { checkPayForm, emptyPayForm, readPayForm } from './pay-form.ts';
import type { PayForm } from './pay-form.ts';

function withSessionId(url: string, id: string): string {
  return url.replaceAll('{CHECKOUT_SESSION_ID}', id);
}

function itemRows(fake: Fake, session: Stripe.Checkout.Session): string {
  const items = fake.state.sessionDetails[session.id]?.items ?? [];
  return items
    .map((item) => {
      const count = (item.quantity ?? 1) > 1 ? `${item.quantity} × ` : '';
      const what = escapeHtml(item.description ?? '');
      return `<tr><th scope="row">${count}${what}</th><td class="figure">${dollars(item.amount_total)}</td></tr>`;
    })
    .join('');
}

function payPage(fake: Fake, session: Stripe.Checkout.Session, form: PayForm, errors: FieldError[]): string {
  const total = dollars(session.amount_total ?? 0);
  const fields = [
    textField({
      name: 'number',
      label: 'Card number',
      hint: 'A published test number: 4242 4242 4242 4242 pays, 4000 0000 0000 0002 is declined',
      value: form.number,
      attributes: 'inputmode="numeric" autocomplete="cc-number" maxlength="30" required',
      errors,
    }),
    textField({
      name: 'expiry',
      label: 'Expires',
      hint: 'Month and year, like 12/34',
      value: form.expiry,
      attributes: 'class="short" autocomplete="cc-exp" maxlength="9" required',
      errors,
    }),
    textField({
      name: 'cvc',
      label: 'Security code',
      hint: 'Any 3 digits',
      value: form.cvc,
      attributes: 'class="short" inputmode="numeric" autocomplete="cc-csc" maxlength="4" required',
      errors,
    }),
    textField({
      name: 'name',
      label: 'Name on the card (optional)',
      hint: '',
      value: form.name,
      attributes: 'autocomplete="cc-name" maxlength="100"',
      errors,
    }),
  ].join('\n');
  const back = session.cancel_url
    ? `<a class="button plain" href="${escapeHtml(withSessionId(session.cancel_url, session.id))}">Go back without paying</a>`
    : '';
  const body = `${errorSummary(errors)}
<h1>Pay ${total}</h1>
<table><caption>What this payment is for</caption>
<thead><tr><th scope="col">Item</th><th scope="col" class="figure">Amount</th></tr></thead>
<tbody>${itemRows(fake, session)}</tbody>
<tfoot><tr><th scope="row">Total</th><td class="figure"><strong>${total}</strong></td></tr></tfoot></table>
<form method="post" action="/pay/${session.id}" novalidate>
${fields}
<button type="submit">Pay ${total}</button>
${back}
</form>`;
  return page(`${errors.length > 0 ? 'Error: ' : ''}Pay ${total}`, body);
}

function sendClosed(response: Response, session: Stripe.Checkout.Session | null): void {
  if (session?.status === 'complete' && session.success_url) {
    response.redirect(303, withSessionId(session.success_url, session.id));
    return;
  }
  const back = session?.cancel_url
    ? `<p><a class="button plain" href="${escapeHtml(withSessionId(session.cancel_url, session.id))}">Go back</a></p>`
    : '';
  const why = session
    ? 'This payment page has expired and nothing was charged.'
    : 'There is no such payment page.';
  response
    .status(session ? 410 : 404)
    .type('html')
    .send(page('Not open', `<h1>This page is not open</h1><p>${why}</p>${back}`));
}

function declineField(result: Extract<PayResult, { outcome: 'declined' }>): string {
  if (result.code === 'incorrect_cvc') return 'cvc';
  return result.code === 'expired_card' ? 'expiry' : 'number';
}

/** The hosted page on which a buyer pays a session. */
export function payPages(fake: Fake): Router {
  const router = express.Router();
  const open = (id: string) => lookUp(fake, 'checkout.session', id);

  router.get('/pay/:id', (request, response) => {
    const session = open(request.params.id);
    if (session?.status !== 'open') return sendClosed(response, session);
    response.type('html').send(payPage(fake, session, emptyPayForm, []));
  });

  router.post(
    '/pay/:id',
    express.urlencoded({ extended: false, limit: '8kb' }),
    async (request, response) => {
      const session = open(request.params.id as string);
      if (session?.status !== 'open') return sendClosed(response, session);
      const form = readPayForm(request.body);
      const checked = checkPayForm(form, wallNow());
      if ('errors' in checked) {
        response
          .status(422)
          .type('html')
          .send(payPage(fake, session, form, checked.errors));
        return;
      }
      const result = paySession(fake, session, checked.card);
      await fake.store.flushed();
      if (result.outcome !== 'declined') return sendClosed(response, session);
      const errors = [
        {
          field: declineField(result),
          message: `${result.message} Nothing was charged. Try again or use another card.`,
        },
      ];
      response
        .status(402)
        .type('html')
        .send(payPage(fake, session, form, errors));
    },
  );
  return router;
}
