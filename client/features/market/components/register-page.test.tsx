import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { buildMember, buildRegister, buildRow } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

afterEach(() => vi.restoreAllMocks());

/** Answers the register and keeps what it was asked. */
function serveRegister(answer: (search: URLSearchParams) => object) {
  const asked: string[] = [];
  apiServer.use(
    http.get('/api/v1/lots', ({ request }) => {
      const search = new URL(request.url).searchParams;
      asked.push(search.toString());
      return HttpResponse.json(answer(search));
    }),
  );
  return asked;
}

describe('the register', () => {
  it('asks for what its address says and shows the choices as made', async () => {
    const asked = serveRegister(() => buildRegister([buildRow('S-AAAAA1')]));
    openPage('/lots?metal=Au&fineness-from=990&sort=percent-of-melt');
    expect(await screen.findByRole('link', { name: 'Gold button, cone mould' })).toHaveAttribute(
      'href',
      '/lots/S-AAAAA1',
    );
    expect(asked).toEqual(['sort=percent-of-melt&metal=Au&finenessMin=990']);
    expect(screen.getByText('1 lot').parentElement).toHaveTextContent('1 lot: gold · fineness from 990 ‰');
    const metals = within(screen.getByRole('group', { name: 'Metal' }));
    expect(metals.getByRole('link', { name: /^Au/ })).toHaveAttribute('aria-current', 'true');
    expect(screen.getByLabelText('Fineness from, ‰')).toHaveValue('990');
  });

  it('puts choices and ranges into the address, contents in the reader’s unit', async () => {
    const asked = serveRegister(() => buildRegister([buildRow('S-AAAAA1')]));
    const router = openPage('/lots', buildMember({ weightUnit: 'ozt' }));
    await userEvent.click(await screen.findByRole('link', { name: 'bar' }));
    await userEvent.click(screen.getByText('Fineness, fine content, share of melt, destination'));
    await userEvent.type(screen.getByLabelText('Fine content from, oz t'), '1,5');
    await userEvent.selectOptions(screen.getByLabelText('Ships to'), 'Canada');
    await userEvent.click(screen.getByRole('button', { name: 'Show lots within these' }));
    await screen.findByText(/fine content from 1.5 oz t · ships to Canada/);
    expect(router.state.location.search).toBe('?form=bar&content-from=1.5&content-unit=ozt&to=CA');
    expect(asked.at(-1)).toBe('sort=newest&form=bar&fineGramsMin=46.6552152&destination=CA');
  });

  it('keeps the list and says at the field what it cannot read', async () => {
    const asked = serveRegister(() => buildRegister([buildRow('S-AAAAA1')]));
    const router = openPage('/lots');
    await userEvent.click(await screen.findByText('Fineness, fine content, share of melt, destination'));
    const field = screen.getByLabelText('Fineness to, ‰');
    await userEvent.type(field, '1000.1{Enter}');
    expect(field).toBeInvalid();
    expect(field).toHaveFocus();
    expect(field).toHaveAccessibleDescription(/at most 1000/);
    expect(router.state.location.search).toBe('');
    expect(asked).toHaveLength(1);
  });

  it('fetches further lots by the cursor, and keeps how many pages are shown in the address', async () => {
    serveRegister((search) =>
      search.get('cursor') === 'next-1'
        ? buildRegister([buildRow('S-BBBBB1', { title: 'Cast bar' })], { count: 2 })
        : buildRegister([buildRow('S-AAAAA1')], { count: 1000, isCountCapped: true, nextCursor: 'next-1' }),
    );
    const router = openPage('/lots?metal=Au');
    expect(await screen.findByText('more than 1,000 lots')).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Further lots' }));
    const added = await screen.findByRole('link', { name: 'Cast bar' });
    expect(added).toHaveFocus();
    expect(screen.getByRole('link', { name: 'Gold button, cone mould' })).toBeVisible();
    expect(router.state.location.search).toBe('?metal=Au&pages=2');
    expect(screen.queryByRole('button', { name: 'Further lots' })).toBeNull();
  });

  it('says plainly that there is no quote', async () => {
    serveRegister(() =>
      buildRegister([buildRow('S-AAAAA1', { melt: null, percentOfMelt: null })], {
        quoteState: 'none',
        quotedAt: null,
      }),
    );
    openPage('/lots');
    expect(await screen.findByText('There is no quote')).toBeVisible();
    expect(screen.getByText('no quote')).toBeVisible();
  });

  it('shows the way out of an empty list', async () => {
    serveRegister(() => buildRegister([]));
    openPage('/lots?metal=Pd');
    expect(await screen.findByText('No open lot is like that')).toBeVisible();
    for (const way of screen.getAllByRole('link', { name: 'Show every open lot' }))
      expect(way).toHaveAttribute('href', '/lots');
  });

  it('tells a failure in its place and leaves the filters at hand', async () => {
    apiServer.use(
      http.get('/api/v1/lots', () =>
        HttpResponse.json(
          { code: 'invalid-input', detail: 'This page mark is not known.' },
          { status: 422, headers: { 'Content-Type': 'application/problem+json' } },
        ),
      ),
    );
    openPage('/lots');
    expect(await screen.findByRole('alert')).toHaveTextContent('This page mark is not known.');
    expect(screen.getByRole('group', { name: 'Metal' })).toBeVisible();
  });
});
