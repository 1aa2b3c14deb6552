import connectSessionSequelize from 'connect-session-sequelize';
import type { RequestHandler } from 'express';
import session from 'express-session';
import { SESSION_ABSOLUTE_DAYS, SESSION_IDLE_HOURS } from '#shared/limits.ts';
import { sequelize } from '#server/database/connection.ts';
import { env } from '#server/env.ts';

const isSecure = env.PUBLIC_URL.startsWith('https://');

/** The `__Host-` prefix binds the cookie to this very host; browsers accept it only with Secure, hence not on plain http. */
export const SESSION_COOKIE = isSecure ? '__Host-scruple' : 'scruple';

/** Sessions live in the database, so that any instance can answer and a sign-out holds everywhere. */
export function createSessionMiddleware(): { middleware: RequestHandler; close: () => void } {
  const Store = connectSessionSequelize(session.Store);
  const store = new Store({
    db: sequelize,
    tableName: 'sessions',
    table: 'SessionRow',
    checkExpirationInterval: env.NODE_ENV === 'test' ? 0 : 15 * 60 * 1000,
    expiration: SESSION_IDLE_HOURS * 3_600_000,
    extendDefaultFields: (defaults, data: { passport?: { user?: string } }) => ({
      ...defaults,
      memberId: data.passport?.user ?? null,
    }),
  });
  const middleware = session({
    name: SESSION_COOKIE,
    secret: env.SESSION_SECRET,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: false,
    proxy: env.TRUST_PROXY > 0,
    cookie: {
      httpOnly: true,
      secure: isSecure,
      sameSite: 'lax',
      path: '/',
      maxAge: SESSION_IDLE_HOURS * 3_600_000,
    },
  });
  return { middleware, close: () => store.stopExpiringSessions() };
}

/** However busy, a session ends some days after sign-in. */
export const endOldSessions: RequestHandler = (req, _res, next) => {
  const since = req.session.signedInAt;
  if (since === undefined || Date.now() - Date.parse(since) < SESSION_ABSOLUTE_DAYS * 86_400_000)
    return next();
  req.session.regenerate(next);
};
