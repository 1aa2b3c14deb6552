import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { expect, inject } from 'vitest';

/** The password that all accounts of the demo share in this data folder. */
export function demoPassword(): string {
  const { password } = JSON.parse(readFileSync(inject('demoAccountsFile'), 'utf8')) as { password: string };
  return password;
}

/** Fills in the form of the page that is open and sends it. */
export async function fillSignIn(page: Page, who: string): Promise<void> {
  await page.getByRole('textbox', { name: 'E-mail' }).fill(`${who}@scruple.example`);
  await page.getByLabel('Password').fill(demoPassword());
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** Signs in on the page and goes on to `next`. */
export async function signIn(page: Page, who: string, next = '/'): Promise<void> {
  await page.goto(`/sign-in?next=${encodeURIComponent(next)}`);
  await fillSignIn(page, who);
  await page.waitForURL((url) => url.pathname + url.search === next);
}

export type Newcomer = { email: string; password: string; name: string; region: string };

/** Makes an account by the form; the browser is signed in afterwards. */
export async function signUp(page: Page, { email, password, name, region }: Newcomer): Promise<void> {
  await page.goto('/');
  await page.getByRole('link', { name: 'Sign in' }).first().click();
  await page.getByRole('link', { name: 'Sign up' }).click();
  // The page before has fields of the same names.
  await page.getByRole('heading', { name: 'Sign up', level: 1 }).waitFor();
  await page.getByRole('textbox', { name: 'E-mail' }).fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('textbox', { name: 'Name' }).fill(name);
  await page.getByRole('textbox', { name: 'Region' }).fill(region);
  await page.getByRole('checkbox', { name: 'I am 18 or older' }).check();
  await page.getByRole('button', { name: 'Make the account' }).click();
  await page.waitForURL((url) => url.pathname === '/');
}

/** Opens payouts on the provider's own page and comes back with its word. */
export async function openPayouts(page: Page, name: string): Promise<void> {
  await page.goto('/account');
  await page.getByRole('button', { name: 'Open payouts at the provider' }).click();
  await page.getByRole('heading', { name: 'Where your payouts go' }).waitFor();
  expect(page.url()).toContain(inject('paymentsUrl'));
  await page.getByLabel('Your name').fill(name);
  await page.getByRole('button', { name: 'Save and return' }).click();
  await page.getByText('The provider says: payouts are open').waitFor();
}
