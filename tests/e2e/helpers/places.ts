import type { Page } from 'playwright-core';
import { certificateId, dealCode, draftCode, lotCode } from './database.ts';

export type Reader = 'nobody' | 'newcomer' | 'hale' | 'bruna' | 'ilse' | 'wren' | 'desk' | 'desk2' | 'admin';

export type Place = {
  name: string;
  /** The route of the client's table that this place shows. */
  route: string;
  reader: Reader;
  address: string | (() => Promise<string>);
  /** Brings the page into the state that is meant. */
  act?: (page: Page) => Promise<void>;
};

const lot = (title: string) => async () => `/lots/${await lotCode(title)}`;
const deal =
  (title: string, rest = '') =>
  async () =>
    `/deals/${await dealCode(title)}${rest}`;
const ownLot = (title: string) => async () => `/sell/${await lotCode(title)}`;
const draft = (who: string) => async () => `/sell/${await draftCode(who)}`;

const press = (name: string | RegExp) => async (page: Page) => {
  await page.getByRole('button', { name }).first().click();
};
const pressAndFail = (name: string | RegExp) => async (page: Page) => {
  await press(name)(page);
  await page.getByRole('alert').first().waitFor();
};
const openWorkings = async (page: Page) => {
  await page.getByRole('button', { name: 'Open every working' }).first().click();
};

const open = 'Gold button, cone mould, single melt';

const publicPlaces: Place[] = [
  { name: 'home', route: '/', reader: 'nobody', address: '/' },
  { name: 'register', route: '/lots', reader: 'nobody', address: '/lots' },
  {
    name: 'register without a match',
    route: '/lots',
    reader: 'nobody',
    address: '/lots?metal=Pd&form=bar',
  },
  {
    name: 'open lot, every working open',
    route: '/lots/:code',
    reader: 'nobody',
    address: lot(open),
    act: openWorkings,
  },
  {
    name: 'lot of two metals',
    route: '/lots/:code',
    reader: 'nobody',
    address: lot('Gold and silver button, unparted'),
  },
  {
    name: 'linked lot',
    route: '/lots/:code',
    reader: 'bruna',
    address: lot('Silver bar from cement silver'),
  },
  { name: 'sold lot', route: '/lots/:code', reader: 'nobody', address: lot('Gold button, ring shanks') },
  { name: 'lot that is not there', route: '/lots/:code', reader: 'nobody', address: '/lots/S-222222' },
  { name: 'quotes', route: '/quotes', reader: 'nobody', address: '/quotes' },
  {
    name: 'worth refused',
    route: '/worth',
    reader: 'nobody',
    address: '/worth',
    act: pressAndFail('Reckon its worth'),
  },
  {
    name: 'worth reckoned',
    route: '/worth',
    reader: 'nobody',
    address: '/worth',
    act: async (page) => {
      await page.getByLabel('Mass', { exact: true }).fill('12.34');
      await page.getByLabel('Fineness').fill('916.7');
      await press('Reckon its worth')(page);
      await page.locator('#worth-result').waitFor();
    },
  },
  { name: 'methods', route: '/methods', reader: 'nobody', address: '/methods' },
  { name: 'cautions', route: '/cautions', reader: 'nobody', address: '/cautions' },
  { name: 'sign-in', route: '/sign-in', reader: 'nobody', address: '/sign-in' },
  {
    name: 'sign-in refused',
    route: '/sign-in',
    reader: 'nobody',
    address: '/sign-in',
    act: pressAndFail('Sign in'),
  },
  {
    name: 'sign-up refused',
    route: '/sign-up',
    reader: 'nobody',
    address: '/sign-up',
    act: pressAndFail('Make the account'),
  },
  { name: 'no such page', route: '*', reader: 'nobody', address: '/no/such/page' },
];

