import { queryOptions } from '@tanstack/react-query';
import type { CaseAnswer, QueueAnswer } from '#shared/schemas/desk.ts';
import { apiGet, apiSend } from '../../../lib/api-client.ts';

const BASE = '/api/v1/desk/certificates';

export const queueQuery = queryOptions({
  queryKey: ['desk', 'queue'],
  queryFn: ({ signal }) => apiGet<QueueAnswer>(BASE, { signal }),
  staleTime: 10_000,
});

export const caseQuery = (id: string) =>
  queryOptions({
    queryKey: ['desk', 'case', id],
    queryFn: ({ signal }) => apiGet<CaseAnswer>(`${BASE}/${id}`, { signal }),
    staleTime: 5_000,
  });

export type CaseAct = 'claim' | 'release' | 'verify' | 'examine' | 'return';

/** Every act on a case answers the case as it then stands. */
export function sendCaseAct(id: string, act: CaseAct, body: unknown = {}): Promise<CaseAnswer> {
  return apiSend<CaseAnswer>(`${BASE}/${id}/${act}`, { body });
}

export function sendPullLot(code: string, body: unknown): Promise<{ code: string; state: string }> {
  return apiSend(`/api/v1/desk/lots/${code}/pull`, { body });
}
