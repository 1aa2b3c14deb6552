import type { Page } from 'playwright-core';

export const delivery = {
  name: 'Petra Lindqvist',
  street: '8 Fuller’s Row',
  postcode: '40131',
  town: 'Marrow Point',
  region: 'Lower Vale',
  telephone: '+1 555 010 7733',
} as const;

/** Fills in where the parcel goes, and confirms. */
export async function fillPurchase(page: Page): Promise<void> {
  await page.getByRole('textbox', { name: 'Name of who receives it' }).fill(delivery.name);
  await page.getByRole('textbox', { name: 'Street and number' }).fill(delivery.street);
  await page.getByRole('textbox', { name: 'Postcode' }).fill(delivery.postcode);
  await page.getByRole('textbox', { name: 'Town' }).fill(delivery.town);
  await page.getByRole('textbox', { name: 'Region or state' }).fill(delivery.region);
  await page.getByLabel('Country').selectOption('US');
  await page.getByRole('textbox', { name: 'Telephone' }).fill(delivery.telephone);
  await page.getByRole('checkbox', { name: 'I am 18 or older.' }).check();
  await page.getByRole('checkbox', { name: /I buy at the stated assay/ }).check();
}

export const agree = (page: Page) => page.getByRole('button', { name: /^Agree, and pay/ });

/** The provider's page: one try with a card. */
export async function payByCard(page: Page, number: string): Promise<void> {
  await page.getByLabel('Card number').fill(number);
  await page.getByLabel('Expires').fill('12/34');
  await page.getByLabel('Security code').fill('123');
  await page.getByRole('button', { name: /^Pay US\$|^Pay \$|^Pay / }).click();
}
