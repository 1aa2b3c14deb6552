import { invalidRequest } from './errors.ts';

export type FormValue = string | FormTree | FormValue[];
export interface FormTree {
  [key: string]: FormValue;
}

const pairsMax = 1000;
const depthMax = 8;
const forbidden = new Set(['__proto__', 'constructor', 'prototype']);

function splitKey(key: string): string[] {
  const head = /^[^[\]]+/.exec(key)?.[0];
  if (head === undefined) throw invalidRequest(`Invalid parameter name: ${key}`);
  const parts = [head];
  let rest = key.slice(head.length);
  while (rest !== '') {
    const match = /^\[([^[\]]*)\]/.exec(rest);
    if (!match) throw invalidRequest(`Invalid parameter name: ${key}`);
    parts.push(match[1] ?? '');
    rest = rest.slice(match[0].length);
  }
  if (parts.length > depthMax || parts.some((part) => forbidden.has(part))) {
    throw invalidRequest(`Invalid parameter name: ${key}`);
  }
  return parts;
}

/** A level whose keys are 0, 1, 2 … is an array. */
function toArrays(value: FormValue): FormValue {
  if (typeof value === 'string' || Array.isArray(value)) return value;
  const entries = Object.entries(value).map(([key, inner]) => [key, toArrays(inner)] as const);
  const isArray = entries.length > 0 && entries.every(([key], index) => key === `${index}`);
  return isArray ? entries.map(([, inner]) => inner) : Object.fromEntries(entries);
}

/** Reads `a[b]=1&c[0][d]=2&e[]=3` into nested objects and arrays. */
export function parseForm(text: string): FormTree {
  const root: FormTree = {};
  let pairs = 0;
  for (const [key, value] of new URLSearchParams(text)) {
    pairs += 1;
    if (pairs > pairsMax) throw invalidRequest('Too many parameters');
    const parts = splitKey(key);
    let level: FormTree = root;
    parts.forEach((part, index) => {
      const name = part === '' ? `${Object.keys(level).length}` : part;
      const isLast = index === parts.length - 1;
      const present = Object.hasOwn(level, name) ? level[name] : undefined;
      if (isLast) {
        level[name] = value;
        return;
      }
      const next: FormTree = typeof present === 'object' && !Array.isArray(present) ? present : {};
      level[name] = next;
      level = next;
    });
  }
  return Object.fromEntries(Object.entries(root).map(([key, value]) => [key, toArrays(value)]));
}
