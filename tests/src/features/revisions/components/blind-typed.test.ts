import { describe, expect, it } from 'vitest';
import {
  figuresTyped,
  NEW_POINT,
  parseKept,
  readTyped,
  type TypedReading,
} from '#client/features/revisions/components/blind-typed.ts';
import type { BlindView } from '#shared/contract/review.ts';

const levels = { headwater: 10, tailwater: 2, gammaW: 9.81 };
const view = {
  levels,
  points: [
    { id: 'a', name: 'P1', at: null },
    { id: 'b', name: '', at: null },
  ],
} as unknown as BlindView;
const typed: TypedReading = {
  drops: '8',
  outletHead: '2',
  points: { a: { ...NEW_POINT, elevation: '−1,5', drops: '2' } },
};

describe('a blind reading as it is typed', () => {
  it('gives head and pressure by the drops counted', () => {
    const figures = figuresTyped(typed.points.a!, typed, levels);
    expect(figures?.totalHead).toBeCloseTo(8, 12);
    expect(figures?.porePressure).toBeCloseTo(9.81 * 9.5, 10);
    expect(figures?.isAbove).toBe(false);
  });

  it('takes a head that was read itself before the drops', () => {
    const point = { ...typed.points.a!, head: '6' };
    expect(figuresTyped(point, typed, levels)?.totalHead).toBe(6);
    const read = readTyped({ ...typed, points: { a: point } }, view);
    expect(read.input?.points[0]).toMatchObject({ dropsLost: null, totalHead: 6, elevation: -1.5 });
  });

  it('gives nothing without an elevation, a count or a level', () => {
    const point = typed.points.a!;
    expect(figuresTyped({ ...point, elevation: '' }, typed, levels)).toBeNull();
    expect(figuresTyped(point, { ...typed, drops: '' }, levels)).toBeNull();
    expect(figuresTyped(point, { ...typed, drops: '0' }, levels)).toBeNull();
    expect(figuresTyped(point, { ...typed, outletHead: '' }, levels)).toBeNull();
    expect(figuresTyped(point, typed, { ...levels, headwater: null })).toBeNull();
  });

  it('is sealed whole or says what is lacking', () => {
    expect(readTyped({ ...typed, points: {} }, view).fault).toMatch(/at least one point/);
    const half = { ...typed, points: { ...typed.points, b: NEW_POINT } };
    expect(readTyped(half, view).fault).toBe('Still to be read: unnamed point.');
    const wrong = { ...typed, points: { a: { ...NEW_POINT, elevation: 'two' } } };
    expect(readTyped(wrong, view).fault).toBe('Elevation z of P1 is no number.');
    expect(readTyped(typed, view).input).toEqual({
      drops: 8,
      outletHead: 2,
      points: [
        {
          pointId: 'a',
          sheetAt: null,
          offset: null,
          elevation: -1.5,
          dropsLost: 2,
          totalHead: null,
          remark: '',
        },
      ],
    });
  });

  it('begins with the tailwater, and goes on from what the browser has kept', () => {
    expect(parseKept(null, view)).toEqual({ drops: '', outletHead: '2', points: {} });
    expect(parseKept('no JSON', view)).toEqual({ drops: '', outletHead: '2', points: {} });
    expect(parseKept(JSON.stringify(typed), view)).toEqual(typed);
  });
});
