import { describe, expect, it } from 'vitest';
import { PAGE_PATHS } from '#shared/page-paths.ts';
import { pageRoutes } from './routes.tsx';

describe('the routes of the client', () => {
  it('are the addresses that the server answers with 200', () => {
    expect(pageRoutes.map((route) => route.path).sort()).toEqual([...PAGE_PATHS].sort());
  });
});
