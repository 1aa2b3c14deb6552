import { queryOptions } from '@tanstack/react-query';
import type { LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { apiGet } from '../../../lib/api-client.ts';

/** The register of laboratories, to choose from. */
export const laboratoriesQuery = queryOptions({
  queryKey: ['laboratories'],
  queryFn: ({ signal }) => apiGet<{ laboratories: LaboratoryAnswer[] }>('/api/v1/laboratories', { signal }),
  staleTime: 5 * 60_000,
});
