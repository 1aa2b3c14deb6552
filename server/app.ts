import compression from 'compression';
import express, { type Express } from 'express';
import { pinoHttp } from 'pino-http';
import '#server/models/index.ts';
import { env } from '#server/env.ts';
import { logger } from '#server/logger.ts';
import { errorHandler, nothingHere } from '#server/middleware/error-handler.ts';
import { methodNotAllowed } from '#server/middleware/method-not-allowed.ts';
import { securityHeaders } from '#server/middleware/security-headers.ts';
import { endOldSessions, createSessionMiddleware } from '#server/features/members/session-middleware.ts';
import { passport } from '#server/features/members/passport.ts';
import { healthRoutes } from '#server/features/health/health-routes.ts';
import { allRoutes } from '#server/routing/all-routes.ts';
import { mountRoutes } from '#server/routing/mount-routes.ts';
import { serveClient } from '#server/routing/serve-client.ts';

/** Middleware, routers, error handler last. Webhooks read raw bytes and therefore stand before the JSON parser. */
export function createApp(): { app: Express; close: () => void } {
  const app = express();
  const session = createSessionMiddleware();
  app.disable('x-powered-by');
  app.set('trust proxy', env.TRUST_PROXY);
  app.set('query parser', 'simple');
  app.use(securityHeaders);
  app.use(pinoHttp({ logger, autoLogging: env.NODE_ENV !== 'test', quietReqLogger: true }));
  app.use(compression());
  mountRoutes(app, healthRoutes);
  app.use('/api', (_req, res, next) => {
    res.set('Cache-Control', 'no-store');
    next();
  });
  mountRoutes(
    app,
    allRoutes.filter((route) => route.access === 'signed'),
  );
  app.use('/api', express.json({ limit: '256kb' }), session.middleware, passport.session(), endOldSessions);
  mountRoutes(
    app,
    allRoutes.filter((route) => route.access !== 'signed'),
  );
  app.use(methodNotAllowed([...healthRoutes, ...allRoutes]));
  app.use('/api', nothingHere);
  serveClient(app);
  app.use(nothingHere);
  app.use(errorHandler);
  return { app, close: session.close };
}
