import { infiniteQueryOptions } from '@tanstack/react-query';
import type { AuditAnswer } from '#shared/schemas/desk.ts';
import { apiGet } from '../../../lib/api-client.ts';

export const auditQuery = infiniteQueryOptions({
  queryKey: ['desk', 'audit'],
  queryFn: ({ signal, pageParam }) =>
    apiGet<AuditAnswer>(
      `/api/v1/admin/audit${pageParam === '' ? '' : `?before=${encodeURIComponent(pageParam)}`}`,
      { signal },
    ),
  initialPageParam: '',
  getNextPageParam: (page: AuditAnswer) => page.nextBefore ?? undefined,
  staleTime: 5_000,
});
