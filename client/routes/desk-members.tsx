import type { LoaderFunctionArgs } from 'react-router-dom';
import { MembersPage } from '../features/desk/components/members-page.tsx';
import { membersQuery } from '../features/desk/api/members.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader({ request }: LoaderFunctionArgs) {
  const text = new URL(request.url).searchParams.get('query')?.trim() ?? '';
  await queryClient.fetchQuery(membersQuery(text));
  return null;
}

export function Component() {
  return <MembersPage />;
}
