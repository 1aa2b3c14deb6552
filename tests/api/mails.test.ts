import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sendMails } from '#jobs/send-mails.ts';
import { databaseNow, pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { claimMail } from '#server/features/mails/claim-mail.ts';
import { endMail, MAIL_TRIES_MAX, waitSecondsAfter } from '#server/features/mails/end-mail.ts';
import { enqueueMail } from '#server/features/mails/enqueue-mail.ts';
import { findDeadMails } from '#server/features/mails/mail-queries.ts';
import { closeClients } from '#server/integrations/clients.ts';
import { logger } from '#server/logger.ts';
import { OutboxMail } from '#server/models/index.ts';
import { buildDeal } from '#tests/factories/build-deal.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startMailFake } from '#tests/fakes/mail/start-mail-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';
import { mailPayoutSent } from '#server/features/deals/deal-mails.ts';
import { loadDeal } from '#server/features/deals/deal-queries.ts';
import { inDeal } from '#tests/factories/build-deal.ts';

await startTestApp();
const smtpPort = Number.parseInt(new URL(process.env.SMTP_URL!).port, 10);
let fake: Awaited<ReturnType<typeof startMailFake>>;
beforeAll(async () => {
  fake = await startMailFake({ smtpPort });
});
afterAll(async () => {
  closeClients();
  await fake.close();
});

async function control(path: string, body: object = {}): Promise<void> {
  const answer = await fetch(`${fake.url}${path}`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', Accept: 'application/json' },
    body: JSON.stringify(body),
  });
  expect(answer.ok, path).toBe(true);
}

type Kept = {
  to: string;
  subject: string;
  text: string;
  html: string | null;
  messageId: string;
  attachments: { filename: string; contentType: string; size: number; url: string }[];
};
async function mailbox({ email }: BuiltMember): Promise<Kept[]> {
  const answer = await fetch(`${fake.url}/control/messages?to=${encodeURIComponent(email)}`);
  return ((await answer.json()) as { messages: Kept[] }).messages;
}

let member: BuiltMember;
let number = 0;
beforeEach(async () => {
  await OutboxMail.destroy({ where: {} });
  await control('/control/faults', { kind: 'none' });
  member = await buildMember();
  number += 1;
});
afterEach(() => pinDatabaseTime(null));

const uniqueKey = () => `welcome:${number}`;
const order = () =>
  withTransaction({}, (unit) =>
    enqueueMail(
      { mail: 'welcome', memberId: member.id, uniqueKey: uniqueKey(), input: { displayName: 'Bram' } },
      unit,
    ),
  );
const send = async () => sendMails({ now: await databaseNow(), log: logger });
const row = () => OutboxMail.findOne({ where: { uniqueKey: uniqueKey() }, rejectOnEmpty: true });
const laterBy = (seconds: number) => pinDatabaseTime(new Date(Date.now() + seconds * 1000));

describe('the outbox', () => {
  it('sends each mail once, however often it is ordered', async () => {
    await order();
    await order();
    expect(await send()).toEqual({ sent: 1 });
    expect(await send()).toEqual({});
    const kept = await mailbox(member);
    expect(kept).toHaveLength(1);
    expect(kept[0]).toMatchObject({ subject: 'Welcome to Scruple' });
    expect(kept[0]?.text).toContain('Dear ');
    expect(kept[0]?.html).toContain('<h1');
    expect(await row()).toMatchObject({ state: 'sent', tries: 1 });
    expect((await row()).acceptedAt).not.toBeNull();
  });

  it('rolls back with what it tells of', async () => {
    const attempt = withTransaction({}, async (unit) => {
      await enqueueMail(
        { mail: 'welcome', memberId: member.id, uniqueKey: uniqueKey(), input: { displayName: 'Bram' } },
        unit,
      );
      throw new Error('the rest failed');
    });
    await expect(attempt).rejects.toThrow('the rest failed');
    expect(await OutboxMail.count({ where: { uniqueKey: uniqueKey() } })).toBe(0);
  });

  it('refuses an input that no mail could be written from', async () => {
    const attempt = withTransaction({}, (unit) =>
      enqueueMail(
        {
          mail: 'welcome',
          memberId: member.id,
          uniqueKey: uniqueKey(),
          input: {} as { displayName: string },
        },
        unit,
      ),
    );
    await expect(attempt).rejects.toThrow();
  });

  it('keeps one message id over tries, so that a mail sent twice is seen as one', async () => {
    await order();
    await send();
    await OutboxMail.update({ state: 'due', nextAt: new Date(0) }, { where: { uniqueKey: uniqueKey() } });
    await send();
    const ids = (await mailbox(member)).map(({ messageId }) => messageId);
    expect(ids).toHaveLength(2);
    expect(new Set(ids).size).toBe(1);
  });
});

