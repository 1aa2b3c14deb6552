import { queryOptions } from '@tanstack/react-query';
import type { DeskDealsAnswer } from '#shared/schemas/desk.ts';
import { apiGet } from '../../../lib/api-client.ts';

export const deskDealsQuery = queryOptions({
  queryKey: ['desk', 'deals'],
  queryFn: ({ signal }) => apiGet<DeskDealsAnswer>('/api/v1/desk/deals', { signal }),
  staleTime: 10_000,
});
