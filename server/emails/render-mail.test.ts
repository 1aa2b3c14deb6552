import { describe, expect, it } from 'vitest';
import { isMailName, mailDefinition, MAILS, type MailName } from './mails.ts';
import { momentText, usdText } from './mail-text.ts';
import { renderMail } from './render-mail.ts';

const reader = { displayName: 'Bram <b>Hollis</b>', timeZone: 'America/Denver' };
const HOSTILE = '"><script>alert(1)</script>\r\nBcc: someone@else.example';

/** One valid input for every field that a mail may ask for; each mail takes its own of them. */
const everything = {
  dealCode: 'D-2K7F4Q',
  lotCode: 'S-7HJ2KP',
  lotTitle: HOSTILE,
  displayName: HOSTILE,
  total: '3818.50',
  price: '3780.00',
  shipping: '38.50',
  commission: '151.20',
  net: '3667.30',
  insured: '3800.00',
  carrier: HOSTILE,
  trackingNumber: 'VP123456',
  signedBy: HOSTILE,
  deliveryName: HOSTILE,
  deliveryPlace: HOSTILE,
  reason: HOSTILE,
  note: HOSTILE,
  failureCode: 'account_closed',
  side: 'buyer',
  ruling: 'refund',
  grade: 'certified',
  shipBy: '2026-12-08T16:00:00.000Z',
  arriveBy: '2026-12-11T16:00:00.000Z',
  deliveredAt: '2026-12-04T16:00:00.000Z',
  inspectBy: '2026-12-09T16:00:00.000Z',
  decideBy: '2026-12-12T16:00:00.000Z',
  paidAt: '2026-12-10T16:00:00.000Z',
  closesAt: '2027-02-10T16:00:00.000Z',
};

function rendered(name: MailName) {
  const definition = mailDefinition(name);
  const content = definition.write(definition.input.parse(everything), reader);
  return renderMail(content, reader, 'https://scruple.example');
}

const names = Object.keys(MAILS).filter(isMailName);

describe('every mail', () => {
  it.each(names)('%s escapes what members typed', (name) => {
    const { html } = rendered(name);
    expect(html).not.toContain('<script>');
    expect(html).not.toContain('<b>Hollis');
    expect(html).toContain('Bram &lt;b&gt;Hollis&lt;/b&gt;');
  });

  it.each(names)('%s keeps its subject on one line', (name) => {
    const { subject } = rendered(name);
    expect(subject).not.toMatch(/\p{Cc}/u);
    expect(subject.length).toBeGreaterThan(5);
    expect(subject.length).toBeLessThanOrEqual(300);
  });

  it.each(names)('%s fetches nothing and links only to the product', (name) => {
    const { html } = rendered(name);
    expect(html).not.toMatch(/<img|<link|@import|url\(|src=/i);
    for (const [, address] of html.matchAll(/href="([^"]*)"/g)) {
      expect(address).toMatch(/^https:\/\/scruple\.example\//);
    }
  });

  it.each(names)('%s says the same in text and HTML', (name) => {
    const definition = mailDefinition(name);
    const content = definition.write(definition.input.parse(everything), reader);
    const { text } = renderMail(content, reader, 'https://scruple.example');
    for (const line of [content.heading, ...content.paragraphs, ...content.closing])
      expect(text).toContain(line);
    for (const { label, value } of content.facts) {
      expect(text).toContain(`${label}:`);
      expect(text).toContain(value);
    }
  });

  it.each(names)('%s refuses an input that is not complete', (name) => {
    expect(mailDefinition(name).input.safeParse({}).success).toBe(false);
  });

  it.each(names)('%s says who gets it, when and what it says', (name) => {
    const { audience, trigger, says } = mailDefinition(name);
    for (const words of [audience, trigger, says]) expect(words.length).toBeGreaterThan(4);
  });
});

describe('figures and moments in mails', () => {
  it('groups thousands and keeps the cents', () => {
    expect(usdText('1234567.80')).toBe('US$ 1,234,567.80');
    expect(usdText('20.00')).toBe('US$ 20.00');
  });

  it('writes a moment in the reader’s zone and names the zone', () => {
    expect(momentText('2026-12-08T16:00:00.000Z', 'America/Denver')).toBe(
      'Tue 8 December 2026, 09:00 (America/Denver)',
    );
    expect(momentText('2026-07-08T16:00:00.000Z', 'America/Denver')).toContain('10:00');
  });

  it('tells the seller until when to ship, in his own zone', () => {
    const { subject, text } = rendered('deal-funded-seller');
    expect(subject).toContain('Ship by Tue 8 December 2026, 09:00 (America/Denver)');
    expect(text).toContain('US$ 3,818.50');
    expect(text).toContain('https://scruple.example/deals/D-2K7F4Q');
  });
});
