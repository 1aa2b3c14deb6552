import type { Locator, Page } from 'playwright-core';
import { newPhoto, newReport, type ReportFacts } from './evidence.ts';

const part = (page: Page, name: string): Locator => page.getByRole('region', { name, exact: true });

/** Opens a new draft and answers its code. */
export async function startDraft(page: Page): Promise<string> {
  await page.goto('/sell');
  await page.getByRole('button', { name: 'Describe a new lot' }).first().click();
  await page.waitForURL(/\/sell\/S-/);
  return page.url().split('/').at(-1)!;
}

export async function describeKind(page: Page, title: string): Promise<void> {
  const kind = part(page, 'What it is');
  await kind.getByRole('radio', { name: 'Button' }).check();
  await kind.getByRole('textbox', { name: 'Title' }).fill(title);
  await kind
    .getByRole('textbox', { name: 'Description' })
    .fill('One melt of sorted findings, parted and melted again. Dull top, clean underside.');
}

export async function typeMass(page: Page, mass: string): Promise<void> {
  await part(page, 'Mass').getByRole('textbox', { name: 'Gross mass' }).fill(mass);
}

export async function typeAssay(page: Page, permille: string, uncertainty: string): Promise<void> {
  const assay = part(page, 'Assay');
  await assay.getByLabel('Metal', { exact: true }).selectOption('Au');
  await assay.getByLabel('Method').selectOption('fire_assay');
  await assay.getByRole('textbox', { name: 'Fineness' }).fill(permille);
  await assay.getByRole('textbox', { name: 'Expanded uncertainty' }).fill(uncertainty);
}

export async function addPhotos(page: Page, names: readonly string[]): Promise<void> {
  const files = await Promise.all(names.map(newPhoto));
  await page.getByLabel('Photos to add').setInputFiles(files);
  await page
    .getByRole('list', { name: 'Photos of the lot' })
    .getByRole('listitem')
    .nth(names.length - 1)
    .waitFor();
}

export async function addCertificate(page: Page, facts: ReportFacts): Promise<void> {
  const report = part(page, 'Certificate');
  await page.getByLabel('Certificate document').setInputFiles(await newReport(facts));
  await report.getByText(`${facts.number}.pdf`).waitFor();
  const laboratory = report.getByLabel('Laboratory', { exact: true });
  await laboratory.selectOption({ label: facts.laboratory });
  await report.getByRole('textbox', { name: 'Report number' }).fill(facts.number);
  await report.getByLabel('Issued on').fill(facts.issuedOn);
  await report.getByLabel('Who took the sample').selectOption('laboratory');
  await report.getByRole('button', { name: 'Same mass as the lot' }).click();
  await report.getByRole('textbox', { name: 'Mark on the report' }).fill(facts.mark);
  await report.getByRole('button', { name: 'Same results as the lot' }).click();
}

export async function typePrice(page: Page, price: string): Promise<void> {
  await part(page, 'Price, parcel and time').getByRole('textbox', { name: 'Price of the metal' }).fill(price);
}

export async function typeTerms(page: Page, price: string, shipping: string): Promise<void> {
  const terms = part(page, 'Price, parcel and time');
  await typePrice(page, price);
  await terms.getByRole('textbox', { name: 'Insured parcel' }).fill(shipping);
  await terms.getByRole('checkbox', { name: 'United States' }).check();
}

export async function confirmAll(page: Page): Promise<void> {
  const cautions = part(page, 'Cautions and title');
  await cautions.getByRole('checkbox', { name: /I have read the cautions/ }).check();
  await cautions.getByRole('checkbox', { name: /The metal is mine to sell/ }).check();
}

/** What stands beside the form: the sheet, the rule, what the seller gets. */
export const liveSheet = (page: Page): Locator => part(page, 'What it comes to');

export async function handIn(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Hand the lot to the desk' }).click();
  await page.getByRole('button', { name: 'Hand it to the desk' }).click();
}