describe('a mail server in trouble', () => {
  it.each([
    ['down', { kind: 'down' }],
    ['refusing for now', { kind: 'refuse', code: 450 }],
  ])('%s: the mail waits and is sent when it is back', async (_name, fault) => {
    await order();
    await control('/control/faults', fault);
    expect(await send()).toEqual({ due: 1 });
    const waiting = await row();
    expect(waiting).toMatchObject({ state: 'due', tries: 1 });
    expect(waiting.lastError).not.toBeNull();
    expect(waiting.nextAt.getTime()).toBeGreaterThan(Date.now() + 20_000);
    expect(await send()).toEqual({});
    await control('/control/faults', { kind: 'none' });
    laterBy(31);
    expect(await send()).toEqual({ sent: 1 });
    expect(await mailbox(member)).toHaveLength(1);
  });

  it('refusing for good: the mail is given up at once and shown', async () => {
    await order();
    await control('/control/faults', { kind: 'refuse', code: 550 });
    expect(await send()).toEqual({ dead: 1 });
    expect((await findDeadMails()).map((mail) => mail.uniqueKey)).toEqual([uniqueKey()]);
    laterBy(86_400);
    expect(await send()).toEqual({});
  });

  it('for too long: the mail is given up after its last try', async () => {
    await order();
    await OutboxMail.update({ tries: MAIL_TRIES_MAX - 1 }, { where: { uniqueKey: uniqueKey() } });
    await control('/control/faults', { kind: 'down' });
    expect(await send()).toEqual({ dead: 1 });
  });

  it('one bad mail does not hold up the others', async () => {
    await order();
    await OutboxMail.update({ input: {} }, { where: { uniqueKey: uniqueKey() } });
    const other = await buildMember();
    await withTransaction({}, (unit) =>
      enqueueMail(
        {
          mail: 'welcome',
          memberId: other.id,
          uniqueKey: `${uniqueKey()}:other`,
          input: { displayName: 'Ada' },
        },
        unit,
      ),
    );
    expect(await send()).toEqual({ due: 1, sent: 1 });
    expect(await mailbox(other)).toHaveLength(1);
  });

  it('waits longer after each try, up to half a day', () => {
    expect([1, 2, 3, 4].map(waitSecondsAfter)).toEqual([30, 60, 120, 240]);
    expect(waitSecondsAfter(30)).toBe(43_200);
  });
});

describe('two senders', () => {
  it('send each mail once between them', async () => {
    await order();
    const counts = await Promise.all([send(), send(), send()]);
    expect(counts.reduce((sum, each) => sum + ((each.sent as number | undefined) ?? 0), 0)).toBe(1);
    expect(await mailbox(member)).toHaveLength(1);
  });

  it('a sender that was overtaken changes nothing any more', async () => {
    await order();
    const { id } = await row();
    const slow = await withTransaction({}, (unit) => claimMail(id, unit));
    expect(await withTransaction({}, (unit) => claimMail(id, unit))).toBeNull();
    laterBy(121);
    const quick = await withTransaction({}, (unit) => claimMail(id, unit));
    const ended = (leaseToken: number) =>
      withTransaction({}, (unit) => endMail({ id, leaseToken, result: { kind: 'accepted' } }, unit));
    expect(await ended(slow!.leaseToken)).toBe('taken-over');
    expect(await ended(quick!.leaseToken)).toBe('sent');
    expect(await ended(quick!.leaseToken)).toBe('taken-over');
  });
});

