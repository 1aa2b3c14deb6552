import { queryOptions } from '@tanstack/react-query';
import type { DeadMailsAnswer } from '#shared/schemas/admin.ts';
import { apiGet, apiSend } from '../../../lib/api-client.ts';

const BASE = '/api/v1/admin/mails';

export const deadMailsQuery = queryOptions({
  queryKey: ['desk', 'dead-mails'],
  queryFn: ({ signal }) => apiGet<DeadMailsAnswer>(BASE, { signal }),
  staleTime: 5_000,
});

/** Puts a mail that was given up back among those that are due. */
export async function sendMailAgain(id: string): Promise<void> {
  await apiSend(`${BASE}/${encodeURIComponent(id)}/send-again`);
}
