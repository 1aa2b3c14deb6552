import { queryOptions } from '@tanstack/react-query';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { apiGet } from '../../../lib/api-client.ts';

/** The lot whose sheet the first page shows; shares its place in the cache with the lot page. */
export function shownLotQuery(code: string) {
  return queryOptions({
    queryKey: ['lot', code],
    queryFn: ({ signal }) => apiGet<LotAnswer>(`/api/v1/lots/${encodeURIComponent(code)}`, { signal }),
    refetchInterval: 60_000,
  });
}
