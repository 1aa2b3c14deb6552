import { endpoint, find, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { allOf } from '../fake.ts';
import { listInput, text } from '../input.ts';
import { paginate } from '../paginate.ts';

export const chargeEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/charges/:id', {}, (call) => find(call, 'charge', pathId(call))),
  endpoint(
    'GET',
    '/v1/charges',
    { ...listInput, payment_intent: text.optional(), transfer_group: text.optional() },
    (call) => {
      const { payment_intent: intent, transfer_group: group } = call.input;
      const charges = allOf(call.fake, 'charge', call.owner).filter(
        (charge) =>
          (intent === undefined || charge.payment_intent === intent) &&
          (group === undefined || charge.transfer_group === group),
      );
      return paginate(charges, call.input, '/v1/charges');
    },
  ),
];
