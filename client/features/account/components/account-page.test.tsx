import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { openRoutes } from '#tests/helpers/open-routes.tsx';
import { sampleMember } from '#tests/helpers/sample-deal.ts';
import type { MemberAnswer } from '#shared/schemas/session.ts';
import { leaveTo } from '../../../lib/leave-to.ts';
import { queryClient } from '../../../lib/query-client.ts';
import * as accountRoute from '../../../routes/account.tsx';

vi.mock('../../../lib/leave-to.ts', () => ({ leaveTo: vi.fn() }));

const REFRESH = '/api/v1/me/payout-account/refresh';
const started = (requirements: string[]): MemberAnswer['payouts'] => ({ state: 'started', requirements });

function open(address: string, member: MemberAnswer | null) {
  let current = member;
  apiServer.use(http.get('/api/v1/session', () => HttpResponse.json({ csrfToken: 't', member: current })));
  const router = openRoutes([{ path: '/account', ...accountRoute }], address);
  const become = (next: MemberAnswer) => {
    current = next;
  };
  return { router, become };
}

beforeEach(() => vi.mocked(leaveTo).mockClear());

describe('payout onboarding', () => {
  it('says what payouts are for before they are opened, and goes to the provider', async () => {
    open('/account', sampleMember());
    apiServer.use(
      http.post('/api/v1/me/payout-account', () => HttpResponse.json({ url: 'https://provider.example/1' })),
    );
    expect(await screen.findByText('not opened')).toBeVisible();
    expect(screen.queryByRole('button', { name: 'Ask the provider again' })).toBeNull();
    await userEvent.click(screen.getByRole('button', { name: 'Open payouts at the provider' }));
    await waitFor(() => expect(leaveTo).toHaveBeenCalledWith('https://provider.example/1'));
  });

  it('names what the provider still asks for, each once and in words', async () => {
    open(
      '/account',
      sampleMember({
        payouts: started(['external_account', 'individual.dob.day', 'individual.dob.month', 'odd_new.thing']),
      }),
    );
    expect(await screen.findByText('not finished')).toBeVisible();
    expect(screen.getAllByRole('listitem').map((item) => item.textContent)).toEqual([
      'a bank account for payouts',
      'your date of birth',
      'odd new thing',
    ]);
  });

  it('asks the provider once after a return and says that payouts are open', async () => {
    const { router, become } = open('/account?payouts=returned', sampleMember({ payouts: started([]) }));
    const ready = { state: 'ready' as const, requirements: [] };
    let asked = 0;
    apiServer.use(
      http.post(REFRESH, () => {
        asked += 1;
        become(sampleMember({ payouts: ready }));
        return HttpResponse.json(ready);
      }),
    );
    expect(await screen.findByText('The provider says: payouts are open')).toBeVisible();
    expect(asked).toBe(1);
    expect(router.state.location.search).toBe('');
  });

  it('does not call a return a success', async () => {
    const open_ = started(['external_account']);
    const { become } = open('/account?payouts=returned', sampleMember());
    apiServer.use(
      http.post(REFRESH, () => {
        become(sampleMember({ payouts: open_ }));
        return HttpResponse.json(open_);
      }),
    );
    expect(await screen.findByText('The provider says: not finished yet')).toBeVisible();
    expect(screen.getByText('a bank account for payouts')).toBeVisible();
    expect(screen.queryByText(/payouts are open/)).toBeNull();
  });

  it('says so when the provider cannot be asked', async () => {
    open('/account?payouts=returned', sampleMember({ payouts: started([]) }));
    apiServer.use(
      http.post(REFRESH, () =>
        HttpResponse.json(
          { code: 'payment-provider-unavailable', detail: 'The payment provider does not answer' },
          { status: 503 },
        ),
      ),
    );
    expect(await screen.findByRole('alert')).toHaveTextContent('The payment provider does not answer');
    expect(screen.getByText('not finished')).toBeVisible();
  });

  it('makes a new link once when the old one had run out', async () => {
    let made = 0;
    const { router } = open('/account?payouts=again', sampleMember({ payouts: started([]) }));
    apiServer.use(
      http.post('/api/v1/me/payout-account', () => {
        made += 1;
        return HttpResponse.json({ url: 'https://provider.example/2' });
      }),
    );
    await waitFor(() => expect(leaveTo).toHaveBeenCalledWith('https://provider.example/2'));
    expect(made).toBe(1);
    expect(router.state.location.search).toBe('');
  });

  it('keeps the account for members', async () => {
    const { router } = open('/account?payouts=returned', null);
    await screen.findByText('elsewhere');
    expect(router.state.location).toMatchObject({
      pathname: '/sign-in',
      search: `?next=${encodeURIComponent('/account?payouts=returned')}`,
    });
  });
});

describe('the profile', () => {
  it('is saved with unit and zone, and a refusal stands at its field', async () => {
    open('/account', sampleMember());
    let tries = 0;
    let sent: unknown;
    apiServer.use(
      http.put('/api/v1/me/profile', async ({ request }) => {
        sent = await request.json();
        tries += 1;
        if (tries === 1)
          return HttpResponse.json(
            {
              code: 'invalid-input',
              detail: 'Some fields need another value',
              errors: [
                { pointer: '/timeZone', code: 'unknown-time-zone', message: 'Choose a zone from the list' },
              ],
            },
            { status: 422 },
          );
        return HttpResponse.json({ csrfToken: 't2', member: sampleMember({ weightUnit: 'dwt' }) });
      }),
    );
    const user = userEvent.setup();
    await user.selectOptions(await screen.findByRole('combobox', { name: 'Unit of mass' }), 'dwt');
    await user.click(screen.getByRole('button', { name: 'Save the profile' }));
    await waitFor(() =>
      expect(screen.getByRole('combobox', { name: 'Time zone' })).toHaveAccessibleDescription(
        /Choose a zone from the list/,
      ),
    );
    await user.click(screen.getByRole('button', { name: 'Save the profile' }));
    await waitFor(() => expect(screen.queryByRole('alert')).toBeNull());
    expect(sent).toEqual({
      displayName: 'Tomas Reeve',
      region: 'Dunmere',
      weightUnit: 'dwt',
      timeZone: 'UTC',
    });
    expect(queryClient.getQueryData(['session'])).toMatchObject({ member: { weightUnit: 'dwt' } });
  });
});
