import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { placeDoubtAt, setOutCauses } from '#shared/compute/doubt/place-doubt.ts';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { sectionMapOfFit } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { sectionFitOf, type TwoScales } from '#shared/compute/two-scales.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type Known, sectionOf } from '#tests/support/known-points.ts';

const TWO = { scales: 'plottingExaggeration' } as const;

/** A long profile as drawings have it: what is known of each place in the section. */
type Labelled = readonly [offset: number, elevation: number, typed: 'both' | 'offset' | 'elevation'];

/** The known points of a drawing that is plotted by `fit`, each with what its label says. */
function labelled(fit: TwoScales, places: readonly Labelled[]): Known[] {
  const map = sectionMapOfFit(sectionFitOf(fit));
  return places.map(([offset, elevation, typed]) => {
    const [x, y] = map.toSheet(sectionPt(offset, elevation));
    return {
      at: [x, y],
      offset: typed === 'elevation' ? null : offset,
      elevation: typed === 'offset' ? null : elevation,
    };
  });
}

const drawing = (exaggerated: boolean) =>
  fc
    .record({
      along: fc.double({ min: 0.02, max: 0.5, noNaN: true }),
      up: fc.double({ min: 0.02, max: 0.5, noNaN: true }),
      rotation: fc.double({ min: -0.5, max: 0.5, noNaN: true }),
      mirrored: fc.boolean(),
    })
    .map(
      (drawn): TwoScales => ({
        ...drawn,
        up: exaggerated ? drawn.up : drawn.along,
        sheetOrigin: [2400, 1500],
        sectionOrigin: [18_500, 150],
      }),
    );

/** Stations along the foot, elevations at both sides: no label gives both. */
const PROFILE: readonly Labelled[] = [
  [18_400, 100, 'offset'],
  [18_500, 100, 'offset'],
  [18_650, 100, 'offset'],
  [18_380, 100, 'elevation'],
  [18_380, 180, 'elevation'],
  [18_660, 100, 'elevation'],
  [18_660, 180, 'elevation'],
];

