import { z } from 'zod';
import { defineMail } from './define-mail.ts';
import { dealMail, dealPath, reasonField } from './mail-text.ts';

const input = z.object({ ...dealMail, ruling: z.enum(['refund', 'release']), reason: reasonField });

export const dealRuled = defineMail({
  audience: 'buyer and seller',
  trigger: 'the desk ruled on a contested deal',
  says: 'the ruling and its reason',
  input,
  write: ({ dealCode, lotTitle, ruling, reason }) => ({
    subject: `The desk has ruled: ${lotTitle}`,
    heading: ruling === 'refund' ? 'The buyer is refunded in full' : 'The money is released to the seller',
    paragraphs: [`The desk has ruled on the deal over “${lotTitle}”.`, `Its reason: “${reason}”`],
    facts: [
      { label: 'Deal', value: dealCode },
      { label: 'Ruling', value: ruling === 'refund' ? 'Refund in full' : 'Release to the seller' },
    ],
    action: { label: 'See the deal', path: dealPath(dealCode) },
    closing: [],
  }),
});
