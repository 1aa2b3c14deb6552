import { queryOptions } from '@tanstack/react-query';
import type { LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { apiGet, apiSend } from '../../../lib/api-client.ts';

const BASE = '/api/v1/laboratories';

export const laboratoriesQuery = queryOptions({
  queryKey: ['desk', 'laboratories'],
  queryFn: async ({ signal }) =>
    (await apiGet<{ laboratories: LaboratoryAnswer[] }>(BASE, { signal })).laboratories,
  staleTime: 30_000,
});

/** Adds a laboratory, or changes the one with this id. */
export function sendLaboratory(id: string | null, body: unknown): Promise<LaboratoryAnswer> {
  return id === null ? apiSend(BASE, { body }) : apiSend(`${BASE}/${id}`, { method: 'PUT', body });
}
