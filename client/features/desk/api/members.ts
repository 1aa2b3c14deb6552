import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { DeskMemberAnswer, deskMembersAnswer } from '#shared/schemas/desk.ts';
import { apiGet, apiSend } from '../../../lib/api-client.ts';

const BASE = '/api/v1/desk/members';

export const membersQuery = (text: string) =>
  queryOptions({
    queryKey: ['desk', 'members', text],
    queryFn: ({ signal }) =>
      apiGet<z.infer<typeof deskMembersAnswer>>(`${BASE}?query=${encodeURIComponent(text)}`, { signal }),
    staleTime: 5_000,
  });

export function sendSuspend(id: string, body: unknown): Promise<DeskMemberAnswer> {
  return apiSend(`${BASE}/${id}/suspend`, { body });
}

export function sendReinstate(id: string): Promise<DeskMemberAnswer> {
  return apiSend(`${BASE}/${id}/reinstate`, { body: {} });
}
