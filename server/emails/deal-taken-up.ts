import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath, instantField, momentText, reasonField } from './mail-text.ts';

const input = z.object({
  ...dealMail,
  side: z.enum(['buyer', 'seller']),
  reason: reasonField,
  decideBy: instantField,
});

export const dealTakenUp = defineMail({
  audience: 'buyer and seller',
  trigger: 'the desk took up a deal that the buyer left unanswered',
  says: 'that the time to inspect is over, that the money stays held, by when the desk rules',
  input,
  write: ({ dealCode, lotTitle, side, reason, decideBy }, { timeZone }) => ({
    subject: `With the desk now: ${lotTitle}`,
    heading:
      side === 'buyer' ? 'Your time to inspect is over' : 'The desk has taken up a deal that got no answer',
    paragraphs: [
      side === 'buyer'
        ? `You have neither accepted nor contested “${lotTitle}” in time. The desk has taken up the deal and will rule on it.`
        : `The buyer has neither accepted nor contested “${lotTitle}” in time. The desk has taken up the deal and will rule on it.`,
      'Until then the money stays held: nothing is paid out or refunded.',
      `The desk writes: “${reason}”`,
    ],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'The desk rules by', value: momentText(decideBy, timeZone) },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: ['Keep the metal, its packing and your photographs as they are until then.'],
  }),
});
