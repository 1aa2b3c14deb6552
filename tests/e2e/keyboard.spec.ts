import type { Page } from 'playwright-core';
import { describe, expect, inject, it } from 'vitest';
import { signIn } from './helpers/accounts.ts';
import { useBrowser } from './helpers/browser.ts';
import { tabTo, typeInto } from './helpers/by-keyboard.ts';
import { delivery } from './helpers/purchase-page.ts';

const people = useBrowser();

/** After a change of page inside the client the focus stands at the new heading; Tab goes on from there. */
const arrive = (page: Page, title: string | RegExp) =>
  page.getByRole('heading', { name: title, level: 1 }).and(page.locator(':focus')).waitFor();

describe('the keyboard alone', () => {
  it('is enough to find a lot, agree, pay and come back', async () => {
    const page = await people.newVisitor();
    await signIn(page, 'bruna', '/lots');
    await arrive(page, 'Register of lots');
    await tabTo(page, page.getByRole('link', { name: 'Cast bar, hand-poured' }), 90);
    await page.keyboard.press('Enter');
    await arrive(page, 'Cast bar, hand-poured');
    await tabTo(page, page.getByRole('link', { name: /^Buy: US\$/ }));
    await page.keyboard.press('Enter');
    await arrive(page, /^Buy: /);

    const field = (name: string) => page.getByRole('textbox', { name });
    await typeInto(page, field('Name of who receives it'), delivery.name);
    await typeInto(page, field('Street and number'), delivery.street);
    await typeInto(page, field('Postcode'), delivery.postcode);
    await typeInto(page, field('Town'), delivery.town);
    await typeInto(page, field('Region or state'), delivery.region);
    await typeInto(page, page.getByLabel('Country'), 'United S');
    expect(await page.getByLabel('Country').inputValue()).toBe('US');
    await typeInto(page, field('Telephone'), delivery.telephone);
    for (const name of ['I am 18 or older.', /^I buy at the stated assay/]) {
      const box = page.getByRole('checkbox', { name });
      await tabTo(page, box);
      await page.keyboard.press('Space');
      expect(await box.isChecked()).toBe(true);
    }
    await tabTo(page, page.getByRole('button', { name: /^Agree, and pay/ }));
    await page.keyboard.press('Enter');

    await page.getByRole('heading', { name: /^Pay / }).waitFor();
    expect(page.url()).toContain(inject('paymentsUrl'));
    await typeInto(page, page.getByLabel('Card number'), '4242424242424242');
    await typeInto(page, page.getByLabel('Expires'), '12/34');
    await typeInto(page, page.getByLabel('Security code'), '123');
    await page.keyboard.press('Enter');

    await page.getByText(/is held in escrow$/).waitFor();
    await tabTo(page, page.getByRole('link', { name: 'Open the deal' }));
    await page.keyboard.press('Enter');
    await arrive(page, /Cast bar, hand-poured/);
  });

  it('goes straight to the page past the header, and round the whole of it without a trap', async () => {
    const page = await people.newVisitor();
    await page.goto('/worth');
    await page.getByRole('heading', { level: 1 }).waitFor();
    const skip = page.getByRole('link', { name: 'Skip to the page' });
    await tabTo(page, skip, 1);
    await page.keyboard.press('Enter');
    await tabTo(page, page.locator('main input, main select, main button, main a').first(), 1);
    await tabTo(page, skip, 120);
  });
});
