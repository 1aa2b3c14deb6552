import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { describe, expect, it } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { openRoutes } from '#tests/helpers/open-routes.tsx';
import { sampleMember } from '#tests/helpers/sample-deal.ts';
import { queryClient } from '../../../lib/query-client.ts';
import * as signInRoute from '../../../routes/sign-in.tsx';
import * as signUpRoute from '../../../routes/sign-up.tsx';

function open(address: string, member: unknown = null) {
  apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member })));
  return openRoutes(
    [
      { path: '/sign-in', ...signInRoute },
      { path: '/sign-up', ...signUpRoute },
    ],
    address,
  );
}

const refuse = (status: number, body: object) =>
  HttpResponse.json(body, { status, headers: { 'content-type': 'application/problem+json' } });

async function fillSignIn() {
  const user = userEvent.setup();
  await user.type(await screen.findByRole('textbox', { name: 'E-mail' }), 'tomas@reeve.example');
  await user.type(screen.getByLabelText('Password'), 'a long enough one');
  await user.click(screen.getByRole('button', { name: 'Sign in' }));
  return user;
}

describe('signing in', () => {
  it('names each empty field and sends nothing', async () => {
    open('/sign-in');
    await userEvent.click(await screen.findByRole('button', { name: 'Sign in' }));
    expect(screen.getByRole('alert')).toHaveTextContent('2 things need another look');
    expect(screen.getByRole('textbox', { name: 'E-mail' })).toHaveAccessibleDescription(
      'Write your e-mail address',
    );
    expect(document.title).toBe('Error: Sign in · Scruple');
  });

  it.each([
    [401, 'wrong-credentials', 'E-mail or password is not right'],
    [429, 'too-many-requests', 'Too many tries; wait a little'],
    [403, 'member-suspended', 'This account is suspended'],
  ])('says why it was refused (%i) and keeps what was typed', async (status, code, detail) => {
    open('/sign-in');
    apiServer.use(http.post('/api/v1/session', () => refuse(status, { code, detail })));
    await fillSignIn();
    expect(await screen.findByRole('alert')).toHaveTextContent(detail);
    expect(screen.getByRole('textbox', { name: 'E-mail' })).toHaveValue('tomas@reeve.example');
    expect(screen.getByLabelText('Password')).toHaveValue('a long enough one');
  });

  it.each([
    ['/deals/D-81QX2A?payment=returned', '/deals/D-81QX2A?payment=returned'],
    ['//evil.example/deals', '/'],
    ['https://evil.example', '/'],
    ['/\\evil.example', '/'],
  ])('goes on to %s only inside the house', async (next, target) => {
    const router = open(`/sign-in?next=${encodeURIComponent(next)}`);
    apiServer.use(
      http.post('/api/v1/session', () => HttpResponse.json({ csrfToken: 'new', member: sampleMember() })),
    );
    await fillSignIn();
    expect(await screen.findByText('elsewhere')).toBeVisible();
    const { pathname, search } = router.state.location;
    expect(pathname + search).toBe(target);
    expect(router.state.historyAction).toBe('REPLACE');
  });

  it('forgets what was read before as somebody else', async () => {
    open('/sign-in');
    apiServer.use(
      http.post('/api/v1/session', () => HttpResponse.json({ csrfToken: 'new', member: sampleMember() })),
    );
    queryClient.setQueryData(['lot', 'S-2K7F4B'], { isMine: false });
    await fillSignIn();
    await screen.findByText('elsewhere');
    expect(queryClient.getQueryData(['lot', 'S-2K7F4B'])).toBeUndefined();
    expect(queryClient.getQueryData(['session'])).toMatchObject({ csrfToken: 'new' });
  });

  it('sends on who is signed in already', async () => {
    const router = open('/sign-in?next=/deals', sampleMember());
    await screen.findByText('elsewhere');
    expect(router.state.location.pathname).toBe('/deals');
  });
});

describe('signing up', () => {
  it('guesses the time zone, asks for the age, and puts a taken address at its field', async () => {
    open('/sign-up?next=/lots');
    let sent: Record<string, unknown> = {};
    apiServer.use(
      http.post('/api/v1/members', async ({ request }) => {
        sent = (await request.json()) as Record<string, unknown>;
        return refuse(409, { code: 'email-taken', detail: 'There is an account with this e-mail already' });
      }),
    );
    const user = userEvent.setup();
    await user.type(await screen.findByRole('textbox', { name: 'E-mail' }), 'tomas@reeve.example');
    await user.type(screen.getByLabelText('Password'), 'short');
    await user.type(screen.getByRole('textbox', { name: 'Name' }), 'Tomas Reeve');
    await user.type(screen.getByRole('textbox', { name: 'Region' }), 'Dunmere');
    await user.click(screen.getByRole('button', { name: 'Make the account' }));
    expect(screen.getByRole('alert')).toHaveTextContent('Use at least 10 characters');
    expect(screen.getByRole('alert')).toHaveTextContent('Confirm that you are 18 or older');
    await user.type(screen.getByLabelText('Password'), ' but longer now');
    await user.click(screen.getByRole('checkbox', { name: 'I am 18 or older' }));
    await user.click(screen.getByRole('button', { name: 'Make the account' }));
    await waitFor(() =>
      expect(screen.getByRole('textbox', { name: 'E-mail' })).toHaveAccessibleDescription(
        'There is an account with this e-mail already',
      ),
    );
    expect(sent).toMatchObject({ isOfAge: true, region: 'Dunmere' });
    expect(sent.timeZone).toBe(Intl.DateTimeFormat().resolvedOptions().timeZone);
  });
});
