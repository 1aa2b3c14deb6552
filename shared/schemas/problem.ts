import { z } from 'zod';

/** A refusal on the wire (RFC 9457): `code` is stable, `errors` name the fields by JSON pointer. */
export const problemSchema = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    code: z.string(),
    instance: z.string().optional(),
    errors: z.array(z.object({ pointer: z.string(), code: z.string(), message: z.string() })).optional(),
  })
  .meta({ id: 'Problem' });
