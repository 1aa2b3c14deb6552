import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { LinkButton } from '../components/ui/button.tsx';
import { ErrorState } from '../components/ui/error-state.tsx';
import { Page } from '../components/ui/page.tsx';
import { ApiProblem } from '../lib/api-client.ts';
import { paths } from '../lib/paths.ts';
import { useMember } from '../lib/session.ts';

function statusOf(error: unknown): number | null {
  if (error instanceof ApiProblem || isRouteErrorResponse(error)) return error.status;
  return null;
}

/** Stands in for a page that could not be shown. */
export function ErrorPage() {
  const error = useRouteError();
  const status = statusOf(error);
  if (status === 404) return <MissingPage />;
  if (status === 401) return <SignInNeeded />;
  if (status === 403) return <NotYours error={error} />;
  return (
    <Page title="This page could not be shown">
      <ErrorState error={error} onRetry={() => window.location.reload()} />
    </Page>
  );
}

/** Also what a member sees who asks for something that is not theirs to see. */
export function MissingPage() {
  return (
    <Page title="Nothing is filed under this address">
      <p className="max-w-prose text-ink-2">
        The address may be mistyped, the entry may have been withdrawn, or it is not open to this account.
      </p>
      <LinkButton to={paths.home()} className="mt-6">
        Go to the first page
      </LinkButton>
    </Page>
  );
}

function SignInNeeded() {
  const here = window.location.pathname + window.location.search;
  return (
    <Page title="Sign in to see this page">
      <p className="max-w-prose text-ink-2">This part of the register is kept for its members.</p>
      <LinkButton to={paths.signIn(here)} className="mt-6">
        Sign in
      </LinkButton>
    </Page>
  );
}

/** Asking again would be refused again: the way out leads to what is open to this account. */
function NotYours({ error }: { error: unknown }) {
  const canUseDesk = useMember()?.can.useDesk ?? false;
  return (
    <Page title="This page is not open to your account">
      <p className="max-w-prose text-ink-2">
        {error instanceof ApiProblem && error.code !== 'forbidden'
          ? error.detail
          : 'It is kept for accounts with another role.'}
      </p>
      <div className="mt-6 flex flex-wrap gap-3">
        {canUseDesk && <LinkButton to={paths.desk()}>Go to the desk</LinkButton>}
        <LinkButton look={canUseDesk ? 'second' : 'main'} to={paths.home()}>
          Go to the first page
        </LinkButton>
      </div>
    </Page>
  );
}
