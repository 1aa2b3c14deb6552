import { z } from 'zod';
import { callHostedJson, HostedServiceError, hostedUrl, parseHosted } from './hosted-json.ts';

const statuses = ['registered', 'accepted', 'in_transit', 'delivered', 'lost', 'returned'] as const;
export type ParcelStatus = (typeof statuses)[number];
export type ParcelEvent = {
  at: Date;
  code: ParcelStatus;
  description: string;
  place: string;
  signedBy: string | null;
};
export type ParcelTracker = {
  id: string;
  carrier: string;
  trackingNumber: string;
  status: ParcelStatus;
  /** Oldest first. */
  events: ParcelEvent[];
  /** The delivery, and whether it was against signature; null until delivered. */
  delivery: { at: Date; signed: boolean; signedBy: string | null } | null;
};

export class CarrierServiceError extends HostedServiceError {}

export type CarrierClientOptions = { url: string; apiKey: string; timeoutMs?: number };
export type CarrierClient = {
  /** Registering the same carrier and number again answers the same tracker. */
  registerTracker: (input: {
    carrier: string;
    trackingNumber: string;
    reference: string;
  }) => Promise<ParcelTracker>;
  /** Null when the carrier does not know the number. */
  readTracker: (carrier: string, trackingNumber: string) => Promise<ParcelTracker | null>;
};

const instant = z.iso.datetime({ offset: true }).transform((text) => new Date(text));
const text = z.string().max(300);
const trackerSchema = z
  .object({
    id: text.min(1),
    carrier: text.min(1),
    trackingNumber: text.min(1),
    status: z.enum(statuses),
    events: z
      .array(
        z.object({
          at: instant,
          code: z.enum(statuses),
          description: text,
          place: text,
          signedBy: text.min(1).optional(),
        }),
      )
      .max(200),
  })
  .refine(({ status, events }) => status !== 'delivered' || events.some(({ code }) => code === 'delivered'), {
    message: 'delivered without a delivery event',
  });

const fail = (...args: ConstructorParameters<typeof CarrierServiceError>) => new CarrierServiceError(...args);
const same = (a: string, b: string) => a.trim().toLowerCase() === b.trim().toLowerCase();

function readAnswer(answer: unknown, carrier: string, trackingNumber: string): ParcelTracker {
  const { events: received, ...tracker } = parseHosted(trackerSchema, answer, fail);
  // A mixed-up answer would start another deal's inspection clock.
  if (!same(tracker.carrier, carrier) || !same(tracker.trackingNumber, trackingNumber))
    throw fail('garbage', 'the answer is about another parcel');
  const events = received
    .map((event) => ({ ...event, signedBy: event.signedBy ?? null }))
    .sort((a, b) => a.at.getTime() - b.at.getTime());
  const arrival =
    tracker.status === 'delivered' ? events.find(({ code }) => code === 'delivered') : undefined;
  const delivery = arrival
    ? { at: arrival.at, signed: arrival.signedBy !== null, signedBy: arrival.signedBy }
    : null;
  return { ...tracker, events, delivery };
}

/** The parcel carrier. Every failure is a `CarrierServiceError`. */
export function createCarrierClient({ url, apiKey, timeoutMs = 5000 }: CarrierClientOptions): CarrierClient {
  return {
    async registerTracker(input) {
      const call = { url: hostedUrl(url, 'v1/trackers'), apiKey, timeoutMs, body: input, fail };
      return readAnswer(await callHostedJson(call), input.carrier, input.trackingNumber);
    },
    async readTracker(carrier, trackingNumber) {
      const path = ['v1/trackers', encodeURIComponent(carrier), encodeURIComponent(trackingNumber)].join('/');
      try {
        const answer = await callHostedJson({ url: hostedUrl(url, path), apiKey, timeoutMs, fail });
        return readAnswer(answer, carrier, trackingNumber);
      } catch (error) {
        if (error instanceof CarrierServiceError && error.status === 404) return null;
        throw error;
      }
    },
  };
}
