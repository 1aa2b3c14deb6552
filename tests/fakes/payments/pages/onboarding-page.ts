import express from 'express';
import type { Router } from 'express';
import { isKnownBank, payingBank } from '../banks.ts';
import { lookUp, mustFind, newId, now } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { completeOnboarding } from '../resources/account-state.ts';
import { errorSummary, escapeHtml, page, textField } from './layout.ts';
import type { FieldError } from './layout.ts';

interface Form {
  name: string;
  bank: string;
}

const banks = [
  [payingBank, 'pays out'],
  ['000111111116', 'payouts fail: no such account'],
  ['000111111113', 'payouts fail: account closed'],
] as const;

function formPage(visit: string, form: Form, errors: FieldError[], refreshUrl: string): string {
  const bankError = errors.find((error) => error.field === 'bank');
  const options = banks
    .map(([number, does]) => {
      const selected = form.bank === number ? ' selected' : '';
      return `<option value="${number}"${selected}>${number} (${does})</option>`;
    })
    .join('');
  const body = `${errorSummary(errors)}
<h1>Where your payouts go</h1>
<p>The marketplace asks for your name and a bank account before you can receive money.</p>
<form method="post" action="/connect/visit/${visit}" novalidate>
${textField({
  name: 'name',
  label: 'Your name',
  hint: 'Any name will do here',
  value: form.name,
  attributes: 'autocomplete="name" maxlength="100" required',
  errors,
})}
<label for="bank">Test bank account</label>
<p class="hint" id="bank-hint">Published test numbers; each shows another ending of a payout</p>
${bankError ? `<p class="error" id="bank-error">${escapeHtml(bankError.message)}</p>` : ''}
<select id="bank" name="bank" aria-describedby="bank-hint${bankError ? ' bank-error' : ''}"${bankError ? ' aria-invalid="true"' : ''}>${options}</select>
<button type="submit">Save and return</button>
<a class="button plain" href="${escapeHtml(refreshUrl)}">Start again</a>
</form>`;
  return page(`${errors.length > 0 ? 'Error: ' : ''}Payout account`, body);
}

function read(body: unknown, key: string): string {
  const value =
    typeof body === 'object' && body !== null ? (body as Record<string, unknown>)[key] : undefined;
  return typeof value === 'string' ? value.trim().slice(0, 100) : '';
}

const missing = page('Not found', '<h1>There is no such page</h1><p>The link is not one of ours.</p>');

/** The hosted form behind an account link. A link opens it once; the visit then survives a reload. */
export function onboardingPages(fake: Fake): Router {
  const router = express.Router();
  const linkOf = (visit: string) => {
    const token = Object.hasOwn(fake.state.onboardingVisits, visit) ? fake.state.onboardingVisits[visit] : '';
    return token ? (fake.state.accountLinks[token] ?? null) : null;
  };

  router.get('/connect/visit/:visit', (request, response) => {
    const link = linkOf(request.params.visit);
    if (!link) return void response.status(404).type('html').send(missing);
    const form = { name: '', bank: payingBank };
    response.type('html').send(formPage(request.params.visit, form, [], link.refreshUrl));
  });

  router.post(
    '/connect/visit/:visit',
    express.urlencoded({ extended: false, limit: '8kb' }),
    async (request, response) => {
      const visit = request.params.visit as string;
      const link = linkOf(visit);
      if (!link) return void response.status(404).type('html').send(missing);
      const form = { name: read(request.body, 'name'), bank: read(request.body, 'bank') };
      const errors: FieldError[] = [];
      if (form.name === '') errors.push({ field: 'name', message: 'Enter your name' });
      if (!isKnownBank(form.bank)) errors.push({ field: 'bank', message: 'Choose one of the test accounts' });
      if (errors.length > 0) {
        return void response
          .status(422)
          .type('html')
          .send(formPage(visit, form, errors, link.refreshUrl));
      }
      const account = mustFind(fake, 'account', link.account);
      completeOnboarding(fake, account, { name: form.name, bankNumber: form.bank });
      delete fake.state.onboardingVisits[visit];
      await fake.store.flushed();
      response.redirect(303, link.returnUrl);
    },
  );

  router.get('/connect/account/:id', (request, response) => {
    const account = lookUp(fake, 'account', request.params.id);
    if (!account) return void response.status(404).type('html').send(missing);
    const state = account.payouts_enabled ? 'Payouts are enabled.' : 'Payouts are not enabled.';
    response.type('html').send(page('Your account', `<h1>Your account</h1><p>${state}</p>`));
  });

  router.get('/connect/:token', async (request, response) => {
    const token = request.params.token;
    const link = Object.hasOwn(fake.state.accountLinks, token) ? fake.state.accountLinks[token] : undefined;
    if (!link) return void response.status(404).type('html').send(missing);
    if (link.used || link.expiresAt <= now(fake)) return response.redirect(303, link.refreshUrl);
    link.used = true;
    const visit = newId('vst', 32);
    fake.state.onboardingVisits[visit] = token;
    fake.store.touch();
    await fake.store.flushed();
    response.redirect(303, `/connect/visit/${visit}`);
  });
  return router;
}
