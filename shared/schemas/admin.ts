import { z } from 'zod';
import { instant } from './common.ts';

/** A mail that was given up: not accepted after the last try, or refused for good. */
export const deadMailRow = z.object({
  id: z.uuid(),
  /** The mail's name, such as `deal-funded-seller`. */
  mail: z.string(),
  /** Who gets it, by the name in the account; null where the account is not known. */
  member: z.object({ id: z.uuid(), displayName: z.string() }).nullable(),
  recipient: z.string(),
  tries: z.number().int(),
  /** What the mail server, or the writing of the mail, said at the last try. */
  lastError: z.string().nullable(),
  orderedAt: instant,
  deadSince: instant,
});
export type DeadMailRow = z.infer<typeof deadMailRow>;

/** The newest given-up mails first, at most 100, and how many there are in all. */
export const deadMailsAnswer = z.object({ rows: z.array(deadMailRow), total: z.number().int() });
export type DeadMailsAnswer = z.infer<typeof deadMailsAnswer>;
