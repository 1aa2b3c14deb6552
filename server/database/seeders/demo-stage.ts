import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { withTransaction } from '#server/database/transaction.ts';
import { createApp } from '#server/app.ts';
import { createMember } from '#server/features/members/create-member.ts';
import { hashPassword } from '#server/features/members/passwords.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { DEMO_PEOPLE, DEMO_STAFF, type PersonKey, type StaffKey } from './demo-people.ts';
import { press } from './demo-services.ts';
import { DemoVisitor } from './demo-visitor.ts';

export type DemoPerson = { key: string; id: string; email: string; visitor: DemoVisitor };
export type DemoAccount = { email: string; role: string; name: string };

/** The published test number of a bank that refuses every payout. */
const REFUSING_BANK = '000111111116';

/** Opens the API in this very process, so that requests run at the moment at which the story stands. */
export async function openStage(): Promise<{ origin: string; close: () => Promise<void> }> {
  const { app, close } = createApp();
  const server: Server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    origin: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    close: async () => {
      close();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

/** All who appear, signed in. One password for the demo, hashed once. */
export async function castOf(
  origin: string,
  password: string,
): Promise<{ people: Record<PersonKey | StaffKey, DemoPerson>; accounts: DemoAccount[] }> {
  const passwordHash = await hashPassword(password);
  const people: Record<string, DemoPerson> = {};
  const accounts: DemoAccount[] = [];
  const all = [
    ...Object.entries(DEMO_PEOPLE).map(([key, person]) => ({ key, role: 'member' as const, ...person })),
    ...Object.entries(DEMO_STAFF).map(([key, person]) => ({
      key,
      timeZone: 'UTC',
      weightUnit: 'g' as const,
      ...person,
    })),
  ];
  for (const { key, displayName, region, timeZone, weightUnit, role } of all) {
    const email = `${key}@scruple.example`;
    const member = await withTransaction({}, (unit) =>
      createMember({ email, passwordHash, displayName, region, timeZone, role }, unit),
    );
    await member.update({ weightUnit });
    const visitor = new DemoVisitor(origin);
    await visitor.signIn(email, password);
    people[key] = { key, id: member.id, email, visitor };
    accounts.push({ email, role, name: displayName });
  }
  return { people: people as Record<PersonKey | StaffKey, DemoPerson>, accounts };
}

/** Payout onboarding on the provider's page, by its button. */
export async function openPayouts(person: DemoPerson, bankRefuses: boolean): Promise<void> {
  await person.visitor.post('/api/v1/me/payout-account');
  const account = await PayoutAccount.findOne({ where: { memberId: person.id }, rejectOnEmpty: true });
  await press('payments', '/control/onboard', {
    accountId: account.providerAccountId,
    name: person.key,
    ...(bankRefuses ? { bank: REFUSING_BANK } : {}),
  });
  await person.visitor.post('/api/v1/me/payout-account/refresh');
}
