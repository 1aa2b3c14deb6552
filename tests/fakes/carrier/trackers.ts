import { BadRequest } from '../kit/serve.ts';
import type { StateFile } from '../kit/state-file.ts';

export type TrackerStatus = 'registered' | 'accepted' | 'in_transit' | 'delivered' | 'lost' | 'returned';
export type TrackerEvent = {
  at: string;
  code: TrackerStatus;
  description: string;
  place: string;
  signedBy?: string;
};
export type Tracker = {
  id: string;
  carrier: string;
  trackingNumber: string;
  reference: string;
  status: TrackerStatus;
  events: TrackerEvent[];
};
type Kept = Tracker & { planned: { atMs: number; event: Omit<TrackerEvent, 'at'> }[] };
export type Fault = 'none' | 'down' | 'slow' | 'garbage';
export type TrackersState = { clockOffsetMs: number; nextNumber: number; fault: Fault; trackers: Kept[] };

export function initialTrackersState(): TrackersState {
  return { clockOffsetMs: 0, nextNumber: 1, fault: 'none', trackers: [] };
}

const happenings = {
  registered: { code: 'registered', description: 'Consignment announced by the sender', place: 'Marrowgate' },
  accepted: { code: 'accepted', description: 'Taken over at the counter', place: 'Marrowgate' },
  in_transit: { code: 'in_transit', description: 'On its way between depots', place: 'Low Tannery depot' },
  signed: {
    code: 'delivered',
    description: 'Delivered against signature',
    place: 'Address of the receiver',
    signedBy: 'The receiver',
  },
  unsigned: {
    code: 'delivered',
    description: 'Delivered without signature',
    place: 'Address of the receiver',
  },
  lost: { code: 'lost', description: 'Declared lost after a search', place: 'Low Tannery depot' },
  returned: { code: 'returned', description: 'Brought back to the sender', place: 'Marrowgate' },
} satisfies Record<string, Omit<TrackerEvent, 'at'>>;

export const orders = ['deliver', 'deliver-unsigned', 'lose', 'return', 'hold'] as const;
export type Order = (typeof orders)[number];
const orderHappening = {
  deliver: happenings.signed,
  'deliver-unsigned': happenings.unsigned,
  lose: happenings.lost,
  return: happenings.returned,
} as const;

const isEnded = ({ status }: Tracker) => status === 'delivered' || status === 'lost' || status === 'returned';
const same = (a: string, b: string) => a.toLowerCase() === b.toLowerCase();

function shown({ id, carrier, trackingNumber, reference, status, events }: Kept): Tracker {
  return { id, carrier, trackingNumber, reference, status, events };
}

function happen(tracker: Kept, event: Omit<TrackerEvent, 'at'>, atMs: number) {
  tracker.events.push({ at: new Date(atMs).toISOString(), ...event });
  tracker.status = event.code;
}

function planFrom(startMs: number, deliverySeconds: number | null): Kept['planned'] {
  if (deliverySeconds === null) return [];
  const afterMs = (share: number) => startMs + Math.trunc(deliverySeconds * 1000 * share);
  return [
    { atMs: afterMs(0.25), event: happenings.accepted },
    { atMs: afterMs(0.5), event: happenings.in_transit },
    { atMs: afterMs(1), event: happenings.signed },
  ];
}

/** Parcels move by their plan as the clock passes; `deliverySeconds` null leaves them to the buttons. */
export class Trackers {
  readonly state: TrackersState;
  readonly #save: () => void;
  readonly #deliverySeconds: number | null;
  readonly #systemNowMs: () => number;

  constructor(file: StateFile<TrackersState>, deliverySeconds: number | null, systemNowMs: () => number) {
    this.state = file.state;
    this.#save = file.save;
    this.#deliverySeconds = deliverySeconds;
    this.#systemNowMs = systemNowMs;
  }

  nowMs(): number {
    return this.#systemNowMs() + this.state.clockOffsetMs;
  }

  #catchUp() {
    let isChanged = false;
    for (const tracker of this.state.trackers) {
      while (tracker.planned[0] && tracker.planned[0].atMs <= this.nowMs()) {
        const due = tracker.planned.shift();
        if (due) happen(tracker, due.event, due.atMs);
        isChanged = true;
      }
    }
    if (isChanged) this.#save();
  }

  #known(carrier: string, trackingNumber: string): Kept | undefined {
    this.#catchUp();
    return this.state.trackers.find(
      (each) => same(each.carrier, carrier) && same(each.trackingNumber, trackingNumber),
    );
  }

  register(carrier: string, trackingNumber: string, reference: string) {
    const known = this.#known(carrier, trackingNumber);
    if (known) return { tracker: shown(known), isNew: false };
    const id = `trk_${String(this.state.nextNumber).padStart(6, '0')}`;
    const planned = planFrom(this.nowMs(), this.#deliverySeconds);
    const fresh: Kept = { id, carrier, trackingNumber, reference, status: 'registered', events: [], planned };
    happen(fresh, happenings.registered, this.nowMs());
    this.state.nextNumber += 1;
    this.state.trackers.push(fresh);
    this.#save();
    return { tracker: shown(fresh), isNew: true };
  }

  find(carrier: string, trackingNumber: string): Tracker | null {
    const known = this.#known(carrier, trackingNumber);
    return known ? shown(known) : null;
  }

  newestFirst(): Tracker[] {
    this.#catchUp();
    return this.state.trackers.map(shown).reverse();
  }

  /** Ends the journey of the newest parcel with this number, or holds it on the road until another button. */
  order(trackingNumber: string, order: Order): Tracker {
    this.#catchUp();
    const tracker = this.state.trackers.findLast((each) => same(each.trackingNumber, trackingNumber));
    if (!tracker) throw new BadRequest('no such tracking number', 404);
    if (isEnded(tracker)) throw new BadRequest(`the parcel is already ${tracker.status}`, 409);
    tracker.planned = [];
    if (order === 'hold') {
      if (tracker.status === 'registered') happen(tracker, happenings.accepted, this.nowMs());
      if (tracker.status === 'accepted') happen(tracker, happenings.in_transit, this.nowMs());
      this.#save();
      return shown(tracker);
    }
    const isDelivery = order === 'deliver' || order === 'deliver-unsigned';
    if (isDelivery && tracker.status === 'registered') happen(tracker, happenings.accepted, this.nowMs());
    if (isDelivery && tracker.status === 'accepted') happen(tracker, happenings.in_transit, this.nowMs());
    happen(tracker, orderHappening[order], this.nowMs());
    this.#save();
    return shown(tracker);
  }

  advance(seconds: number) {
    this.state.clockOffsetMs += seconds * 1000;
    this.#save();
    this.#catchUp();
  }

  setFault(fault: Fault) {
    this.state.fault = fault;
    this.#save();
  }
}
