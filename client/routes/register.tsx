import type { LoaderFunctionArgs } from 'react-router-dom';
import { registerQuery } from '../features/market/api/register-query.ts';
import { RegisterPage } from '../features/market/components/register-page.tsx';
import { filtersFromSearch, pagesFromSearch } from '../features/market/register-filters.ts';
import { queryClient } from '../lib/query-client.ts';

/** Lists that were read before are shown at once, as far as they were read, so that going back finds its place. */
export async function loader({ request }: LoaderFunctionArgs): Promise<null> {
  const { searchParams } = new URL(request.url);
  const query = registerQuery(filtersFromSearch(searchParams));
  // A failure is shown in the page, where the filters stay at hand.
  await queryClient
    .infiniteQuery({ ...query, pages: pagesFromSearch(searchParams), staleTime: 'static' })
    .catch(() => null);
  return null;
}

export const Component = RegisterPage;
