import { redirect, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { SignInPage } from '../features/auth/components/sign-in-page.tsx';
import { safeNext } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { sessionQuery } from '../lib/session.ts';

/** Who is signed in already goes on; asked anew, for a session can have ended unseen. */
export async function loader({ request }: LoaderFunctionArgs) {
  const { member } = await queryClient.query({ ...sessionQuery, staleTime: 0 });
  return member === null ? null : redirect(safeNext(new URL(request.url).searchParams.get('next')));
}

export function Component() {
  const [search] = useSearchParams();
  return <SignInPage next={safeNext(search.get('next'))} />;
}
