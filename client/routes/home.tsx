import { newestLotsQuery } from '../features/home/api/newest-lots-query.ts';
import { HomePage } from '../features/home/components/home-page.tsx';
import { queryClient } from '../lib/query-client.ts';
import { useMember } from '../lib/session.ts';

/** The first page never waits for the register; it shows what is there and fills in the rest. */
export function loader(): null {
  void queryClient.prefetchQuery(newestLotsQuery);
  return null;
}

export function Component() {
  return <HomePage isSignedIn={useMember() !== null} />;
}
