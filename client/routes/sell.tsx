import { MyLotsPage } from '../features/sell/components/my-lots-page.tsx';
import { myLotsQuery } from '../lib/lots.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader(): Promise<null> {
  await queryClient.query({ ...myLotsQuery, staleTime: 5_000 });
  return null;
}

export const Component = MyLotsPage;
