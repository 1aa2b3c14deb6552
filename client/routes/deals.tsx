import { dealsQuery } from '../lib/deals.ts';
import { DealsPage } from '../features/deals/components/deals-page.tsx';
import { queryClient } from '../lib/query-client.ts';

export async function loader(): Promise<null> {
  await queryClient.fetchQuery(dealsQuery);
  return null;
}

export function Component() {
  return <DealsPage />;
}
