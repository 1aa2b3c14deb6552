import { env } from '#server/env.ts';

const ADDRESS = { payments: env.STRIPE_API_BASE, carrier: env.CARRIER_URL, quotes: env.QUOTES_URL } as const;

/** Presses a button of a stand-in's page. A real service has no such address, so the demo refuses to run against one. */
export async function press(
  service: keyof typeof ADDRESS,
  path: string,
  body: object = {},
): Promise<unknown> {
  const answer = await fetch(`${ADDRESS[service]}${path}`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify(body),
  });
  if (!answer.ok) throw new Error(`${service} ${path}: ${answer.status} ${await answer.text()}`);
  return answer.json();
}
