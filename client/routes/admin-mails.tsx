import { DeadMailsPage } from '../features/desk/components/dead-mails-page.tsx';
import { deadMailsQuery } from '../features/desk/api/dead-mails.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader() {
  await queryClient.fetchQuery(deadMailsQuery);
  return null;
}

export function Component() {
  return <DeadMailsPage />;
}
