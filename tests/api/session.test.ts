import { QueryTypes } from 'sequelize';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { ANONYMOUS_SESSION_IDLE_HOURS, SESSION_IDLE_HOURS } from '#shared/limits.ts';
import { sequelize } from '#server/database/connection.ts';
import { SessionRow } from '#server/models/session-row.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();

const newcomer = () => ({
  email: `new-${Math.random().toString(36).slice(2)}@scruple.example`,
  password: 'ten-letters-and-more',
  displayName: 'Ilse Varn',
  region: 'Port Ansel',
  timeZone: 'Europe/Lisbon',
  isOfAge: true,
});

describe('sign-up', () => {
  it('makes a member who is signed in and cannot sell yet', async () => {
    const visitor = await app.visitor();
    const answer = await visitor.post('/api/v1/members', newcomer()).expect(201);
    expect(answer.body.member).toMatchObject({
      displayName: 'Ilse Varn',
      role: 'member',
      weightUnit: 'g',
      timeZone: 'Europe/Lisbon',
      payouts: { state: 'none' },
      can: { sell: false, useDesk: false },
    });
    const again = await visitor.get('/api/v1/session');
    expect(again.body.member.displayName).toBe('Ilse Varn');
  });

  it('opens the member’s two ledger accounts with the account', async () => {
    const member = await buildMember();
    const rows = await sequelize.query<{ kind: string }>(
      'SELECT kind FROM ledger_accounts WHERE owner_id = ? ORDER BY kind',
      { replacements: [member.id], type: QueryTypes.SELECT },
    );
    expect(rows.map((row) => row.kind)).toEqual(['member_connected', 'member_payable']);
  });

  it('names every field that needs another value at once', async () => {
    const visitor = await app.visitor();
    const answer = await visitor
      .post('/api/v1/members', {
        email: 'no',
        password: 'short',
        displayName: ' ',
        region: '',
        isOfAge: false,
      })
      .expect(422);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body.code).toBe('invalid-input');
    expect(answer.body.errors.map((error: { pointer: string }) => error.pointer).sort()).toEqual([
      '/displayName',
      '/email',
      '/isOfAge',
      '/password',
      '/region',
    ]);
  });

  it('refuses a second account with the same e-mail, however it is written', async () => {
    const first = newcomer();
    await (await app.visitor()).post('/api/v1/members', first).expect(201);
    const answer = await (
      await app.visitor()
    )
      .post('/api/v1/members', { ...first, email: first.email.toUpperCase() })
      .expect(409);
    expect(answer.body.code).toBe('email-taken');
  });

  it('makes exactly one account of two sign-ups at once', async () => {
    const input = newcomer();
    const visitors = await Promise.all([app.visitor(), app.visitor()]);
    const answers = await Promise.all(visitors.map((visitor) => visitor.post('/api/v1/members', input)));
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
  });

  it('refuses a role or any other field that is not asked for, by leaving it out', async () => {
    const visitor = await app.visitor();
    const answer = await visitor.post('/api/v1/members', { ...newcomer(), role: 'admin' }).expect(201);
    expect(answer.body.member.role).toBe('member');
  });

  it('refuses a time zone that does not exist, at its field', async () => {
    const answer = await (
      await app.visitor()
    )
      .post('/api/v1/members', { ...newcomer(), timeZone: 'Mars/Olympus' })
      .expect(422);
    expect(answer.body.errors[0].pointer).toBe('/timeZone');
  });
});

describe('sign-in', () => {
  it('gives a new session id, so that a planted one is worth nothing', async () => {
    const member = await buildMember();
    const agent = supertest.agent(app.url);
    const before = await agent.get('/api/v1/session').expect(200);
    const planted = String(before.headers['set-cookie']?.[0] ?? '').split(';')[0]!;
    const answer = await agent
      .post('/api/v1/session')
      .set('X-CSRF-Token', before.body.csrfToken)
      .send({ email: member.email, password: member.password })
      .expect(200);
    const fresh = String(answer.headers['set-cookie']?.[0] ?? '').split(';')[0]!;
    expect(fresh).toMatch(/^scruple=/);
    expect(fresh).not.toBe(planted);
    const withPlanted = await supertest(app.url).get('/api/v1/session').set('Cookie', planted);
    expect(withPlanted.body.member).toBeNull();
  });

  it('answers a wrong password and an unknown account alike', async () => {
    const member = await buildMember();
    const visitor = await app.visitor();
    const wrong = await visitor.post('/api/v1/session', {
      email: member.email,
      password: 'not-the-password',
    });
    const unknown = await visitor.post('/api/v1/session', {
      email: 'nobody@scruple.example',
      password: 'whatever-it-is',
    });
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(wrong.body).toEqual(unknown.body);
  });

  it('hashes with argon2id', async () => {
    const member = await buildMember();
    const rows = await sequelize.query<{ password_hash: string }>(
      'SELECT password_hash FROM members WHERE id = ?',
      {
        replacements: [member.id],
        type: QueryTypes.SELECT,
      },
    );
    expect(rows[0]!.password_hash).toMatch(/^\$argon2id\$v=19\$m=65536,t=3,p=1\$/);
  });

  it('ends with sign-out: the old cookie opens nothing', async () => {
    const member = await buildMember();
    const visitor = await app.visitor();
    const answer = await visitor
      .post('/api/v1/session', { email: member.email, password: member.password })
      .expect(200);
    const cookie = String(answer.headers['set-cookie']?.[0] ?? '').split(';')[0]!;
    const whoIs = () => supertest(app.url).get('/api/v1/session').set('Cookie', cookie);
    expect((await whoIs()).body.member.id).toBe(member.id);
    await visitor.refreshToken();
    await visitor.delete('/api/v1/session').expect(204);
    expect((await whoIs()).body.member).toBeNull();
    await visitor.refreshToken();
    const profile = { displayName: 'Other', region: 'There', weightUnit: 'g', timeZone: 'UTC' };
    await visitor.put('/api/v1/me/profile', profile).expect(401);
  });
});

