import type { RequestHandler } from 'express';
import { AppError } from '#server/app-error.ts';
import type { RouteDefinition } from '#server/routing/define-route.ts';

function patternOf(path: string): RegExp {
  const parts = path.split('/').map((part) => (part.startsWith(':') ? '[^/]+' : part.replaceAll('.', '\\.')));
  return new RegExp(`^${parts.join('/')}/?$`);
}

/** An address that is there, asked in a way that is not: says which ways are. Stands behind all routes. */
export function methodNotAllowed(routes: readonly RouteDefinition[]): RequestHandler {
  const known = routes.map(({ method, path }) => ({ method, pattern: patternOf(path) }));
  return (req, res, next) => {
    const methods = known.filter(({ pattern }) => pattern.test(req.path)).map(({ method }) => method);
    if (methods.length === 0) return next();
    res.set('Allow', [...new Set(methods.map((method) => method.toUpperCase()))].join(', '));
    throw new AppError('method-not-allowed');
  };
}