describe('the mails of a settled deal', () => {
  it('carry each side’s final sheet as PDF', async () => {
    const deal = await buildDeal({ state: 'settled' });
    await inDeal(deal, async (unit) => mailPayoutSent(await loadDeal(deal.id, unit.tx), unit));
    await send();
    for (const side of [deal.seller, deal.buyer]) {
      const mail = (await mailbox(side)).find(({ attachments }) => attachments.length > 0);
      expect(mail?.attachments).toMatchObject([
        { filename: `scruple-${deal.code}-final.pdf`, contentType: 'application/pdf' },
      ]);
      const pdf = await (await fetch(`${fake.url}${mail!.attachments[0]!.url}`)).arrayBuffer();
      expect(Buffer.from(pdf).subarray(0, 5).toString()).toBe('%PDF-');
    }
    const [forSeller] = await mailbox(deal.seller);
    expect(forSeller?.subject).toContain('Paid out: US$ 1,849.00');
    const seen = (await mailbox(deal.buyer)).map(({ text }) => text).join('\n');
    expect(seen).not.toMatch(/commission/i);
    // The dates to ship, to receive and to inspect by are over before the first mail went out.
    const dropped = await OutboxMail.findAll({ where: { state: 'superseded' } });
    expect(dropped.map(({ mail }) => mail).sort()).toEqual([
      'deal-funded-seller',
      'parcel-delivered-buyer',
      'parcel-delivered-seller',
      'parcel-shipped',
    ]);
    expect(await OutboxMail.count({ where: { state: 'sent' } })).toBe((await OutboxMail.count()) - 4);
  });
});

describe('the mails of a running deal', () => {
  const mailsTo = ({ id }: BuiltMember) =>
    OutboxMail.findAll({ where: { memberId: id }, order: [['createdAt', 'ASC']] });
  const statesOf = async (reader: BuiltMember) =>
    Object.fromEntries((await mailsTo(reader)).map(({ mail, state }) => [mail, state]));

  it('wait for an older one to the same reader, not for one to the other side', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    const [receipt] = await mailsTo(deal.buyer);
    await receipt!.update({ nextAt: new Date(Date.now() + 60_000) });
    expect(await send()).toEqual({});
    expect(await statesOf(deal.buyer)).toEqual({ 'deal-funded-buyer': 'due', 'parcel-shipped': 'due' });
    expect(await statesOf(deal.seller)).toEqual({ 'deal-funded-seller': 'superseded' });
    laterBy(61);
    expect(await send()).toEqual({ sent: 2 });
    const subjects = (await mailbox(deal.buyer)).map(({ subject }) => subject);
    expect(subjects).toHaveLength(2);
    // The mailbox shows the newest first.
    expect(subjects[0]).toMatch(/^On its way/);
  });

  it('do not wait for one that was given up', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    const [receipt] = await mailsTo(deal.buyer);
    await receipt!.update({ state: 'dead' });
    expect(await send()).toEqual({ sent: 1 });
    expect(await statesOf(deal.buyer)).toEqual({ 'deal-funded-buyer': 'dead', 'parcel-shipped': 'sent' });
  });

  it('are sent with their days while these are to come', async () => {
    const deal = await buildDeal({ state: 'funded' });
    expect(await send()).toEqual({ sent: 2 });
    expect(await statesOf(deal.seller)).toEqual({ 'deal-funded-seller': 'sent' });
  });
});
