import { describe, expect, it } from 'vitest';
import { eventText } from './deal-event-text.ts';

describe('the sentence of an event', () => {
  it.each([
    [
      'shipped',
      { carrier: 'Vale Post', insured: '2059.35' },
      'Shipped with Vale Post, insured for US$ 2,059.35',
    ],
    ['parcel-moved', { status: 'in_transit' }, 'Parcel: in transit'],
    ['delivered', { signedBy: 'A. Quill' }, 'Delivered, signed by A. Quill'],
    ['delivered', {}, 'Delivered'],
    ['receipt-recorded', { mass: '31.17 g' }, 'Received mass recorded: 31.17 g'],
    ['contested', { reason: 'wrong_mass' }, 'Contested: wrong mass'],
    ['taken-up', { reason: 'No answer.' }, 'Taken up by the desk: the time to inspect is over. No answer.'],
    ['ruled-refund', { reason: 'It is brass.' }, 'The desk ruled: refund in full. It is brass.'],
    ['frozen', { reason: 'An official request.' }, 'Frozen by the desk. An official request.'],
    ['some_new-act', {}, 'Some new act'],
  ])('%s %o', (act, detail, text) => {
    expect(eventText({ act, detail })).toBe(text);
  });
});