describe('the session of somebody who has not signed in', () => {
  const sidOf = (headers: Record<string, unknown>) => {
    const [cookie = ''] = (headers['set-cookie'] as string[] | undefined) ?? [];
    return decodeURIComponent(cookie).match(/^scruple=s:([^.]+)/)?.[1] ?? null;
  };
  const hoursLeft = async (sid: string | null) => {
    const row = await SessionRow.findByPk(sid ?? '', { rejectOnEmpty: true });
    return ((row.expires?.getTime() ?? 0) - Date.now()) / 3_600_000;
  };

  it('is made by no HEAD', async () => {
    const before = await SessionRow.count();
    const { headers } = await supertest(app.url).head('/api/v1/session').expect(200);
    expect(headers['set-cookie']).toBeUndefined();
    expect(await SessionRow.count()).toBe(before);
  });

  it('is one for all that a browser asks, and short; signing in gives the full time', async () => {
    const member = await buildMember();
    const agent = supertest.agent(app.url);
    const first = await agent.get('/api/v1/session').expect(200);
    const sid = sidOf(first.headers);
    expect(await hoursLeft(sid)).toBeCloseTo(ANONYMOUS_SESSION_IDLE_HOURS, 1);
    const count = await SessionRow.count();
    const again = await agent.get('/api/v1/session').expect(200);
    expect(again.body.csrfToken).toBe(first.body.csrfToken);
    expect(await SessionRow.count()).toBe(count);
    const signedIn = await agent
      .post('/api/v1/session')
      .set('X-CSRF-Token', first.body.csrfToken)
      .send({ email: member.email, password: member.password })
      .expect(200);
    expect(await hoursLeft(sidOf(signedIn.headers))).toBeCloseTo(SESSION_IDLE_HOURS, 1);
    expect(await SessionRow.findByPk(sid ?? '')).toBeNull();
  });
});

describe('unsafe requests', () => {
  it('are refused without the page’s token, with another one, and from another site', async () => {
    const member = await buildMember();
    const visitor = await app.signIn(member);
    const body = { displayName: 'Name', region: 'There', weightUnit: 'ozt', timeZone: 'UTC' };
    const without = await visitor.agent.put('/api/v1/me/profile').send(body);
    const wrong = await visitor.agent.put('/api/v1/me/profile').set('X-CSRF-Token', 'wrong').send(body);
    const elsewhere = await visitor.put('/api/v1/me/profile', body).set('Sec-Fetch-Site', 'cross-site');
    const origin = await visitor.put('/api/v1/me/profile', body).set('Origin', 'https://elsewhere.example');
    for (const answer of [without, wrong, elsewhere, origin]) {
      expect(answer.status).toBe(403);
      expect(answer.body.code).toBe('csrf-token-invalid');
    }
    await visitor.put('/api/v1/me/profile', body).expect(200);
  });

  it('are refused for a suspended member, who may still read and sign out', async () => {
    const member = await buildMember();
    const visitor = await app.signIn(member);
    await sequelize.query('UPDATE members SET suspended_at = NOW(3) WHERE id = ?', {
      replacements: [member.id],
    });
    const body = { displayName: 'Name', region: 'There', weightUnit: 'g', timeZone: 'UTC' };
    const answer = await visitor.put('/api/v1/me/profile', body).expect(403);
    expect(answer.body.code).toBe('member-suspended');
    await visitor.get('/api/v1/session').expect(200);
    await visitor.delete('/api/v1/session').expect(204);
    const after = await visitor.get('/api/v1/session').expect(200);
    expect(after.body.member).toBeNull();
  });
});

describe('the profile', () => {
  it('keeps name, region, weight unit and time zone', async () => {
    const visitor = await app.signIn(await buildMember());
    const body = {
      displayName: 'Jory Pell',
      region: 'Kestle',
      weightUnit: 'dwt',
      timeZone: 'America/Denver',
    };
    const answer = await visitor.put('/api/v1/me/profile', body).expect(200);
    expect(answer.body.member).toMatchObject(body);
  });

  it('refuses a unit that is not one of the four', async () => {
    const visitor = await app.signIn(await buildMember());
    const body = { displayName: 'Jory Pell', region: 'Kestle', weightUnit: 'oz', timeZone: 'UTC' };
    const answer = await visitor.put('/api/v1/me/profile', body).expect(422);
    expect(answer.body.errors[0].pointer).toBe('/weightUnit');
  });
});
