import type { Request, Response } from 'express';
import type { Fake } from '../fake.ts';

/** Answers a script with JSON and a person, who pressed a button, with the page. */
export async function done(fake: Fake, request: Request, response: Response, body: unknown): Promise<void> {
  await fake.store.flushed();
  if (request.is('application/x-www-form-urlencoded')) response.redirect(303, '/');
  else response.json(body);
}
