import { describe, expect, it } from 'vitest';
import { knownPointHalfWidth, setOutCauses } from '#shared/compute/doubt/place-doubt.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';

const UNITS_PER_PX = 0.02;

/** Known points at pixels, exactly where a scale of 0.02 m per pixel and no rotation puts them, but for `errors`. */
function setOutBy(
  places: ReadonlyArray<readonly [number, number]>,
  errors: readonly number[] = [],
): FlowNetDocument {
  const points = places.map(
    ([x, y], i): DocumentEntity => ({
      kind: 'knownPoint',
      name: `K${i + 1}`,
      at: [x, y],
      offset: x * UNITS_PER_PX + (errors[i] ?? 0),
      elevation: 200 - y * UNITS_PER_PX,
      use: 'fit',
    }),
  );
  const values: DocumentEntity[] = [
    ...points,
    {
      kind: 'setOut',
      method: 'points',
      distance: null,
      level: 'line',
      offsetsGrow: 'right',
      upstream: 'left',
      upQuarterTurns: null,
      statedScale: null,
      scales: 'equal',
    },
    {
      kind: 'netCount',
      drops: null,
      channels: null,
      cellRatio: 1,
      countedIn: null,
      tracingAccuracyPx: 1.5,
      knownPointAccuracyPx: 2,
    },
  ];
  const idOf = (i: number) => `019a3c00-0000-7000-8000-00000000000${i}`;
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: idOf(9),
    name: '',
    unitSystem: 'SI',
    datum: '',
    sheet: { widthPx: 5000, heightPx: 3000, dpi: 300 },
    entities: Object.fromEntries(values.map((value, i) => [idOf(i), { id: idOf(i), version: 1, value }])),
  };
}

const THREE = [
  [500, 2500],
  [4500, 2500],
  [2500, 500],
] as const;

describe('the doubt of the set-out', () => {
  it('is nothing while there is none', () => {
    const empty = setOutBy([[1, 1]]);
    expect(setOutCauses(empty, readSetOut(empty))).toEqual([]);
  });

  // Closed form for a conformal fit of n points: variance of a coordinate at p is σ²(1/n + |p − c|²/Σ|pᵢ − c|²), c the
  // centroid (Ghilani and Wolf, Adjustment Computations, ch. 18, with equal weights).
  it.each([
    [THREE, [2500, 1833.3333]],
    [THREE, [4900, 300]],
    [THREE.slice(0, 2), [2500, 2500]],
    [THREE.slice(0, 2), [500, 2500]],
  ] as const)('carries over to a place as the closed form says', (places, at) => {
    const document = setOutBy(places);
    const causes = setOutCauses(document, readSetOut(document));
    const up = Math.hypot(...causes.map(({ shift }) => shift(sheetPx(at[0], at[1]))[1]));
    const along = Math.hypot(...causes.map(({ shift }) => shift(sheetPx(at[0], at[1]))[0]));
    const mean = (axis: 0 | 1) =>
      places.map((place): number => place[axis]).reduce((sum, value) => sum + value, 0) / places.length;
    const centre = [mean(0), mean(1)];
    const square = ([x, y]: readonly number[]) => (x! - centre[0]!) ** 2 + (y! - centre[1]!) ** 2;
    const all = places.map((place) => square(place)).reduce((sum, value) => sum + value, 0);
    const expected = 2 * UNITS_PER_PX * Math.sqrt(1 / places.length + square(at) / all);
    expect(up).toBeCloseTo(expected, 4);
    expect(along).toBeCloseTo(expected, 4);
  });

  it('takes what the residuals show when that is more than was stated', () => {
    const good = setOutBy(THREE);
    const goodSetOut = readSetOut(good);
    expect(knownPointHalfWidth(good, goodSetOut, goodSetOut.map!)).toBe(2);
    const poor = setOutBy(THREE, [0, 0.4, 0]);
    const poorSetOut = readSetOut(poor);
    expect(knownPointHalfWidth(poor, poorSetOut, poorSetOut.map!)).toBeGreaterThan(10);
  });
});
