import { Link } from 'react-router-dom';
import { signUpRequest } from '#shared/schemas/session.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ErrorSummary } from '../../../components/ui/error-summary.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { guessedTimeZone } from '../../../lib/time-zones.ts';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { signUp } from '../api/sign-up.ts';
import { useEnter } from '../hooks/use-enter.ts';
import { blankSignUp, type SignUpValues } from '../sign-up-values.ts';
import { SignUpFields } from './sign-up-fields.tsx';

type SignUpPageProps = { next: string };

export function SignUpPage({ next }: SignUpPageProps) {
  const form = useForm({
    initial: { ...blankSignUp, timeZone: guessedTimeZone() } as SignUpValues,
    read: (values) => readBy(signUpRequest, values),
    send: signUp,
    onDone: useEnter(next),
  });
  return (
    <Page title="Sign up" sub="One account buys and sells; selling opens after payout onboarding.">
      <OfflineNotice />
      <form
        noValidate
        aria-label="Sign up"
        className="flex max-w-lg flex-col gap-5"
        onSubmit={(event) => {
          event.preventDefault();
          if (!form.isBusy) form.submit();
        }}
      >
        <ErrorSummary items={form.items} attempt={form.attempt} />
        <SignUpFields form={form} />
        <Notice title="Before you deal">
          Dealing in precious metal is licensed in many places, and acids and fumes can injure or kill. Check
          your local rules; this is not legal advice.
        </Notice>
        <div>
          <Button type="submit" busy={form.isBusy} busyText="Making the account">
            Make the account
          </Button>
        </div>
      </form>
      <p className="mt-8 max-w-lg border-t border-rule pt-4 text-ink-2">
        An account already?{' '}
        <Link to={paths.signIn(next)} className="link">
          Sign in
        </Link>
      </p>
    </Page>
  );
}
