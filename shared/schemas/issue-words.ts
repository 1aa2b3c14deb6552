import type { z } from 'zod';

type Issue = Parameters<z.core.$ZodErrorMap>[0];

const NEEDED = 'This is needed';

const KINDS: Readonly<Record<string, string>> = {
  string: 'Write text here',
  number: 'Write a number here',
  int: 'Write a whole number here',
  bigint: 'Write a whole number here',
  boolean: 'Answer with yes or no',
  array: 'Give a list here',
  tuple: 'Give a list here',
  object: 'Give the fields of this part',
  record: 'Give the fields of this part',
  date: 'Write a date here',
};

const FORMATS: Readonly<Record<string, string>> = {
  email: 'Write an e-mail address such as name@example.com',
  url: 'Write a web address',
  uuid: 'This is not an id that is known here',
  datetime: 'Write a moment such as 2026-12-31T17:00:00Z',
  date: 'Write a date such as 2026-12-31',
};

function counted(count: number | bigint, one: string, many: string): string {
  return `${count} ${`${count}` === '1' ? one : many}`;
}

/** 'at least', 'at most' and their sharp forms, with what is counted. */
function boundText(origin: string, bound: number | bigint, side: 'least' | 'most', inclusive = true): string {
  if (origin === 'string') return `Write at ${side} ${counted(bound, 'character', 'characters')}`;
  if (origin === 'array' || origin === 'set') return `Give at ${side} ${counted(bound, 'entry', 'entries')}`;
  if (origin === 'file') return `The file may have at ${side} ${counted(bound, 'byte', 'bytes')}`;
  if (inclusive) return `Use ${bound} or ${side === 'least' ? 'more' : 'less'}`;
  return `Use ${side === 'least' ? 'more' : 'less'} than ${bound}`;
}

/**
 * What a person reads where a schema names no words of its own: plain, about the field, nothing of types or comparisons.
 * Undefined leaves the issue to the words of the library; no issue of a schema here does.
 */
export function wordsForIssue(issue: Issue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      if (issue.input === undefined || issue.input === null) return NEEDED;
      return KINDS[issue.expected] ?? 'This is not of the kind that is asked for';
    case 'too_small':
      if (issue.origin === 'string' && issue.input === '') return NEEDED;
      return boundText(issue.origin, issue.minimum, 'least', issue.inclusive);
    case 'too_big':
      return boundText(issue.origin, issue.maximum, 'most', issue.inclusive);
    case 'invalid_format':
      return FORMATS[issue.format] ?? 'This is not written as it has to be';
    case 'invalid_value':
      if (issue.input === undefined) return NEEDED;
      return issue.values.length === 1
        ? 'This needs another value'
        : `Choose one of: ${issue.values.map(String).join(', ')}`;
    case 'not_multiple_of':
      return `Use a multiple of ${issue.divisor}`;
    case 'unrecognized_keys':
      return `Not asked for: ${issue.keys.join(', ')}`;
    case 'invalid_union':
    case 'invalid_key':
    case 'invalid_element':
    case 'custom':
      return 'This needs another value';
    default:
      return undefined;
  }
}
