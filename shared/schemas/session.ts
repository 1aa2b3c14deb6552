import { z } from 'zod';
import { PASSWORD_LENGTH_MAX, PASSWORD_LENGTH_MIN } from '../limits.ts';
import { roleSchema } from '../roles.ts';
import { instant, weightUnitSchema } from './common.ts';

const email = z.email('Write an e-mail address such as name@example.com').max(254);
const displayName = z.string().trim().min(2, 'Write at least 2 characters').max(80);
const region = z.string().trim().min(2, 'Write the region you live in').max(60);

export const signUpRequest = z.object({
  email,
  password: z
    .string()
    .min(PASSWORD_LENGTH_MIN, `Use at least ${PASSWORD_LENGTH_MIN} characters`)
    .max(PASSWORD_LENGTH_MAX, `Use at most ${PASSWORD_LENGTH_MAX} characters`),
  displayName,
  region,
  timeZone: z.string().min(1).max(64).default('UTC'),
  isOfAge: z.literal(true, { error: 'Confirm that you are 18 or older' }),
});
export type SignUpRequest = z.infer<typeof signUpRequest>;

export const signInRequest = z.object({
  email: z.string().min(1, 'Write your e-mail address').max(254),
  password: z.string().min(1, 'Write your password').max(PASSWORD_LENGTH_MAX),
});
export type SignInRequest = z.infer<typeof signInRequest>;

export const profileRequest = z.object({
  displayName,
  region,
  weightUnit: weightUnitSchema,
  timeZone: z.string().min(1).max(64),
});
export type ProfileRequest = z.infer<typeof profileRequest>;

export const memberAnswer = z.object({
  id: z.uuid(),
  email: z.string(),
  displayName: z.string(),
  role: roleSchema,
  region: z.string(),
  weightUnit: weightUnitSchema,
  timeZone: z.string(),
  suspendedAt: instant.nullable(),
  suspensionReason: z.string().nullable(),
  payouts: z.object({
    state: z.enum(['none', 'started', 'ready']),
    requirements: z.array(z.string()),
  }),
  can: z.object({ sell: z.boolean(), useDesk: z.boolean() }),
});
export type MemberAnswer = z.infer<typeof memberAnswer>;

/** What the client asks first: who is here, the token for unsafe requests, and the state of the quotes for the header. */
export const sessionAnswer = z.object({
  csrfToken: z.string(),
  member: memberAnswer.nullable(),
});
export type SessionAnswer = z.infer<typeof sessionAnswer>;

export const onboardingAnswer = z.object({ url: z.url() });
