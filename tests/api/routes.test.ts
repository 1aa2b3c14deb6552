import { describe, expect, it } from 'vitest';
import { createApp } from '#server/app.ts';
import { healthRoutes } from '#server/features/health/health-routes.ts';
import { allRoutes } from '#server/routing/all-routes.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const declared = [...healthRoutes, ...allRoutes];

type Layer = { route?: { path: string; methods: Record<string, boolean> } };

/** Every path and method that the mounted router really answers. */
function mountedRoutes(): string[] {
  const made = createApp();
  made.close();
  const layers = (made.app as unknown as { router: { stack: Layer[] } }).router.stack;
  return layers.flatMap((layer) =>
    layer.route === undefined
      ? []
      : Object.keys(layer.route.methods).map((method) => `${method} ${layer.route!.path}`),
  );
}

const sample = (path: string) =>
  path
    .replace(/:code/, path.includes('/deals/') ? 'D-ZZZZZZ' : 'S-ZZZZZZ')
    .replace(/:size/, 'thumb')
    .replace(/:\w+/g, '00000000-0000-7000-8000-00000000dead');

describe('the route registry', () => {
  it('names every route that is mounted, and each has a stated access', () => {
    const registry = declared.map((route) => `${route.method} ${route.path}`).sort();
    const mounted = mountedRoutes()
      .filter((route) => !['get /', 'get /*splat', 'get /,/*splat'].includes(route))
      .sort();
    expect(mounted.length).toBeGreaterThan(20);
    expect(mounted).toEqual(registry);
    for (const route of declared) {
      expect(
        ['public', 'signed', 'member', 'desk', 'lab', 'admin'],
        `${route.method} ${route.path}`,
      ).toContain(route.access);
      expect(route.summary.length, `${route.path} says what it is for`).toBeGreaterThan(5);
    }
  });

  it('exempts only signed webhooks and public calculations from the token', () => {
    const exempt = declared.filter((route) => route.csrf === 'exempt');
    expect(exempt.map((route) => [route.path, route.access]).sort()).toEqual([
      ['/api/v1/valuations', 'public'],
      ['/api/v1/webhooks/stripe', 'signed'],
    ]);
  });

  it('turns away whoever the access does not name, on every route', async () => {
    const roles = ['member', 'desk', 'lab', 'admin'] as const;
    const people = new Map<string, Visitor>();
    for (const role of roles) people.set(role, await app.signIn(await buildMember({ role })));
    people.set('nobody', await app.visitor());
    const granted: Record<string, readonly string[]> = {
      member: roles,
      desk: ['desk', 'admin'],
      lab: ['lab'],
      admin: ['admin'],
    };
    for (const route of declared) {
      const allowed = granted[route.access];
      if (allowed === undefined) continue;
      for (const [role, visitor] of people) {
        if (allowed.includes(role)) continue;
        const request =
          route.method === 'get'
            ? visitor.get(sample(route.path))
            : route.method === 'delete'
              ? visitor.delete(sample(route.path))
              : route.method === 'put'
                ? visitor.put(sample(route.path))
                : visitor.post(sample(route.path), {});
        const answer = await request;
        const name = `${role}: ${route.method} ${route.path}`;
        expect(answer.status, name).toBe(role === 'nobody' ? 401 : 403);
        expect(answer.headers['content-type'], name).toContain('application/problem+json');
      }
    }
  });

  it('describes every route of the API, and nothing else', async () => {
    const answer = await (await app.visitor()).get('/api/v1/openapi.json').expect(200);
    const described = Object.entries(answer.body.paths as Record<string, Record<string, unknown>>).flatMap(
      ([path, methods]) =>
        Object.keys(methods).map((method) => `${method} ${path.replaceAll(/\{(\w+)\}/g, ':$1')}`),
    );
    expect(described.sort()).toEqual(allRoutes.map((route) => `${route.method} ${route.path}`).sort());
    expect(answer.body.openapi).toBe('3.1.0');
    const purchase = answer.body.paths['/api/v1/lots/{code}/purchase'].post;
    const headers = purchase.parameters.filter((parameter: { in: string }) => parameter.in === 'header');
    expect(headers.map((header: { name: string }) => header.name).sort()).toEqual([
      'Idempotency-Key',
      'X-CSRF-Token',
    ]);
  });

  it('answers an unknown address of the API with a problem document', async () => {
    const answer = await (await app.visitor()).get('/api/v1/nothing-like-it').expect(404);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body).toMatchObject({ code: 'not-found', status: 404, type: '/problems/not-found' });
  });

  it('answers a body that is not JSON with a problem document', async () => {
    const visitor = await app.visitor();
    const answer = await visitor.agent
      .post('/api/v1/session')
      .set('Content-Type', 'application/json')
      .send('{"email":');
    expect(answer.status).toBe(400);
    expect(answer.body.code).toBe('malformed-request');
  });

  it('says which methods an address takes, when asked by another', async () => {
    const { agent } = await app.visitor();
    const answer = await agent.patch('/api/v1/session').send({}).expect(405);
    expect(answer.body).toMatchObject({ code: 'method-not-allowed', status: 405 });
    expect(answer.headers['allow']?.split(', ').sort()).toEqual(['DELETE', 'GET', 'POST']);
    await agent.put('/healthz').expect(405);
    await agent.get('/api/v1/webhooks/stripe').expect(405);
  });

  it('refuses a body that is too large or no JSON by the status that says so', async () => {
    const { agent } = await app.visitor();
    const huge = await agent.post('/api/v1/valuations').send({ mass: 'x'.repeat(300_000) });
    expect([huge.status, huge.body.code]).toEqual([413, 'request-too-large']);
    const xml = await agent.post('/api/v1/valuations').set('Content-Type', 'application/xml').send('<mass/>');
    expect([xml.status, xml.body.code]).toEqual([415, 'media-type-unsupported']);
    const packed = await agent
      .post('/api/v1/valuations')
      .set('Content-Type', 'application/json')
      .set('Content-Encoding', 'unheard-of')
      .send('{}');
    expect([packed.status, packed.body.code]).toEqual([415, 'media-type-unsupported']);
    const webhook = await agent.post('/api/v1/webhooks/stripe').send({ id: 'x'.repeat(1_100_000) });
    expect([webhook.status, webhook.body.code]).toEqual([413, 'request-too-large']);
  });

  it('sends the security headers, and no word of the framework', async () => {
    const answer = await (await app.visitor()).get('/api/v1/session').expect(200);
    expect(answer.headers['content-security-policy']).toContain("script-src 'self'");
    expect(answer.headers['content-security-policy']).not.toContain("script-src 'self' 'unsafe");
    expect(answer.headers['x-content-type-options']).toBe('nosniff');
    expect(answer.headers['cache-control']).toBe('no-store');
    expect(answer.headers['x-powered-by']).toBeUndefined();
  });
});
