import { createDocument, type ZodOpenApiOperationObject, type ZodOpenApiPathsObject } from 'zod-openapi';
import { z } from 'zod';
import { ERROR_CODES } from '#shared/error-codes.ts';
import { problemSchema } from '#shared/schemas/problem.ts';
import type { RouteDefinition } from './define-route.ts';

const ACCESS_WORDS: Readonly<Record<RouteDefinition['access'], string>> = {
  public: 'Open to everybody.',
  signed: 'Accepted by its signature alone.',
  member: 'For whoever is signed in.',
  desk: 'For the assay desk.',
  lab: 'For laboratories.',
  admin: 'For admins.',
};

function headersOf(route: RouteDefinition): z.ZodObject | undefined {
  const shape: Record<string, z.ZodType> = {};
  if (route.method !== 'get' && route.csrf !== 'exempt') {
    shape['X-CSRF-Token'] = z.string().describe('The token that GET /api/v1/session answers');
  }
  if (route.movesMoney === true) {
    shape['Idempotency-Key'] = z
      .string()
      .min(8)
      .max(255)
      .describe(
        'Made by the caller and kept over retries: the same key has the effect once and gets the same answer',
      );
  }
  return Object.keys(shape).length === 0 ? undefined : z.object(shape);
}

function operationOf(route: RouteDefinition): ZodOpenApiOperationObject {
  const headers = headersOf(route);
  const problem = { 'application/problem+json': { schema: problemSchema } };
  return {
    summary: route.summary,
    description: `${ACCESS_WORDS[route.access]} Limit: ${route.limit}.`,
    requestParams: {
      ...(route.params === undefined ? {} : { path: route.params as z.ZodObject }),
      ...(route.query === undefined ? {} : { query: route.query as z.ZodObject }),
      ...(headers === undefined ? {} : { header: headers }),
    },
    ...(route.body === undefined
      ? {}
      : { requestBody: { content: { 'application/json': { schema: route.body } } } }),
    responses: {
      '2XX': {
        description: 'Done',
        ...(route.answer === undefined ? {} : { content: { 'application/json': { schema: route.answer } } }),
      },
      '4XX': { description: 'Refused; `code` says why', content: problem },
      '5XX': { description: 'A fault on our side, or of a service we depend on', content: problem },
    },
  };
}

/** The description of the API, made from the very definitions that are mounted, so that it cannot say anything else. */
export function describeApi(routes: readonly RouteDefinition[]): ReturnType<typeof createDocument> {
  const paths: ZodOpenApiPathsObject = {};
  for (const route of routes) {
    const path = route.path.replaceAll(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [route.method]: operationOf(route) };
  }
  return createDocument({
    openapi: '3.1.0',
    info: {
      title: 'Scruple',
      version: '1',
      description: `All figures are strings in plain decimal notation. Refusals are problem documents (RFC 9457) with one of these codes: ${Object.keys(ERROR_CODES).join(', ')}.`,
    },
    paths,
  });
}
