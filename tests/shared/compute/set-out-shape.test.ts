import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { leastSquares } from '#shared/compute/least-squares.ts';
import { mapOfFourPlaces, throughPlane } from '#shared/compute/plane-map.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { known, sectionOf } from '#tests/support/known-points.ts';

type Pair = readonly [number, number];
const SHEET: Pair[] = [
  [400, 1600],
  [2600, 1650],
  [2500, 300],
  [500, 350],
  [1500, 900],
  [900, 1200],
];

/** A photograph of a section at 0.05 m a pixel: corners of a rectangle of 100 × 60 m. */
const photograph = mapOfFourPlaces(
  [
    [0, 0],
    [100, 0],
    [100, 60],
    [0, 60],
  ],
  [
    [300, 1700],
    [2700, 1600],
    [2300, 420],
    [620, 250],
  ],
)!;
const sectionAt = mapOfFourPlaces(
  [
    [300, 1700],
    [2700, 1600],
    [2300, 420],
    [620, 250],
  ],
  [
    [0, 0],
    [100, 0],
    [100, 60],
    [0, 60],
  ],
)!;
/** Paper 1.5 % longer along than up, aslant by half a degree, 30,000 m from the chainage's beginning. */
const stretched = ([x, y]: Pair): Pair => [
  30_000 + 0.05 * 1.015 * x + 0.05 * Math.tan(Math.PI / 360) * y,
  200 - 0.05 * y + 0.0004 * x,
];
const photographed = ([x, y]: Pair): Pair => {
  const [offset, elevation] = throughPlane(sectionAt, x, y);
  return [250_000 + offset, 40 + elevation];
};
const pointsBy = (sectionOfPlace: (at: Pair) => Pair, places = SHEET) =>
  places.map(([x, y]) => known(x, y, ...sectionOfPlace([x, y])));
const codes = (document: FlowNetDocument) => readSetOut(document).findings.map(({ code }) => code);

describe('least squares', () => {
  it('has no answer for too few equations or for columns that are one', () => {
    expect(leastSquares([[1, 2]], [3])).toBeNull();
    expect(leastSquares([], [])).toBeNull();
    expect(
      leastSquares(
        [
          [1, 2],
          [2, 4],
          [3, 6],
        ],
        [1, 2, 3],
      ),
    ).toBeNull();
  });

  it('is the line of Anscombe’s first set: 3.000 + 0.500 x (Anscombe 1973)', () => {
    const xs = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
    const ys = [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68];
    const [intercept, slope] = leastSquares(
      xs.map((x) => [1, x]),
      ys,
    )!;
    expect(intercept).toBeCloseTo(3.0001, 4);
    expect(slope).toBeCloseTo(0.5001, 4);
  });
});

describe.each([
  ['stretchedPaper', stretched, 3],
  ['perspective', photographed, 4],
] as const)('a section declared as %s', (scales, sectionOfPlace, needed) => {
  it('wants more points when there are too few, and says so', () => {
    const reading = readSetOut(sectionOf(pointsBy(sectionOfPlace, SHEET.slice(0, needed - 1)), { scales }));
    expect(reading.reading.state).toBe('incomplete');
    expect(reading.map).toBeNull();
  });

  it('says so when points enough are there but only check', () => {
    const points = pointsBy(sectionOfPlace).map((point, i) => ({
      ...point,
      use: i < 2 ? ('fit' as const) : ('check' as const),
    }));
    const { reading, findings } = readSetOut(sectionOf(points, { scales }));
    expect(reading.state).toBe('incomplete');
    expect(findings[0]?.text).toMatch(/ 4 known points only check the fit: say at “Use” if they should/);
    const one = readSetOut(sectionOf(points.slice(0, 3), { scales }));
    expect(one.findings[0]?.text).toMatch(/ A known point only checks the fit: say at “Use” if it should/);
    expect(readSetOut(sectionOf(points.slice(0, 2), { scales })).findings[0]?.text).not.toContain('Use');
  });

  it('is refused when its points lie on one line', () => {
    const line = SHEET.map((_, i): Pair => [300 + 300 * i, 500 + 100 * i]);
    expect(codes(sectionOf(pointsBy(sectionOfPlace, line), { scales }))).toContain('shapeUndetermined');
  });

  it('is questioned while nothing checks it', () => {
    const exact = sectionOf(pointsBy(sectionOfPlace, SHEET.slice(0, needed)), { scales });
    expect(codes(exact)).toEqual(['shapeUnchecked']);
    const beside = (shift: number) => {
      const [x, y] = SHEET[needed]!;
      const [offset, elevation] = sectionOfPlace([x, y]);
      const check = { ...known(x, y, offset + shift, elevation), use: 'check' as const };
      return sectionOf([...pointsBy(sectionOfPlace, SHEET.slice(0, needed)), check], { scales });
    };
    // A check point that agrees checks it as well as one more in the fit, and one that does not is told.
    expect(codes(beside(0))).toEqual([]);
    expect(codes(beside(5))).toContain('residualLarge');
  });

  it('gives every place of the sheet its place in the section, and back', () => {
    const { map, findings, reading } = readSetOut(sectionOf(pointsBy(sectionOfPlace), { scales }));
    expect(findings).toEqual([]);
    expect(reading.residual).toBeLessThan(1e-8);
    fc.assert(
      fc.property(
        fc.tuple(fc.integer({ min: 350, max: 2600 }), fc.integer({ min: 300, max: 1650 })),
        ([x, y]) => {
          const [offset, elevation] = map!.toSection(sheetPx(x, y));
          const truth = sectionOfPlace([x, y]);
          expect(Math.abs(offset - truth[0])).toBeLessThan(1e-7);
          expect(Math.abs(elevation - truth[1])).toBeLessThan(1e-7);
          const [u, v] = map!.toSheet(sectionPt(...truth));
          expect(Math.hypot(u - x, v - y)).toBeLessThan(1e-5);
        },
      ),
    );
  });

  it('is needless where one scale meets the points as well', () => {
    const jitter = [0.4, -0.3, 0.2, -0.4, 0.3, -0.2];
    const plain = SHEET.map(([x, y], i) =>
      known(x + jitter[i]!, y - jitter[5 - i]!, 0.05 * x, 100 - 0.05 * y),
    );
    expect(codes(sectionOf(plain, { scales }))).toContain('shapeNotShown');
  });

  it('contradicts a side to which offsets do not grow', () => {
    const document = sectionOf(pointsBy(sectionOfPlace), { scales, offsetsGrow: 'left' });
    expect(codes(document)).toEqual(['setOutContradiction']);
  });
});

