import { z } from 'zod';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { allOf } from '../fake.ts';
import { flag, listInput, text } from '../input.ts';
import { paginate } from '../paginate.ts';

function matchesType(type: string, wanted: string): boolean {
  return wanted === type || (wanted.endsWith('*') && type.startsWith(wanted.slice(0, -1)));
}

export const eventEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/events/:id', {}, (call) => find(call, 'event', pathId(call))),
  endpoint(
    'GET',
    '/v1/events',
    {
      ...listInput,
      type: text.optional(),
      types: z.array(text).max(20).optional(),
      delivery_success: flag.optional(),
    },
    (call) => {
      const { type, types, delivery_success: delivered } = call.input;
      const wanted = types ?? (type === undefined ? null : [type]);
      const events = allOf(call.fake, 'event', call.owner).filter(
        (event) =>
          (wanted === null || wanted.some((name) => matchesType(event.type, name))) &&
          (delivered === undefined || delivered === (event.pending_webhooks === 0)),
      );
      return paginate(events, call.input, '/v1/events');
    },
  ),
];