const memberPlaces: Place[] = [
  { name: 'account without payouts', route: '/account', reader: 'newcomer', address: '/account' },
  { name: 'no deals yet', route: '/deals', reader: 'newcomer', address: '/deals' },
  { name: 'no lots yet', route: '/sell', reader: 'newcomer', address: '/sell' },
  { name: 'desk closed to members', route: '/desk', reader: 'newcomer', address: '/desk' },
  {
    name: 'purchase',
    route: '/lots/:code/buy',
    reader: 'hale',
    address: async () => `${await lot(open)()}/buy`,
  },
  {
    name: 'purchase refused',
    route: '/lots/:code/buy',
    reader: 'hale',
    address: async () => `${await lot(open)()}/buy`,
    act: pressAndFail(/^Agree, and pay/),
  },
  { name: 'deals of a buyer', route: '/deals', reader: 'bruna', address: '/deals' },
  {
    name: 'deal delivered, mass refused',
    route: '/deals/:code',
    reader: 'bruna',
    address: deal('Gold button from pins and fingers'),
    act: async (page) => {
      await press('Record the received mass')(page);
      await pressAndFail('Record this mass')(page);
    },
  },
  {
    name: 'deal paid out, every working open',
    route: '/deals/:code',
    reader: 'ilse',
    address: deal('Gold button, ring shanks'),
    act: openWorkings,
  },
  {
    name: 'deal refunded',
    route: '/deals/:code',
    reader: 'hale',
    address: deal('Gold bar, twice melted'),
  },
  { name: 'deal that is not there', route: '/deals/:code', reader: 'hale', address: '/deals/D-222222' },
  {
    name: 'payment after the money came',
    route: '/deals/:code/payment',
    reader: 'bruna',
    address: deal('Gold grain, 22 karat scrap refined', '/payment?said=returned'),
  },
  { name: 'account with payouts', route: '/account', reader: 'ilse', address: '/account' },
  { name: 'lots of a seller', route: '/sell', reader: 'ilse', address: '/sell' },
  { name: 'draft', route: '/sell/:code', reader: 'ilse', address: draft('ilse') },
  {
    name: 'draft refused',
    route: '/sell/:code',
    reader: 'ilse',
    address: draft('ilse'),
    act: pressAndFail('Hand the lot to the desk'),
  },
  { name: 'own open lot', route: '/sell/:code', reader: 'ilse', address: ownLot(open) },
  {
    name: 'own returned lot',
    route: '/sell/:code',
    reader: 'wren',
    address: ownLot('Gold bar, report to be corrected'),
  },
];

const deskPlaces: Place[] = [
  { name: 'desk queue', route: '/desk', reader: 'desk', address: '/desk' },
  {
    name: 'desk case with its flags, verification refused',
    route: '/desk/certificates/:id',
    reader: 'desk2',
    address: async () => `/desk/certificates/${await certificateId('Gold button, sample sent in')}`,
    act: async (page) => {
      await page.getByRole('radio', { name: 'Verify' }).check();
      await pressAndFail('Verify the certificate')(page);
    },
  },
  {
    name: 'desk case waiting',
    route: '/desk/certificates/:id',
    reader: 'desk',
    address: async () => `/desk/certificates/${await certificateId('Silver bar, second pour')}`,
  },
  { name: 'contested deals', route: '/desk/deals', reader: 'desk', address: '/desk/deals' },
  {
    name: 'ruling refused',
    route: '/deals/:code',
    reader: 'desk',
    address: deal('Silver bar, sterling scrap refined'),
    act: async (page) => {
      await press('Rule on the deal')(page);
      await page.getByRole('form', { name: /rul/i }).getByRole('button').first().click();
    },
  },
  { name: 'laboratories', route: '/desk/laboratories', reader: 'desk', address: '/desk/laboratories' },
  { name: 'members', route: '/desk/members', reader: 'desk', address: '/desk/members' },
  {
    name: 'member found',
    route: '/desk/members',
    reader: 'desk',
    address: '/desk/members?query=ilse',
  },
  { name: 'audit', route: '/desk/audit', reader: 'admin', address: '/desk/audit' },
  { name: 'given-up mails', route: '/admin/mails', reader: 'admin', address: '/admin/mails' },
];

/** Every page in the states that a person can meet. */
export const places: readonly Place[] = [...publicPlaces, ...memberPlaces, ...deskPlaces];
