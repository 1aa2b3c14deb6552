import { queryOptions } from '@tanstack/react-query';
import type { DealsAnswer } from '#shared/schemas/deals.ts';
import { apiGet } from '../../../lib/api-client.ts';

/** Where the member stands; read again while something runs and the page is in view. */
export const dealsQuery = queryOptions({
  queryKey: ['deals', 'list'],
  queryFn: ({ signal }) => apiGet<DealsAnswer>('/api/v1/deals', { signal }),
  staleTime: 5_000,
  refetchInterval: ({ state }) =>
    state.data && state.data.toDo.length + state.data.running.length > 0 ? 30_000 : false,
});
