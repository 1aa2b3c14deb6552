import { useEffect, useState } from 'react';
import { redirect, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { AccountPage } from '../features/account/components/account-page.tsx';
import type { PayoutsArrival } from '../features/account/hooks/use-payouts.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { sessionQuery, useMember } from '../lib/session.ts';

export async function loader({ request }: LoaderFunctionArgs) {
  const { member } = await queryClient.query(sessionQuery);
  const { pathname, search } = new URL(request.url);
  return member === null ? redirect(paths.signIn(pathname + search)) : null;
}

function arrivalOf(search: URLSearchParams): PayoutsArrival {
  const said = search.get('payouts');
  return said === 'returned' || said === 'again' ? said : null;
}

/** The provider sends its visitors back here; the address is tidied at once, so that going back or loading again repeats nothing. */
export function Component() {
  const member = useMember();
  const [search, setSearch] = useSearchParams();
  const [arrival] = useState(() => arrivalOf(search));
  const isMarked = search.has('payouts');
  useEffect(() => {
    if (isMarked) setSearch({}, { replace: true });
  }, [isMarked, setSearch]);
  return member && <AccountPage member={member} arrival={arrival} />;
}
