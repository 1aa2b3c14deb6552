import { infiniteQueryOptions } from '@tanstack/react-query';
import type { RegisterAnswer } from '#shared/schemas/lots.ts';
import { apiGet } from '../../../lib/api-client.ts';
import { apiSearchOf, type RegisterFilters } from '../register-filters.ts';

/** The register under these filters, page by page; a cursor keeps the quotes that its listing began with. */
export function registerQuery(filters: RegisterFilters) {
  const search = apiSearchOf(filters).toString();
  return infiniteQueryOptions({
    queryKey: ['register', search],
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) => {
      const cursor = pageParam === null ? '' : `&cursor=${encodeURIComponent(pageParam)}`;
      return apiGet<RegisterAnswer>(`/api/v1/lots?${search}${cursor}`, { signal });
    },
    getNextPageParam: (last) => last.nextCursor,
  });
}
