import { queryOptions } from '@tanstack/react-query';
import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { apiGet } from '../../../lib/api-client.ts';

/** The newest lines of the register, for the first page. */
export const newestLotsQuery = queryOptions({
  queryKey: ['register', 'newest-three'],
  queryFn: ({ signal }) => apiGet<RegisterAnswer>('/api/v1/lots?sort=newest&limit=3', { signal }),
  refetchInterval: 60_000,
});
