import { isRouted } from '../app/routes.tsx';
import { dealsQuery } from '../lib/deals.ts';
import { DealsPage } from '../features/deals/components/deals-page.tsx';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader(): Promise<null> {
  await queryClient.fetchQuery(dealsQuery);
  return null;
}

export function Component() {
  return <DealsPage hasRegister={isRouted(paths.register())} />;
}
