import { ContestedPage } from '../features/desk/components/contested-page.tsx';
import { deskDealsQuery } from '../features/desk/api/desk-deals.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader() {
  await queryClient.fetchQuery(deskDealsQuery);
  return null;
}

export function Component() {
  return <ContestedPage />;
}
