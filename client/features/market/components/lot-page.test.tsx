import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { http, HttpResponse } from 'msw';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import type { LotAnswer, PhotoAnswer } from '#shared/schemas/lots.ts';
import { buildLot, buildMember } from '#tests/factories/build-market-answers.ts';
import { openPage } from '#tests/helpers/open-page.tsx';

afterEach(() => vi.restoreAllMocks());

const noBuy = { ...buildLot().can, buy: false };

function open(lot: LotAnswer, isSignedIn = true) {
  apiServer.use(http.get(`/api/v1/lots/${lot.code}`, () => HttpResponse.json(lot)));
  return openPage(`/lots/${lot.code}`, isSignedIn ? buildMember() : null);
}

function photo(number: number): PhotoAnswer {
  return {
    id: `0b7c1a52-57d5-4c39-9a5c-0f0de2f6a01${number}`,
    caption: `View ${number}`,
    isDrawing: true,
    thumb: `/api/v1/photos/${number}/240`,
    medium: `/api/v1/photos/${number}/960`,
    large: `/api/v1/photos/${number}/2000`,
    width: 960,
    height: 720,
  };
}

describe('the page of a lot', () => {
  it('shows ticket, sheet, seller’s region, destinations, cautions and the way to buy', async () => {
    open(buildLot());
    const price = within(await screen.findByRole('region', { name: 'Price and purchase' }));
    expect(price.getByRole('link', { name: /^Buy: US\$\s4,121.35 into escrow/ })).toHaveAttribute(
      'href',
      '/lots/S-2K7F0A/buy',
    );
    const ticket = screen.getByRole('region', { name: 'Assay of the gold' });
    expect(ticket).toHaveTextContent('Orrin Assay Rooms');
    expect(ticket).toHaveTextContent('the metal was not tested by Scruple');
    expect(screen.getByRole('region', { name: 'Settlement sheet' })).toHaveTextContent('4,168.38');
    const particulars = screen.getByRole('region', { name: 'Particulars' });
    expect(particulars).toHaveTextContent('a member, Harrow Vale; 14 deals completed');
    expect(particulars).toHaveTextContent('Canada, United States');
    const cautions = screen.getByRole('region', { name: 'Cautions' });
    expect(cautions).toHaveTextContent('Tungsten has the density of gold');
    expect(cautions).toHaveTextContent('Check your local rules; this is not legal advice.');
  });

  it('asks a visitor to sign in first, and leads back to the purchase', async () => {
    open(buildLot({ can: noBuy }), false);
    expect(await screen.findByRole('link', { name: /^Sign in to buy at US\$\s4,121.35/ })).toHaveAttribute(
      'href',
      '/sign-in?next=%2Flots%2FS-2K7F0A%2Fbuy',
    );
  });

  it.each([
    ['reserved', /^Reserved: a buyer has agreed/],
    ['sold', /^Sold: it is paid for/],
    ['closed', /^Closed: it is not offered/],
  ] as const)('says of a %s lot how it stands, and offers the others', async (state, words) => {
    open(buildLot({ state, can: noBuy }));
    expect(await screen.findByText(words)).toBeVisible();
    expect(screen.getByRole('link', { name: 'Look at the other open lots' })).toBeVisible();
    expect(screen.queryByRole('link', { name: /^Buy/ })).toBeNull();
  });

  it('tells the seller that it is the own lot', async () => {
    open(buildLot({ isMine: true, can: noBuy }));
    expect(await screen.findByText('This is your own lot.')).toBeVisible();
    expect(screen.queryByRole('link', { name: /^(Buy|Sign in to buy)/ })).toBeNull();
  });

  it('says that there is no fresh quote, and of when the last ones are', async () => {
    open(buildLot({ quoteState: 'stale' }));
    const notice = (await screen.findByText('There is no fresh quote')).parentElement;
    expect(notice).toHaveTextContent('1 Dec 2026, 14:02 UTC');
  });

  it('leaves melt value and sheet out where there is no quote', async () => {
    open(buildLot({ quoteState: 'none', sheet: null }));
    expect(await screen.findByText('There is no quote')).toBeVisible();
    expect(screen.queryByRole('region', { name: 'Settlement sheet' })).toBeNull();
    expect(screen.getByRole('img', { name: /no fresh quote/ })).toBeVisible();
  });

  it('leads through the photos large, by arrow keys, and says that they are drawings', async () => {
    open(buildLot({ photos: [photo(1), photo(2)] }));
    const user = userEvent.setup();
    await user.click(await screen.findByRole('button', { name: /Look closer/ }));
    const dialog = within(screen.getByRole('dialog'));
    expect(dialog.getByRole('img', { name: 'Drawing: View 1' })).toHaveAttribute(
      'src',
      '/api/v1/photos/1/2000',
    );
    expect(dialog.getByText('drawing, demo data')).toBeVisible();
    dialog.getByRole('button', { name: 'In its own size' }).focus();
    await user.keyboard('{ArrowRight}');
    expect(dialog.getByRole('img', { name: 'Drawing: View 2' })).toBeVisible();
    await user.keyboard('{ArrowRight}');
    expect(dialog.getByRole('img', { name: 'Drawing: View 1' })).toBeVisible();
    await user.click(dialog.getByRole('button', { name: 'Close' }));
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull());
  });

  it('answers an unknown lot with the way out', async () => {
    apiServer.use(
      http.get('/api/v1/lots/S-NOBODY', () =>
        HttpResponse.json({ code: 'not-found', title: 'There is nothing here' }, { status: 404 }),
      ),
    );
    openPage('/lots/S-NOBODY');
    expect(await screen.findByRole('heading', { name: 'Nothing is filed under this address' })).toBeVisible();
  });
});
