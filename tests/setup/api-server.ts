import { setupServer } from 'msw/node';

/** Answers in place of the API in client tests; a request that no test has announced fails. */
export const apiServer = setupServer();
