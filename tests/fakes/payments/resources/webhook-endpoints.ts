import Stripe from 'stripe';
import { endpoint, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { resourceMissing } from '../errors.ts';
import type { Fake } from '../fake.ts';
import { listInput } from '../input.ts';
import { paginate } from '../paginate.ts';

/** The one endpoint comes from the fake's own configuration. */
function configured(fake: Fake): Stripe.WebhookEndpoint[] {
  if (fake.options.webhookUrl === '') return [];
  return [
    {
      id: 'we_configured',
      object: 'webhook_endpoint',
      api_version: Stripe.API_VERSION,
      application: null,
      created: 0,
      description: null,
      enabled_events: ['*'],
      livemode: false,
      metadata: {},
      status: 'enabled',
      url: fake.options.webhookUrl,
    },
  ];
}

export const webhookEndpointEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/webhook_endpoints', { ...listInput }, (call) =>
    paginate(configured(call.fake), call.input, '/v1/webhook_endpoints'),
  ),
  endpoint('GET', '/v1/webhook_endpoints/:id', {}, (call) => {
    const found = configured(call.fake).find((candidate) => candidate.id === pathId(call));
    if (!found) throw resourceMissing('webhook endpoint', pathId(call));
    return found;
  }),
];
