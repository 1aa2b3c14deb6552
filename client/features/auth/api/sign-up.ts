import type { SessionAnswer, SignUpRequest } from '#shared/schemas/session.ts';
import { apiSend } from '../../../lib/api-client.ts';

export function signUp(body: SignUpRequest): Promise<SessionAnswer> {
  return apiSend('/api/v1/members', { body });
}
