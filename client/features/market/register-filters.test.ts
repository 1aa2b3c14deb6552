import { describe, expect, it } from 'vitest';
import {
  apiSearchOf,
  filtersFromSearch,
  isNarrowed,
  pagesFromSearch,
  plainFilters,
  registerHref,
  searchFromFilters,
} from './register-filters.ts';
import { readBounds } from './typed-bounds.ts';

const read = (search: string) => filtersFromSearch(new URLSearchParams(search));
const blank = {
  finenessFrom: '',
  finenessTo: '',
  contentFrom: '',
  contentTo: '',
  percentFrom: '',
  percentTo: '',
};

describe('the register’s filters in the address', () => {
  it('come back as they were written', () => {
    const search =
      'metal=Au&form=bar&grade=certified&fineness-from=990&fineness-to=999.9&content-from=0.5&content-to=10&melt-from=90&melt-to=98.5&content-unit=ozt&to=CA&sort=percent-of-melt';
    const again = searchFromFilters(read(search));
    again.sort();
    const asked = new URLSearchParams(search);
    asked.sort();
    expect(again.toString()).toBe(asked.toString());
  });

  it('leave the plain register’s address plain', () => {
    expect(registerHref(plainFilters())).toBe('/lots');
    expect(isNarrowed(plainFilters('fine-content'))).toBe(false);
    expect(isNarrowed(read('metal=Pd'))).toBe(true);
  });

  it('pass over what is not a filter of ours', () => {
    expect(read('metal=Xx&form=coin&grade=best&fineness-from=1e3&to=us&sort=price&content-unit=ozt')).toEqual(
      plainFilters(),
    );
  });

  it('ask the API for contents in grams, by the exact factor', () => {
    const asked = apiSearchOf(read('content-from=1.5&content-to=20&content-unit=ozt'));
    expect(asked.get('fineGramsMin')).toBe('46.6552152');
    expect(asked.get('fineGramsMax')).toBe('622.069536');
    expect(apiSearchOf(read('content-from=1.5')).get('fineGramsMin')).toBe('1.5');
  });

  it('read how many pages are shown, within reason', () => {
    const pages = (search: string) => pagesFromSearch(new URLSearchParams(search));
    expect([pages(''), pages('pages=3'), pages('pages=99'), pages('pages=-1'), pages('pages=x')]).toEqual([
      1, 3, 20, 1, 1,
    ]);
  });
});

describe('typed bounds', () => {
  it('take a dot or a comma', () => {
    const { bounds, errors } = readBounds({ ...blank, finenessFrom: '916,7', percentTo: ' 98.50 ' });
    expect(errors).toEqual({});
    expect(bounds).toEqual({ ...blank, finenessFrom: '916.7', percentTo: '98.5' });
  });

  it('refuse at the field what could be read in two ways, lies outside, or crosses its partner', () => {
    const { errors } = readBounds({
      ...blank,
      contentFrom: '1,234',
      finenessTo: '1000.1',
      percentFrom: '99',
      percentTo: '95',
    });
    expect(errors.contentFrom).toMatch(/1\.234 or 1234/);
    expect(errors.finenessTo).toMatch(/at most 1000/);
    expect(errors.percentTo).toMatch(/below the lower bound of 99/);
    expect(errors.percentFrom).toBeUndefined();
  });
});
