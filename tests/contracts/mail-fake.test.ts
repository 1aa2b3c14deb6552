import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { createMailer, MailServiceError, type OutgoingMail } from '#server/integrations/mail.ts';
import { startMailFake, type MailFakeOptions } from '#tests/fakes/mail/start-mail-fake.ts';

type Shown = {
  id: string;
  messageId: string;
  envelopeTo: string[];
  from: string;
  subject: string;
  text: string;
  html: string;
  attachments: { filename: string; contentType: string; size: number; url: string }[];
};
const toClose: (() => Promise<void> | void)[] = [];

afterEach(async () => {
  for (const close of toClose.splice(0).reverse()) await close();
});

async function start(options: MailFakeOptions = {}) {
  const fake = await startMailFake(options);
  toClose.push(fake.close);
  const mailer = createMailer({
    smtpUrl: fake.smtpUrl,
    from: 'Scruple <post@scruple.example>',
    timeoutMs: 1000,
  });
  toClose.push(mailer.close);
  const control = async (name: string, body: object = {}) => {
    const response = await fetch(`${fake.url}/control/${name}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
    });
    return response.status;
  };
  const mailbox = async (to: string) => {
    const response = await fetch(`${fake.url}/control/messages?to=${encodeURIComponent(to)}`);
    return ((await response.json()) as { messages: Shown[] }).messages;
  };
  const page = async (where: string) => (await fetch(fake.url + where)).text();
  const failure = async (mail: OutgoingMail) => {
    const error: unknown = await mailer.sendMail(mail).catch((thrown: unknown) => thrown);
    expect(error).toBeInstanceOf(MailServiceError);
    return error as MailServiceError;
  };
  return { fake, mailer, control, mailbox, page, failure };
}

function buildMail(change: Partial<OutgoingMail> = {}): OutgoingMail {
  return {
    to: 'ottoline@bench.example',
    subject: 'Auszahlung – 1,204.10 US$ für Ihren Knopf ℈',
    text: 'Your payout is on its way.\nSee http://localhost:3000/deals/1.\n',
    html: '<p>Your <b>payout</b> is on its way. <a href="http://localhost:3000/deals/1">The deal</a></p><script>alert(1)</script>',
    messageId: '<deal-1.payout@scruple.example>',
    ...change,
  };
}

describe('mail: accepted', () => {
  it('arrives whole, with its own message id and attachment', async () => {
    const { fake, mailer, mailbox } = await start();
    const sheet = Buffer.from([0x25, 0x50, 0x44, 0x46, 0x00, 0xff, 0x0d, 0x0a]);
    const attachments = [{ filename: 'Sheet für 1.pdf', contentType: 'application/pdf', content: sheet }];
    const receipt = await mailer.sendMail(buildMail({ attachments }));
    expect(receipt.messageId).toBe('<deal-1.payout@scruple.example>');
    expect(receipt.response).toMatch(/^250 /);
    const [message] = await mailbox('OTTOLINE@bench.example');
    expect(message).toMatchObject({
      messageId: '<deal-1.payout@scruple.example>',
      envelopeTo: ['ottoline@bench.example'],
      subject: 'Auszahlung – 1,204.10 US$ für Ihren Knopf ℈',
      attachments: [{ filename: 'Sheet für 1.pdf', contentType: 'application/pdf', size: sheet.length }],
    });
    expect(message?.from).toContain('post@scruple.example');
    expect(message?.text).toContain('Your payout is on its way.');
    expect(message?.html).toContain('<b>payout</b>');
    const download = await fetch(fake.url + (message?.attachments[0]?.url ?? ''));
    expect(download.headers.get('content-disposition')).toMatch(/^attachment/);
    expect(Buffer.from(await download.arrayBuffer())).toEqual(sheet);
  });

  it('shows each person a mailbox of their own, newest first', async () => {
    const { mailer, mailbox, page } = await start();
    await mailer.sendMail(buildMail({ subject: 'first' }));
    await mailer.sendMail(buildMail({ subject: 'second' }));
    await mailer.sendMail(buildMail({ subject: 'for another', to: 'bram@works.example' }));
    const subjects = (await mailbox('ottoline@bench.example')).map(({ subject }) => subject);
    expect(subjects).toEqual(['second', 'first']);
    const own = await page('/?to=bram%40works.example');
    expect(own).toContain('for another');
    expect(own).not.toContain('>second<');
    expect(own).toContain('Local stand-in');
  });

  it('shows a message with live links in the text and its HTML only inside a frame without scripts', async () => {
    const { mailer, mailbox, page } = await start();
    await mailer.sendMail(buildMail());
    const [message] = await mailbox('ottoline@bench.example');
    const html = await page(`/messages/${message?.id}`);
    expect(html).toContain('<a href="http://localhost:3000/deals/1">http://localhost:3000/deals/1</a>.');
    expect(html).not.toContain('<script>');
    expect(html).toMatch(
      /<iframe title="[^"]+" sandbox="allow-popups allow-popups-to-escape-sandbox" srcdoc=/,
    );
  });

  it('is kept over a restart, and numbering goes on', async () => {
    const dataDir = mkdtempSync(path.join(tmpdir(), 'mail-fake-'));
    toClose.push(() => rmSync(dataDir, { recursive: true }));
    const first = await start({ dataDir });
    await first.mailer.sendMail(buildMail({ subject: 'before' }));
    const second = await start({ dataDir });
    await second.mailer.sendMail(buildMail({ subject: 'after' }));
    const kept = await second.mailbox('ottoline@bench.example');
    expect(kept.map(({ id, subject }) => [id, subject])).toEqual([
      ['00000002', 'after'],
      ['00000001', 'before'],
    ]);
  });
});

describe('mail: not accepted', () => {
  it.each([
    [450, 'refused-for-now', true],
    [550, 'refused-for-good', false],
  ])('%i is %s; accepted again after the ordered number', async (code, reason, isWorthRetry) => {
    const { mailer, control, failure, mailbox } = await start();
    expect(await control('faults', { kind: 'refuse', code, count: 1 })).toBe(200);
    expect(await failure(buildMail())).toMatchObject({ reason, responseCode: code, isWorthRetry });
    expect(await mailbox('ottoline@bench.example')).toEqual([]);
    await mailer.sendMail(buildMail());
    expect(await mailbox('ottoline@bench.example')).toHaveLength(1);
  });

  it('refuses one address only when so ordered, until cleared', async () => {
    const { mailer, control, failure } = await start();
    await control('faults', { kind: 'refuse', code: 550, to: 'bram@works.example' });
    await mailer.sendMail(buildMail());
    const toBram = buildMail({ to: 'bram@works.example' });
    expect((await failure(toBram)).reason).toBe('refused-for-good');
    expect((await failure(toBram)).reason).toBe('refused-for-good');
    await control('faults', { kind: 'none' });
    await mailer.sendMail(toBram);
  });

  it('is unreachable while the server is down, and goes through when it is back', async () => {
    const { mailer, control, failure, mailbox } = await start();
    await mailer.sendMail(buildMail({ subject: 'before' }));
    await control('faults', { kind: 'down' });
    expect(await failure(buildMail())).toMatchObject({ reason: 'unreachable', isWorthRetry: true });
    await control('faults', { kind: 'none' });
    await mailer.sendMail(buildMail({ subject: 'after' }));
    const subjects = (await mailbox('ottoline@bench.example')).map(({ subject }) => subject);
    expect(subjects).toEqual(['after', 'before']);
  });

  it('times out when the server is slower than allowed, and waits when it is not', async () => {
    const { mailer, control, failure } = await start();
    await control('faults', { kind: 'delay', seconds: 0.2, count: 1 });
    await mailer.sendMail(buildMail());
    await control('faults', { kind: 'delay', seconds: 2, count: 1 });
    expect((await failure(buildMail())).reason).toBe('timeout');
  });

  it.each([
    [{ subject: 'Paid\r\nBcc: thief@else.example' }],
    [{ subject: 'Paid\nX: y' }],
    [{ to: 'a@b.example\r\nRCPT TO:<thief@else.example>' }],
    [{ to: 'a@b.example, thief@else.example' }],
    [{ to: 'Group: a@b.example;' }],
    [{ messageId: '<a@b.example>\r\nBcc: thief@else.example' }],
    [{ messageId: 'no brackets' }],
    [{ attachments: [{ filename: 'a\r\nX: y', contentType: 'text/plain', content: Buffer.from('') }] }],
    [{ attachments: [{ filename: 'a', contentType: 'text/plain\r\nX: y', content: Buffer.from('') }] }],
  ])('never sends %j', async (change) => {
    const { failure, mailbox } = await start();
    expect(await failure(buildMail(change))).toMatchObject({ reason: 'invalid', isWorthRetry: false });
    expect(await mailbox('')).toEqual([]);
  });
});
