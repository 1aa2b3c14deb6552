import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';
import { fillSignIn, openPayouts, signIn, signUp } from './helpers/accounts.ts';
import { useBrowser } from './helpers/browser.ts';
import { lotCode } from './helpers/database.ts';
import { addPhotos, describeKind, startDraft, typeAssay, typeMass, typeTerms } from './helpers/lot-form.ts';
import { keepPicture } from './helpers/pictures.ts';
import { agree, delivery, fillPurchase } from './helpers/purchase-page.ts';
import { soon } from './helpers/soon.ts';

const run = Date.now().toString(36);
const drawing =
  '<svg xmlns="http://www.w3.org/2000/svg" width="10" height="10"><path d="M0 0h10v10z"/></svg>';

const people = useBrowser();

describe('a lot that is not right yet', () => {
  let bench: Page;
  const mass = () => bench.getByRole('textbox', { name: 'Gross mass' });

  beforeAll(async () => {
    bench = await people.newVisitor();
    await signUp(bench, {
      email: `wilmot.${run}@bench.example`,
      password: 'a slow careful pour',
      name: 'Wilmot Dray',
      region: 'Kestle',
    });
    await openPayouts(bench, 'Wilmot Dray');
    await startDraft(bench);
  });

  it('says at the field that a comma leaves two readings open, and keeps what was typed', async () => {
    await typeMass(bench, '1,234');
    await mass().blur();
    await soon(() => mass().getAttribute('aria-invalid')).toBe('true');
    const tied = (await mass().getAttribute('aria-describedby'))!.split(' ');
    const said = await Promise.all(tied.map((id) => bench.locator(`[id="${id}"]`).innerText()));
    expect(said.join(' ')).toMatch(/1234|1\.234|comma/);
    expect(await mass().inputValue()).toBe('1,234');
    await typeMass(bench, '12,34');
    await mass().blur();
    await soon(() => mass().getAttribute('aria-invalid')).toBe(null);
  });

  it('refuses a drawing that calls itself a photo, with a reason, and takes the next one', async () => {
    await bench
      .getByLabel('Photos to add')
      .setInputFiles({ name: 'button.jpg', mimeType: 'image/jpeg', buffer: Buffer.from(drawing) });
    const refusal = bench.getByRole('alert').filter({ hasText: 'button.jpg' });
    await refusal.waitFor();
    await keepPicture(bench, '30-photo-refused');
    await bench.getByRole('button', { name: 'Leave button.jpg out' }).click();
    await soon(() => refusal.count()).toBe(0);
    await addPhotos(bench, ['from-the-side']);
  });

  it('shows all that is missing at once, leads to each field, and loses nothing', async () => {
    await describeKind(bench, `Unfinished button ${run}`);
    await typeAssay(bench, '1000.1', '0.5');
    await typeTerms(bench, '900.00', '20.00');
    await bench.getByRole('button', { name: 'Hand the lot to the desk' }).click();
    const summary = bench.getByRole('alert').filter({ hasText: /need another look/ });
    await summary.waitFor();
    await soon(() => bench.title()).toMatch(/^Error: /);
    const links = summary.getByRole('link');
    expect(await links.count()).toBeGreaterThan(4);
    await keepPicture(bench, '31-all-that-is-missing');
    const ids = await links.evaluateAll((all) => all.map((link) => link.getAttribute('href')!.slice(1)));
    for (const [index, id] of ids.entries()) {
      await links.nth(index).click();
      expect(await bench.evaluate(() => document.activeElement?.id), `the link to ${id}`).toBe(id);
    }
    await bench.getByRole('button', { name: 'Save the draft' }).click();
    await bench.getByText(/^saved/).waitFor();
    await bench.reload();
    expect(await mass().inputValue()).toBe('12,34');
    expect(await bench.getByRole('textbox', { name: 'Title' }).inputValue()).toBe(`Unfinished button ${run}`);
    await soon(() =>
      bench.getByRole('list', { name: 'Photos of the lot' }).getByRole('listitem').count(),
    ).toBe(1);
  });
});

describe('a purchase that is refused', () => {
  const title = 'Gold grain, drawn sample';

  it('tells the second buyer that another was first', async () => {
    const first = await people.newVisitor();
    const second = await people.newVisitor();
    const address = `/lots/${await lotCode(title)}/buy`;
    await signIn(first, 'hale', address);
    await signIn(second, 'bruna', address);
    await fillPurchase(first);
    await fillPurchase(second);
    await agree(first).click();
    await first.getByRole('heading', { name: /^Pay / }).waitFor();
    await agree(second).click();
    await second.getByRole('alert').filter({ hasText: 'Another buyer was first' }).waitFor();
    await keepPicture(second, '32-another-was-first');
    expect(await second.getByText('Nothing was bought and nothing is owed.').isVisible()).toBe(true);
  });

  it('keeps every field when the server refuses, also across signing in again', async () => {
    const buyer = await people.newVisitor();
    const address = `/lots/${await lotCode('Small gold button, first try')}/buy`;
    await signIn(buyer, 'bruna', address);
    await fillPurchase(buyer);
    await buyer.context().clearCookies();
    await agree(buyer).click();
    await buyer.getByRole('alert').first().waitFor();
    await keepPicture(buyer, '33-refused-keeps-fields');
    await buyer.getByRole('link', { name: 'Sign in and come back' }).click();
    await fillSignIn(buyer, 'bruna');
    await soon(() => buyer.getByRole('textbox', { name: 'Street and number' }).inputValue()).toBe(
      delivery.street,
    );
    expect(await buyer.getByRole('checkbox', { name: 'I am 18 or older.' }).isChecked()).toBe(true);
  });
});
