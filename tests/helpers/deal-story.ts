import { randomUUID } from 'node:crypto';
import { afterAll, expect } from 'vitest';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { providerTaskHandlers } from '#jobs/perform-provider-tasks.ts';
import { pollParcels } from '#jobs/poll-parcels.ts';
import { runProviderTasks } from '#jobs/run-provider-tasks.ts';
import { sendMails } from '#jobs/send-mails.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { accountSumMinor } from '#server/features/ledger/ledger-queries.ts';
import { closeClients } from '#server/integrations/clients.ts';
import { logger } from '#server/logger.ts';
import { Deal, LedgerJournal, Payment } from '#server/models/index.ts';
import { DELIVERY } from '#tests/factories/build-deal.ts';
import type { BuiltLot } from '#tests/factories/build-lot.ts';
import type { BuiltMember } from '#tests/factories/build-member.ts';
import { startCarrierFake } from '#tests/fakes/carrier/start-carrier-fake.ts';
import { startMailFake } from '#tests/fakes/mail/start-mail-fake.ts';
import { eventually, startPayments } from './payments-fake.ts';
import { startTestApp, type Visitor } from './test-app.ts';

const portOf = (address: string) => Number.parseInt(new URL(address).port, 10);
const key = () => ({ 'Idempotency-Key': randomUUID() });

async function order(url: string): Promise<void> {
  const answer = await fetch(url, { method: 'POST', headers: { Accept: 'application/json' } });
  expect(answer.ok, url).toBe(true);
}

export type KeptMail = { subject: string; text: string; attachments: { filename: string }[] };

/** The product with its payment, carrier and mail stand-ins, and the acts that a story is told in. */
export async function startStory() {
  const app = await startTestApp();
  const payments = await startPayments(app.url);
  const carrier = await startCarrierFake({ port: portOf(process.env.CARRIER_URL!), deliverySeconds: null });
  const mail = await startMailFake({ smtpPort: portOf(process.env.SMTP_URL!) });
  afterAll(async () => {
    closeClients();
    await Promise.all([carrier.close(), mail.close()]);
  });

  const read = async (visitor: Visitor, code: string): Promise<DealAnswer> =>
    (await visitor.get(`/api/v1/deals/${code}`).expect(200)).body as DealAnswer;
  const act = async (visitor: Visitor, code: string, verb: string, body: object = {}): Promise<DealAnswer> =>
    (await visitor.post(`/api/v1/deals/${code}/${verb}`, body, key()).expect(200)).body as DealAnswer;
  /** What the jobs of a running product do: providers and carrier first, then the mails. */
  const jobsRun = async () => {
    await runProviderTasks(providerTaskHandlers);
    await pollParcels({ log: logger });
    await sendMails({ now: await databaseNow(), log: logger });
  };

  return {
    payments,
    signIn: app.signIn,
    read,
    act,
    jobsRun,
    buys: async (buyer: Visitor, lot: BuiltLot): Promise<string> => {
      const shown = (await buyer.get(`/api/v1/lots/${lot.code}`).expect(200)).body as {
        price: { amount: string };
        sheet: { total: string };
      };
      const body = { total: shown.sheet.total, delivery: DELIVERY, confirmsAge: true, confirmsRules: true };
      const answer = await buyer.post(`/api/v1/lots/${lot.code}/purchase`, body, key()).expect(201);
      return (answer.body as DealAnswer).code;
    },
    /** On the provider's page with a card; the signed message funds the deal, nothing else does. */
    paysByCard: async (buyer: Visitor, code: string): Promise<void> => {
      const { body } = await buyer.post(`/api/v1/deals/${code}/payment`, {}, key()).expect(200);
      expect((body as { url: string }).url).toMatch(/^http/);
      const deal = await Deal.findOne({ where: { code }, rejectOnEmpty: true });
      const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
      expect(await payments.pay(payment.providerSessionId!)).toBe('paid');
      await eventually(async () => expect((await read(buyer, code)).state).toBe('funded'));
    },
    carrierDelivers: async (trackingNumber: string) =>
      order(`${carrier.url}/control/trackers/${encodeURIComponent(trackingNumber)}/deliver`),
    becomes: async (visitor: Visitor, code: string, state: DealAnswer['state']) =>
      eventually(async () => {
        const deal = await read(visitor, code);
        expect(deal.state).toBe(state);
        return deal;
      }),
    mailbox: async ({ email }: BuiltMember): Promise<KeptMail[]> => {
      const answer = await fetch(`${mail.url}/control/messages?to=${encodeURIComponent(email)}`);
      return ((await answer.json()) as { messages: KeptMail[] }).messages;
    },
    /** Our books against the provider's own: balances to the cent, and each of its objects in exactly one journal. */
    booksAgree: async (seller: BuiltMember & { accountId: string }): Promise<void> => {
      expect(await accountSumMinor({ kind: 'provider' })).toBe(await payments.balance('platform'));
      expect(await accountSumMinor({ kind: 'member_connected', memberId: seller.id })).toBe(
        await payments.balance(seller.accountId),
      );
      const kinds = { funding: 'charge', refund: 'refund', transfer: 'transfer', payout: 'payout' } as const;
      for (const [kind, object] of Object.entries(kinds)) {
        const journals = await LedgerJournal.findAll({ where: { kind: kind as keyof typeof kinds } });
        // A transfer shows on the seller's own account as a charge as well; ours is the transfer.
        const theirs = (await payments.objects(object)).filter(
          ({ value, owner }) => value['status'] !== 'failed' && (object !== 'charge' || owner === 'platform'),
        );
        expect(journals.map(({ providerObjectId }) => providerObjectId).sort()).toEqual(
          theirs.map(({ id }) => id).sort(),
        );
      }
    },
  };
}