describe('known points of which one coordinate is known', () => {
  it.each([
    ['two scales', true],
    ['one scale', false],
  ])(
    'set a long profile of %s out: stations along its foot, elevations at both its sides',
    (_, exaggerated) => {
      fc.assert(
        fc.property(drawing(exaggerated), (fit) => {
          const { reading, map } = readSetOut(sectionOf(labelled(fit, PROFILE), exaggerated ? TWO : {}));
          expect(reading.state).toBe('fitted');
          expect(reading.offsetsGrowLeft).toBe(fit.mirrored);
          expect(reading.residual).toBeLessThan(1e-6);
          const at = sectionMapOfFit(sectionFitOf(fit)).toSheet(sectionPt(18_555, 163));
          const [offset, elevation] = map!.toSection(at);
          expect(offset).toBeCloseTo(18_555, 6);
          expect(elevation).toBeCloseTo(163, 6);
        }),
      );
    },
  );

  it('count as one equation each: the fit is the one that misses all of them by least', () => {
    const fit: TwoScales = {
      along: 0.3,
      up: 0.05,
      rotation: 0.02,
      mirrored: false,
      sheetOrigin: [2400, 1500],
      sectionOrigin: [18_500, 150],
    };
    const points = labelled(fit, PROFILE).map((point, i) => ({
      ...point,
      at: [point.at[0] + [1, -2, 0.5, 2, -1, 1.5, 0][i]!, point.at[1] + [0, 1, -1, 2, -2, 0, 1][i]!] as [
        number,
        number,
      ],
    }));
    const missOf = (document: FlowNetDocument, turnBy: number, alongBy: number, upBy: number) => {
      const { map, reading } = readSetOut(document);
      const [a, b, c, d] = map!.linear;
      const [cos, sin] = [Math.cos(turnBy), Math.sin(turnBy)];
      const [cx, cy] = [2400, 1500];
      const [X, Z] = map!.toSection(sheetPx(cx, cy));
      return points.reduce((sum, { at, offset, elevation }) => {
        const [u, v] = [cos * (at[0] - cx) - sin * (at[1] - cy), sin * (at[0] - cx) + cos * (at[1] - cy)];
        const along = ((X + a * u + b * v) * 1 - (offset ?? X + a * u + b * v)) / reading.unitsPerPx!;
        const up = (Z + c * u + d * v - (elevation ?? Z + c * u + d * v)) / reading.unitsPerPxUp!;
        return (
          sum +
          (along + alongBy) ** 2 * Number(offset !== null) +
          (up + upBy) ** 2 * Number(elevation !== null)
        );
      }, 0);
    };
    const document = sectionOf(points, TWO);
    const least = missOf(document, 0, 0, 0);
    for (const [turn, along, up] of [
      [1e-4, 0, 0],
      [-1e-4, 0, 0],
      [0, 0.05, 0],
      [0, -0.05, 0],
      [0, 0, 0.05],
      [0, 0, -0.05],
    ] as const) {
      expect(missOf(document, turn, along, up)).toBeGreaterThan(least);
    }
  });

  it('tell no turn when the stations lie on one line and the elevations on another', () => {
    const fit = {
      along: 0.3,
      up: 0.3,
      rotation: 0,
      mirrored: false,
      sheetOrigin: [0, 900],
      sectionOrigin: [0, 100],
    } as const;
    const crossed = labelled(fit, [
      [0, 100, 'offset'],
      [300, 100, 'offset'],
      [0, 110, 'elevation'],
      [0, 190, 'elevation'],
    ]);
    for (const scales of ['equal', 'plottingExaggeration'] as const) {
      const asked = readSetOut(sectionOf(crossed, { scales }));
      expect([asked.reading.state, asked.findings[0]?.code]).toEqual(['ambiguous', 'turnUnknown']);
      const told = readSetOut(sectionOf(crossed, { scales, level: 'sheet' }));
      expect(told.map!.toSection(sheetPx(500, 600))[0]).toBeCloseTo(150, 9);
      expect(told.map!.toSection(sheetPx(500, 600))[1]).toBeCloseTo(190, 9);
    }
  });

  it('ask for what no point gives', () => {
    const stations: Known[] = [
      { at: [0, 900], offset: 0 },
      { at: [900, 900], offset: 300 },
      { at: [900, 100], offset: 300 },
      { at: [0, 100], offset: 0 },
    ];
    expect(readSetOut(sectionOf(stations)).findings[0]?.text).toBe(
      'Type the elevation of at least one known point.',
    );
    expect(readSetOut(sectionOf(stations.slice(0, 3))).findings[0]?.text).toMatch(/3 of the 4 figures/);
    const done = readSetOut(sectionOf([...stations, { at: [0, 900], elevation: 50 }]));
    expect(done.reading.state).toBe('fitted');
    expect(done.reading.residuals[0]!.elevation).toBeNull();
  });

  it('leave out a point of which nothing is typed yet', () => {
    const document = sectionOf([
      { at: [0, 900], offset: 0, elevation: 100 },
      { at: [1000, 900], offset: 50, elevation: 100 },
      { at: [700, 100] },
    ]);
    expect(readSetOut(document).reading.residuals).toHaveLength(2);
    expect(readSetOut(document).reading.residual).toBeNull();
  });

  it('carry their doubt to a place as a Monte Carlo run does (JCGM 101)', () => {
    const fit: TwoScales = {
      along: 0.3,
      up: 0.05,
      rotation: 0.01,
      mirrored: false,
      sheetOrigin: [1500, 1500],
      sectionOrigin: [18_500, 150],
    };
    const exact = labelled(fit, PROFILE);
    const document = sectionOf(exact, TWO);
    const doubt = placeDoubtAt(setOutCauses(document, readSetOut(document)), sheetPx(2600, 400));
    const random = normals(7);
    // The accuracy of known points is taken for 1 px at 95 % where none is stated.
    const sigma = 1 / 1.96;
    const runs = Array.from({ length: 2000 }, () => {
      const moved = exact.map((point) => ({
        ...point,
        at: [point.at[0] + sigma * random(), point.at[1] + sigma * random()] as [number, number],
      }));
      return readSetOut(sectionOf(moved, TWO)).map!.toSection(sheetPx(2600, 400));
    });
    const spreadOf = (axis: 0 | 1) => {
      const mean = runs.reduce((sum, run) => sum + run[axis], 0) / runs.length;
      return 1.96 * Math.sqrt(runs.reduce((sum, run) => sum + (run[axis] - mean) ** 2, 0) / runs.length);
    };
    expect(doubt.offset / spreadOf(0)).toBeGreaterThan(0.93);
    expect(doubt.offset / spreadOf(0)).toBeLessThan(1.07);
    expect(doubt.elevation / spreadOf(1)).toBeGreaterThan(0.93);
    expect(doubt.elevation / spreadOf(1)).toBeLessThan(1.07);
  });
});

/** Normal variables from a fixed start (Box and Muller 1958). */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 1) / 4294967297;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}
