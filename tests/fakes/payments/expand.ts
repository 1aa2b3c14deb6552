import { invalidRequest } from './errors.ts';
import { allOf, idOf } from './fake.ts';
import type { Fake } from './fake.ts';
import { wholeList } from './paginate.ts';

type Tree = Record<string, unknown>;

const depthMax = 4;

function isTree(value: unknown): value is Tree {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** Lists that the API leaves out of an object until they are asked for. */
function hiddenList(fake: Fake, tree: Tree, name: string): unknown {
  const id = String(tree.id);
  if (tree.object === 'checkout.session' && name === 'line_items') {
    return wholeList(fake.state.sessionDetails[id]?.items ?? [], `/v1/checkout/sessions/${id}/line_items`);
  }
  if (tree.object === 'charge' && name === 'refunds') {
    const refunds = allOf(fake, 'refund').filter((refund) => idOf(refund.charge) === id);
    return wholeList(refunds, `/v1/charges/${id}/refunds`);
  }
  return undefined;
}

function expandPath(fake: Fake, node: unknown, parts: string[], whole: string): void {
  const [name, ...rest] = parts;
  if (name === undefined) return;
  if (Array.isArray(node)) {
    for (const item of node) expandPath(fake, item, parts, whole);
    return;
  }
  if (!isTree(node)) return;
  // What is not there yet, such as the payment of an open session, stays null when it is asked for in full.
  if (node[name] === null) return;
  const value = node[name] ?? hiddenList(fake, node, name);
  if (value === undefined) {
    throw invalidRequest(`This property cannot be expanded (${whole}).`, undefined, 'expand');
  }
  if (typeof value === 'string') {
    const stored = Object.hasOwn(fake.state.objects, value) ? fake.state.objects[value] : undefined;
    if (!stored) throw invalidRequest(`This property cannot be expanded (${whole}).`, undefined, 'expand');
    node[name] = structuredClone(stored.value);
  } else {
    node[name] = structuredClone(value);
  }
  expandPath(fake, node[name], rest, whole);
}

/** Gives a copy of an answer in which the named ids are replaced by their objects. */
export function expandAnswer(fake: Fake, answer: unknown, paths: string[]): unknown {
  const copy: unknown = structuredClone(answer);
  for (const path of [...paths].sort()) {
    const parts = path.split('.');
    if (parts.filter((part) => part !== 'data').length > depthMax) {
      throw invalidRequest('You cannot expand more than 4 levels of a property.', undefined, 'expand');
    }
    expandPath(fake, copy, parts, path);
  }
  return copy;
}
