import { describe, expect, it } from 'vitest';
import { safeNext, signInAndBack } from '#client/lib/paths.ts';

describe('the way back after signing in', () => {
  it.each([null, '', 'https://elsewhere.example/', '//elsewhere.example', '/\\elsewhere.example', 'nets/1'])(
    'never leads to another site: %j goes to the dams',
    (next) => {
      expect(safeNext(next)).toBe('/');
    },
  );

  it('does not lead to the sign-in page again', () => {
    expect(safeNext('/sign-in?next=%2Fpeople')).toBe('/');
  });

  it('keeps path, query and fragment', () => {
    const there = signInAndBack({ pathname: '/drawings/1', search: '?sheet=2', hash: '#x' });
    expect(safeNext(new URL(there, 'http://local').searchParams.get('next'))).toBe('/drawings/1?sheet=2#x');
  });
});
