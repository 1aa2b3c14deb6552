import type { RequestHandler } from 'express';
import type { z } from 'zod';
import { AppError, InvalidError, NotFoundError, type FieldError } from '#server/app-error.ts';
import type { RouteDefinition } from '#server/routing/define-route.ts';

/** RFC 6901 pointer of an issue, so that the client finds the field. */
export function pointerOf(path: readonly PropertyKey[]): string {
  return path.map((part) => `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}

export function fieldErrorsOf(error: z.ZodError): FieldError[] {
  return error.issues.map((issue) => ({
    pointer: pointerOf(issue.path),
    code: issue.code === 'custom' ? String(issue.params?.['code'] ?? 'custom') : issue.code,
    message: issue.message,
  }));
}

/** Parses params, query and body; all issues are answered at once. `req.query` is read-only in Express 5, hence `res.locals`. */
export function validate(route: Pick<RouteDefinition, 'params' | 'query' | 'body'>): RequestHandler {
  return (req, res, next) => {
    const params = route.params?.safeParse(req.params);
    if (params !== undefined && !params.success) throw new NotFoundError();
    // Null where no body came, which the schema may allow.
    if (route.body !== undefined && req.is('application/json') === false) {
      throw new AppError('media-type-unsupported', 'Send the body as application/json.');
    }
    const query = route.query?.safeParse(req.query);
    const body = route.body?.safeParse(req.body ?? {});
    const faults = [query, body].flatMap((part) =>
      part === undefined || part.success ? [] : fieldErrorsOf(part.error),
    );
    if (faults.length > 0) throw new InvalidError(faults);
    res.locals.input = { params: params?.data, query: query?.data, body: body?.data };
    next();
  };
}
