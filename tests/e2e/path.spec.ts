import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, inject, it } from 'vitest';
import { openPayouts, signIn, signUp } from './helpers/accounts.ts';
import { useBrowser } from './helpers/browser.ts';
import { dayAgo } from './helpers/evidence.ts';
import { compareBooks, dealEntries } from './helpers/books.ts';
import {
  addCertificate,
  addPhotos,
  confirmAll,
  describeKind,
  handIn,
  liveSheet,
  startDraft,
  typeAssay,
  typeMass,
  typePrice,
  typeTerms,
} from './helpers/lot-form.ts';
import { download, openMail, wordsOfPdf } from './helpers/mailbox.ts';
import { keepPicture } from './helpers/pictures.ts';
import { agree, delivery, fillPurchase, payByCard } from './helpers/purchase-page.ts';
import { soon } from './helpers/soon.ts';

const run = Date.now().toString(36).toUpperCase();
const seller = {
  email: `mirren.${run.toLowerCase()}@bench.example`,
  password: 'slow fire, clean pour',
  name: 'Mirren Ash',
  region: 'Tarn Hollow',
};
const title = `Gold button, path ${run}`;
const report = {
  laboratory: 'Orrin Assay Rooms, Orrin',
  number: `OA-${run}`,
  mass: '31.204 g',
  mark: 'MA 31',
  permille: '999.2',
  issuedOn: dayAgo(11),
};
const tracking = `VP ${run}`;

/** What a card payment of 4,050.00 and 25.00 for the parcel comes to: 4 % commission on the price, and the provider's 2.9 % and 30 cents, which the house bears. */
const sums = { total: '4,075.00', commission: '162.00', payout: '3,913.00' };

const people = useBrowser();
let bench: Page;
let desk: Page;
let buyer: Page;
let lot = '';
let deal = '';

beforeAll(async () => {
  bench = await people.newVisitor();
  desk = await people.newVisitor();
  buyer = await people.newVisitor({ timezoneId: 'America/New_York' });
});

const ruleOf = (page: Page) => liveSheet(page).getByRole('img', { name: /% of melt/ });

