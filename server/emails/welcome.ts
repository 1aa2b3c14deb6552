import { z } from 'zod';
import { defineMail } from './define-mail.ts';

const input = z.object({ displayName: z.string() });

export const welcome = defineMail({
  audience: 'member',
  trigger: 'sign-up',
  says: 'what to do first',
  input,
  write: ({ displayName }) => ({
    subject: 'Welcome to Scruple',
    heading: `Welcome, ${displayName}`,
    paragraphs: [
      'Your account is open. You can buy at once; selling opens after you have set up your payout account.',
    ],
    facts: [],
    action: { label: 'Look at the market', path: '/lots' },
    closing: ['If you did not open this account, write to the desk.'],
  }),
});