describe('paper', () => {
  it('does not stretch by a fifth', () => {
    const points = SHEET.map(([x, y]) => known(x, y, 0.06 * x, 100 - 0.05 * y));
    expect(codes(sectionOf(points, { scales: 'stretchedPaper' }))).toContain('stretchTooGreat');
  });
});

describe('a net that was traced on a picture that has lost its shape', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const readings = [2.4, 4.4].map((drop) => ({ at: net.placeAt(drop, 1.5), clicked: true }));
  const straight = exactNetDocument(net, { pxPerUnit, readings });
  const truth = readNet(straight);

  it.each([
    ['stretchedPaper', (x: number, y: number): SheetPoint => [1.01 * x + 0.006 * y, 0.995 * y + 40]],
    [
      'perspective',
      (x: number, y: number): SheetPoint => {
        const w = 1 + 6e-5 * x - 4e-5 * y;
        return [(x + 60) / w, (y + 30) / w];
      },
    ],
  ] as const)('has the figures of the drawing itself: %s', (scales, distort) => {
    const document = distorted(straight, distort, scales);
    const reading = readNet(document);
    expect(reading.setOut.state).toBe('fitted');
    expect(reading.points).toHaveLength(truth.points.length);
    reading.points.forEach((point, i) => {
      const of = truth.points[i]!;
      expect(point.totalHead).not.toBeNull();
      // A thousandth of the head lost: points are denser or sparser along a line than on the straight sheet.
      const lost = truth.quantities.headLost!;
      expect(Math.abs(point.totalHead! - of.totalHead!)).toBeLessThan(2e-3 * lost);
      expect(Math.abs(point.elevation! - of.elevation!)).toBeLessThan(1e-6 * lost);
    });
  });
});

/** The document as it would have been traced on the distorted picture, with two known points more. */
function distorted(
  document: FlowNetDocument,
  distort: (x: number, y: number) => SheetPoint,
  scales: 'stretchedPaper' | 'perspective',
): FlowNetDocument {
  const { map } = readSetOut(document);
  const move = ([x, y]: SheetPoint) => distort(x, y);
  const extra = (
    [
      [300, 300],
      [2600, 500],
      [400, 1900],
      [2700, 1800],
    ] as SheetPoint[]
  ).map((at, i) => {
    const [offset, elevation] = map!.toSection(sheetPx(...at));
    const id = `00000000-0000-7000-8000-0000000009${10 + i}`;
    const value = { kind: 'knownPoint', name: `X${i}`, at, offset, elevation, use: 'fit' } as DocumentEntity;
    return [id, { id, version: 1, value }] as const;
  });
  const all = { ...document.entities, ...Object.fromEntries(extra) };
  const entities = Object.entries(all).map(([id, entity]) => [
    id,
    { ...entity, value: moved(entity.value, move, scales) },
  ]);
  return { ...document, entities: Object.fromEntries(entities) };
}

function moved(
  value: DocumentEntity,
  move: (at: SheetPoint) => SheetPoint,
  scales: 'stretchedPaper' | 'perspective',
): DocumentEntity {
  if (value.kind === 'knownPoint') return { ...value, at: move(value.at) };
  if (value.kind === 'line') return { ...value, points: value.points.map(move) };
  if (value.kind === 'setOut') return { ...value, scales };
  if (value.kind === 'readingPoint' && value.place.on === 'sheet')
    return { ...value, place: { on: 'sheet', at: move(value.place.at) } };
  return value;
}

it('the photograph of the test is one', () => {
  // Its far side is shown shorter than its near one.
  const far = throughPlane(photograph, 100, 60)[0] - throughPlane(photograph, 0, 60)[0];
  const near = throughPlane(photograph, 100, 0)[0] - throughPlane(photograph, 0, 0)[0];
  expect(far).toBeLessThan(0.8 * near);
});
