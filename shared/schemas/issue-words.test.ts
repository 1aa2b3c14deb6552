import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import './common.ts';
import { purchaseRequest } from './deals.ts';
import { registerQuery, saveDraftRequest } from './lots.ts';
import { profileRequest, signUpRequest } from './session.ts';

function wordsOf(schema: z.ZodType, value: unknown): string[] {
  const read = schema.safeParse(value);
  return read.success ? [] : read.error.issues.map(({ message }) => message);
}

describe('what a person reads of a value that is refused', () => {
  it.each<[string, z.ZodType, unknown, string]>([
    ['a missing text', z.string(), undefined, 'This is needed'],
    ['nothing in place of a number', z.number(), null, 'This is needed'],
    ['a number in place of a text', z.string(), 4, 'Write text here'],
    ['a text in place of a number', z.number(), 'x', 'Write a number here'],
    ['what is no number at all', z.coerce.number(), 'x', 'Write a number here'],
    ['a fraction', z.number().int(), 1.5, 'Write a whole number here'],
    ['an empty text', z.string().min(1), '', 'This is needed'],
    ['a short text', z.string().min(5), 'abc', 'Write at least 5 characters'],
    ['a long text', z.string().max(1), 'abc', 'Write at most 1 character'],
    ['a large number', z.number().max(50), 51, 'Use 50 or less'],
    ['a small number', z.number().min(1), 0, 'Use 1 or more'],
    ['a number on the bound', z.number().gt(0), 0, 'Use more than 0'],
    ['a long list', z.array(z.string()).max(2), ['a', 'b', 'c'], 'Give at most 2 entries'],
    ['another choice', z.enum(['g', 'ozt']), 'kg', 'Choose one of: g, ozt'],
    ['no choice', z.enum(['g', 'ozt']), undefined, 'This is needed'],
    ['no id', z.uuid(), 'x', 'This is not an id that is known here'],
    ['no date', z.iso.date(), '2026-02-30', 'Write a date such as 2026-12-31'],
    ['another form', z.string().regex(/^\d$/), 'x', 'This is not written as it has to be'],
    ['a field too many', z.strictObject({}), { role: 1 }, 'Not asked for: role'],
    ['neither of two', z.union([z.string(), z.number()]), true, 'This needs another value'],
  ])('%s', (_name, schema, value, words) => {
    expect(wordsOf(schema, value)).toEqual([words]);
  });

  it('leaves the words that a schema names itself', () => {
    expect(wordsOf(z.string().min(2, 'Write the name'), 'a')).toEqual(['Write the name']);
  });

  it('says nothing of types or comparisons for any request', () => {
    const wrong = { total: 4, delivery: { name: 5 }, limit: '51', draft: 7, weightUnit: 'kg', email: 1 };
    const schemas = [purchaseRequest, registerQuery, saveDraftRequest, profileRequest, signUpRequest];
    const words = schemas.flatMap((schema) => [...wordsOf(schema, wrong), ...wordsOf(schema, null)]);
    expect(words.length).toBeGreaterThan(20);
    expect(words.filter((text) => /invalid|expected|received|undefined|[<>=]/i.test(text))).toEqual([]);
  });
});
