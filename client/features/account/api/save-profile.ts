import type { ProfileRequest, SessionAnswer } from '#shared/schemas/session.ts';
import { apiSend } from '../../../lib/api-client.ts';

export function saveProfile(body: ProfileRequest): Promise<SessionAnswer> {
  return apiSend('/api/v1/me/profile', { method: 'PUT', body });
}