describe('a button from the bench to the payout', () => {
  it('a newcomer signs up and opens payouts on the page of the provider', async () => {
    await signUp(bench, seller);
    await openPayouts(bench, seller.name);
    await keepPicture(bench, '01-payouts-open');
  });

  it('the seller describes the lot, and its worth follows what is typed', async () => {
    lot = await startDraft(bench);
    await describeKind(bench, title);
    await keepPicture(bench, '02-draft-begun');
    await typeMass(bench, '31.204');
    await typeAssay(bench, report.permille, '0.5');
    const sheet = liveSheet(bench);
    await sheet.getByText('Your sheet').waitFor();
    // 31.204 g × 999.2 ‰ = 31.1790368 g fine; a troy ounce is 31.1034768 g (the definition of the international pound).
    await soon(() => sheet.innerText()).toMatch(/1\.002429\soz t/);
    await typePrice(bench, '4000');
    const before = await ruleOf(bench).getAttribute('aria-label');
    await typeTerms(bench, '4050.00', '25.00');
    await soon(() => ruleOf(bench).getAttribute('aria-label')).not.toBe(before);
    await soon(() => sheet.innerText()).toContain(sums.payout);
    await addPhotos(bench, ['from-above', 'underside']);
    await addCertificate(bench, report);
    await confirmAll(bench);
    await keepPicture(bench, '03-draft-full');
    await handIn(bench);
    await bench.getByRole('link', { name: 'All lots you sell' }).waitFor();
    await keepPicture(bench, '04-handed-in');
  });

  it('the desk sees the document beside the values and verifies it', async () => {
    await signIn(desk, 'desk', '/desk');
    await keepPicture(desk, '05-desk-queue');
    await desk.getByRole('link', { name: title }).click();
    await desk.getByRole('heading', { name: title }).waitFor();
    const document = desk.locator('iframe, object, embed').first();
    const address = (await document.getAttribute('src')) ?? (await document.getAttribute('data'));
    const shown = await desk.request.get(address ?? '');
    expect((await shown.body()).subarray(0, 5).toString()).toBe('%PDF-');
    await desk.getByRole('button', { name: 'Claim this case' }).click();
    await desk.getByRole('radio', { name: 'Verify' }).check();
    const form = desk.getByRole('form', { name: 'Verify' });
    await form.getByLabel('How was it confirmed?').fill('By telephone, with the number from the register');
    await form.getByLabel('With whom?').fill('Registry of the laboratory');
    await form.getByLabel('On which day?').fill(dayAgo(0));
    await keepPicture(desk, '06-desk-case');
    await form.getByRole('button', { name: 'Verify the certificate' }).click();
    await form.getByRole('button', { name: `Verify report ${report.number}` }).click();
    await desk.getByText('Verified: the lot is open.').waitFor();
    await keepPicture(desk, '07-desk-verified');
  });

  it('a buyer finds it in the register and agrees', async () => {
    await signIn(buyer, 'hale', '/lots');
    await keepPicture(buyer, '08-register');
    await buyer.getByRole('link', { name: title }).click();
    await buyer.getByRole('heading', { name: title, level: 1 }).waitFor();
    await keepPicture(buyer, '09-lot');
    await buyer.getByRole('link', { name: `Buy: US$ ${sums.total} into escrow` }).click();
    await fillPurchase(buyer);
    await keepPicture(buyer, '10-purchase');
    await agree(buyer).click();
    await buyer.getByRole('heading', { name: /^Pay / }).waitFor();
    expect(buyer.url()).toContain(inject('paymentsUrl'));
  });

  it('a declined card takes nothing, a good one puts the money into escrow', async () => {
    await payByCard(buyer, '4000 0000 0000 0002');
    await buyer.getByRole('alert').first().waitFor();
    await keepPicture(buyer, '11-declined');
    await payByCard(buyer, '4242 4242 4242 4242');
    await buyer.getByText(`US$ ${sums.total} is held in escrow`).waitFor();
    await keepPicture(buyer, '12-paid');
    await buyer.getByRole('link', { name: 'Open the deal' }).click();
    await buyer.waitForURL(/\/deals\/D-[^/]+$/);
    deal = buyer.url().split('/').at(-1)!;
    await keepPicture(buyer, '13-deal-funded');
  });

  it('the seller ships to the address that was frozen into the deal', async () => {
    await bench.goto('/deals');
    await keepPicture(bench, '14-deals-of-seller');
    await bench.getByRole('link', { name: new RegExp(title) }).click();
    await bench.getByRole('button', { name: 'Enter the parcel you shipped' }).click();
    await bench.getByText(delivery.street).first().waitFor();
    await bench.getByLabel('Carrier').fill('Vale Parcels');
    await bench.getByLabel('Tracking number').fill(tracking);
    await keepPicture(bench, '15-ship');
    await bench.getByRole('button', { name: 'Tell the buyer it is shipped' }).click();
    await bench.getByText('The buyer is told that the parcel is on its way.').waitFor();
  });

  it('the carrier delivers, the buyer weighs and accepts', async () => {
    const carrier = await people.newVisitor();
    await carrier.goto(inject('carrierUrl'));
    const delivered = carrier.getByRole('button', { name: `deliver ${tracking}`, exact: true });
    await soon(async () => {
      await carrier.reload();
      return delivered.count();
    }, 30_000).toBe(1);
    await delivered.click();
    const record = buyer.getByRole('button', { name: 'Record the received mass' });
    await record.waitFor({ timeout: 60_000 });
    await record.click();
    await buyer.getByLabel('Received mass').fill('31.20');
    await buyer.getByRole('button', { name: 'Record this mass' }).click();
    await keepPicture(buyer, '16-record-mass');
    await buyer.getByRole('button', { name: 'Record the received mass' }).click();
    await buyer.getByRole('button', { name: `Accept: US$ ${sums.total} to the seller` }).click();
    await buyer.getByRole('region', { name: 'Confirm' }).waitFor();
    await keepPicture(buyer, '17-accept');
    await buyer.getByRole('button', { name: `Accept: US$ ${sums.total} to the seller` }).click();
    await buyer.getByRole('link', { name: 'Final sheet as PDF' }).waitFor();
    await keepPicture(buyer, '18-settled');
  });

  it('the seller reads the payout mail, and its sheet holds the right sums', async () => {
    await openMail(bench, seller.email, /^Paid out: US\$ 3,913\.00/);
    await bench.getByText(sums.payout).first().waitFor();
    await keepPicture(bench, '19-payout-mail');
    const sheet = await download(bench, /\.pdf$/);
    expect(sheet.name).toBe(`scruple-${deal}-final.pdf`);
    expect(sheet.bytes.subarray(0, 5).toString()).toBe('%PDF-');
    expect(sheet.bytes.length).toBeGreaterThan(5_000);
    const words = await wordsOfPdf(sheet.bytes);
    if (words !== null) {
      for (const sum of ['4,050.00', sums.commission, '25.00', sums.payout]) expect(words).toContain(sum);
    }
    await bench.goto(`/deals/${deal}`);
    await bench.getByText('Paid out to the seller’s bank').first().waitFor();
    await keepPicture(bench, '20-paid-out');
  });

  it('our ledger and the books of the provider say the same to the cent', async () => {
    expect(await dealEntries(deal)).toEqual([
      ['funding', 'provider', '407500'],
      ['funding', 'escrow', '-407500'],
      ['provider_fee', 'provider_fees', '11848'],
      ['provider_fee', 'provider', '-11848'],
      ['settlement', 'escrow', '407500'],
      ['settlement', 'commission', '-16200'],
      ['settlement', 'member_payable', '-391300'],
      ['transfer', 'member_connected', '391300'],
      ['transfer', 'provider', '-391300'],
      ['payout', 'member_payable', '391300'],
      ['payout', 'member_connected', '-391300'],
    ]);
    const { ours, theirs, differences } = await compareBooks();
    expect(ours).toEqual(theirs);
    expect(ours.total).toBe('0');
    expect(differences).toEqual([]);
    expect(lot).toMatch(/^S-/);
  });
});
