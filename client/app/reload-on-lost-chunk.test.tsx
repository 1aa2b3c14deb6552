import { waitFor } from '@testing-library/react';
import { http, HttpResponse } from 'msw';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { apiServer } from '#tests/setup/api-server.ts';
import { reloadOnLostChunk } from './reload-on-lost-chunk.ts';

let stop = () => undefined as void;
afterEach(() => {
  stop();
  sessionStorage.clear();
});

const lose = () => window.dispatchEvent(new Event('vite:preloadError'));

function listen(now = () => 1_000_000) {
  const load = vi.fn();
  stop = reloadOnLostChunk({ goingTo: () => ({ pathname: '/lots', search: '?metal=Ag' }), load, now });
  return load;
}

describe('a page whose parts are gone', () => {
  it('is loaded anew at the address asked for, and only once', async () => {
    const asked = vi.fn();
    apiServer.use(
      http.head('/', () => {
        asked();
        return new HttpResponse(null);
      }),
    );
    const load = listen();
    lose();
    await waitFor(() => expect(load).toHaveBeenCalledWith('/lots?metal=Ag'));
    lose();
    await waitFor(() => expect(asked).toHaveBeenCalledTimes(2));
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(load).toHaveBeenCalledTimes(1);
  });

  it('stays as it is while the server does not answer', async () => {
    const asked = vi.fn();
    apiServer.use(
      http.head('/', () => {
        asked();
        return HttpResponse.error();
      }),
    );
    const load = listen();
    lose();
    await waitFor(() => expect(asked).toHaveBeenCalledTimes(1));
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(load).not.toHaveBeenCalled();
  });
});
