import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import supertest from 'supertest';
import { afterAll } from 'vitest';
import { createApp } from '#server/app.ts';
import { sequelize } from '#server/database/connection.ts';
import type { SessionAnswer } from '#shared/schemas/session.ts';

export type TestAgent = ReturnType<typeof supertest.agent>;

/** Someone at a browser: keeps the cookie and sends the page's token with every unsafe request. */
export type Visitor = {
  agent: TestAgent;
  get: (path: string) => supertest.Test;
  post: (path: string, body?: object, headers?: Record<string, string>) => supertest.Test;
  put: (path: string, body?: object) => supertest.Test;
  delete: (path: string) => supertest.Test;
  refreshToken: () => Promise<SessionAnswer>;
};

export type TestApp = {
  url: string;
  visitor: () => Promise<Visitor>;
  signIn: (credentials: { email: string; password: string }) => Promise<Visitor>;
};

function visitorOf(agent: TestAgent): Visitor {
  let token = '';
  const withToken = (test: supertest.Test) => test.set('X-CSRF-Token', token);
  return {
    agent,
    get: (path) => agent.get(path),
    post: (path, body = {}, headers = {}) => withToken(agent.post(path)).set(headers).send(body),
    put: (path, body = {}) => withToken(agent.put(path)).send(body),
    delete: (path) => withToken(agent.delete(path)),
    refreshToken: async () => {
      const answer = await agent.get('/api/v1/session').expect(200);
      token = (answer.body as SessionAnswer).csrfToken;
      return answer.body as SessionAnswer;
    },
  };
}

/** The whole API over real HTTP on a free port; closed, with the pool, when the file's tests have ended. */
export async function startTestApp(): Promise<TestApp> {
  const { app, close } = createApp();
  const server: Server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  afterAll(async () => {
    close();
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
    await sequelize.close();
  });
  const visitor = async (): Promise<Visitor> => {
    const made = visitorOf(supertest.agent(url));
    await made.refreshToken();
    return made;
  };
  return {
    url,
    visitor,
    signIn: async (credentials) => {
      const made = await visitor();
      await made
        .post('/api/v1/session', { email: credentials.email, password: credentials.password })
        .expect(200);
      await made.refreshToken();
      return made;
    },
  };
}
