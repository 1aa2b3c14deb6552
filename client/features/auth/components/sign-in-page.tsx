import { Link } from 'react-router-dom';
import { signInRequest } from '#shared/schemas/session.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ErrorSummary } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/inputs.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { signIn } from '../api/sign-in.ts';
import { useEnter } from '../hooks/use-enter.ts';

type SignInPageProps = { next: string };

export function SignInPage({ next }: SignInPageProps) {
  const form = useForm({
    initial: { email: '', password: '' },
    read: (values) => readBy(signInRequest, values),
    send: signIn,
    onDone: useEnter(next),
  });
  return (
    <Page title="Sign in">
      <OfflineNotice />
      <form
        noValidate
        aria-label="Sign in"
        className="flex max-w-md flex-col gap-5"
        onSubmit={(event) => {
          event.preventDefault();
          if (!form.isBusy) form.submit();
        }}
      >
        <ErrorSummary items={form.items} attempt={form.attempt} />
        <Field id={form.fieldId('email')} label="E-mail" error={form.errorOf('email')}>
          {(ties) => (
            <TextInput
              {...ties}
              type="email"
              autoComplete="username"
              value={form.values.email}
              onChange={(event) => form.set('email', event.target.value)}
            />
          )}
        </Field>
        <Field id={form.fieldId('password')} label="Password" error={form.errorOf('password')}>
          {(ties) => (
            <TextInput
              {...ties}
              type="password"
              autoComplete="current-password"
              value={form.values.password}
              onChange={(event) => form.set('password', event.target.value)}
            />
          )}
        </Field>
        <div>
          <Button type="submit" busy={form.isBusy} busyText="Signing in">
            Sign in
          </Button>
        </div>
      </form>
      <p className="mt-8 max-w-md border-t border-rule pt-4 text-ink-2">
        No account yet?{' '}
        <Link to={paths.signUp(next)} className="link">
          Sign up
        </Link>
        . One account buys and sells.
      </p>
    </Page>
  );
}
