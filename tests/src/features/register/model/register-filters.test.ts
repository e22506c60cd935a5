import { describe, expect, it } from 'vitest';
import { filtersIn, isNarrowed, withFilter } from '#client/features/register/model/register-filters.ts';

const DAM = '019a3c00-0000-7000-8000-00000000000a';
const read = (address: string) => filtersIn(new URLSearchParams(address));

describe('the filters in an address', () => {
  it('are none in an empty one, and what cannot be is as if it were not there', () => {
    expect(read('')).toEqual({});
    expect(read(`q=%20&kind=roll&state=&dam=7&whose=you&archived=no&sort=colour&q2=x`)).toEqual({});
    expect(read(`q=${'x'.repeat(201)}`)).toEqual({});
  });

  it('are read as they are', () => {
    expect(read(`q=+toe+drain&kind=net&state=sent&dam=${DAM}&whose=me&archived=yes&sort=newest`)).toEqual({
      q: 'toe drain',
      kind: 'net',
      state: 'sent',
      dam: DAM,
      whose: 'me',
      archived: 'yes',
      sort: 'newest',
    });
  });

  it('change one at a time; somebody of another dam is no longer asked for', () => {
    const before = new URLSearchParams(`q=drain&dam=${DAM}&whose=${DAM}`);
    expect(withFilter(before, 'kind', 'net').toString()).toBe(`q=drain&dam=${DAM}&whose=${DAM}&kind=net`);
    expect(withFilter(before, 'q', '').toString()).toBe(`dam=${DAM}&whose=${DAM}`);
    expect(withFilter(before, 'dam', '').toString()).toBe('q=drain');
    expect(withFilter(new URLSearchParams('whose=me'), 'dam', DAM).get('whose')).toBe('me');
  });

  it('narrow what is shown, which the order does not', () => {
    expect(isNarrowed(read('sort=newest'))).toBe(false);
    expect(isNarrowed(read('sort=newest&state=draft'))).toBe(true);
  });
});
