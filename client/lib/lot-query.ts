import { queryOptions } from '@tanstack/react-query';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { apiGet } from './api-client.ts';

/** A lot as its reader may see it; read again every minute, because what it is worth moves with the quote. */
export function lotQuery(code: string) {
  return queryOptions({
    queryKey: ['lot', code],
    queryFn: ({ signal }) => apiGet<LotAnswer>(`/api/v1/lots/${encodeURIComponent(code)}`, { signal }),
    refetchInterval: 60_000,
  });
}
