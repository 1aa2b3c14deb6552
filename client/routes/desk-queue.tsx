import { QueuePage } from '../features/desk/components/queue-page.tsx';
import { queueQuery } from '../features/desk/api/certificates.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader() {
  await queryClient.fetchQuery(queueQuery);
  return null;
}

export function Component() {
  return <QueuePage />;
}
