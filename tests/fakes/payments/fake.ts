import { randomInt } from 'node:crypto';
import type { Fault } from './faults.ts';
import type { Kind, Kinds, State } from './state.ts';
import type { Store } from './store.ts';

export const platform = 'platform';

export interface FakeOptions {
  dataDir: string;
  webhookUrl: string;
  webhookSecret: string;
  webhookTriesMax: number;
}

/** Everything one running fake consists of; passed to each function instead of module state. */
export interface Fake {
  options: FakeOptions;
  state: State;
  store: Store;
  faults: Fault[];
  /** Keys of requests that are running now. They die with the process, as they should. */
  runningKeys: Set<string>;
  publicUrl: string;
}

/** Unix seconds on the fake's own clock. */
export function now(fake: Fake): number {
  return wallNow() + fake.state.clockOffsetSeconds;
}

export function wallNow(): number {
  return Math.floor(Date.now() / 1000);
}

const alphabet = 'ABCDEFGHJKLMNPQRSTUVWXYZabcdefghijkmnopqrstuvwxyz0123456789';

export function newId(prefix: string, length = 24): string {
  let tail = '';
  for (let index = 0; index < length; index += 1) tail += alphabet.charAt(randomInt(alphabet.length));
  return `${prefix}_${tail}`;
}

export function keep<T extends Kinds[Kind]>(fake: Fake, owner: string, value: T): T {
  fake.state.objects[value.id] = { owner, value };
  fake.store.touch();
  return value;
}

export function lookUp<K extends Kind>(fake: Fake, kind: K, id: string): Kinds[K] | null {
  if (!Object.hasOwn(fake.state.objects, id)) return null;
  const stored = fake.state.objects[id];
  return stored?.value.object === kind ? (stored.value as Kinds[K]) : null;
}

/** For ids that the fake wrote itself: absence is a fault of the fake, not of the caller. */
export function mustFind<K extends Kind>(fake: Fake, kind: K, id: string): Kinds[K] {
  const value = lookUp(fake, kind, id);
  if (!value) throw new Error(`The fake lost its ${kind} ${id}`);
  return value;
}

export function ownerOf(fake: Fake, id: string): string | null {
  return Object.hasOwn(fake.state.objects, id) ? (fake.state.objects[id]?.owner ?? null) : null;
}

/** All objects of one kind and owner, newest first. */
export function allOf<K extends Kind>(fake: Fake, kind: K, owner?: string): Array<Kinds[K]> {
  return Object.values(fake.state.objects)
    .filter((stored) => stored.value.object === kind && (owner === undefined || stored.owner === owner))
    .map((stored) => stored.value as Kinds[K])
    .reverse();
}

export function idOf(value: string | { id: string } | null | undefined): string | null {
  if (value === null || value === undefined) return null;
  return typeof value === 'string' ? value : value.id;
}
