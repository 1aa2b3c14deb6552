import '@testing-library/jest-dom/vitest';
import { cleanup, configure } from '@testing-library/react';
import { afterAll, afterEach, beforeAll, beforeEach, expect, vi, type MockInstance } from 'vitest';
import { apiServer } from './api-server.ts';

// A busy machine may take its time; what never comes still fails.
configure({ asyncUtilTimeout: 6_000 });

let errors: MockInstance<typeof console.error>;

beforeAll(() => {
  apiServer.listen({ onUnhandledRequest: 'error' });
  // jsdom knows the dialog element but not how to open it.
  HTMLDialogElement.prototype.showModal ??= function showModal(this: HTMLDialogElement) {
    this.open = true;
  };
  HTMLDialogElement.prototype.close ??= function close(this: HTMLDialogElement) {
    this.open = false;
    this.dispatchEvent(new Event('close'));
  };
});

beforeEach(() => {
  errors = vi.spyOn(console, 'error');
});

afterEach(() => {
  cleanup();
  apiServer.resetHandlers();
  document.title = '';
  const said = errors.mock.calls;
  errors.mockRestore();
  expect(said, 'nothing is written to console.error').toEqual([]);
});

afterAll(() => apiServer.close());
