import type { SessionAnswer, SignInRequest } from '#shared/schemas/session.ts';
import { apiSend } from '../../../lib/api-client.ts';

export function signIn(body: SignInRequest): Promise<SessionAnswer> {
  return apiSend('/api/v1/session', { body });
}
