import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { fitTwoScales, missInPixels, sectionFitOf, type TwoScales } from '#shared/compute/two-scales.ts';
import { type Known, known, sectionOf } from '#tests/support/known-points.ts';

const TWO = { scales: 'plottingExaggeration' } as const;
const codesOf = (...asked: Parameters<typeof sectionOf>) =>
  readSetOut(sectionOf(...asked)).findings.map(({ code }) => code);

/** Places that a drawing of two scales gives to section coordinates. */
function drawnBy(fit: TwoScales, places: ReadonlyArray<readonly [number, number]>): Known[] {
  const [a, b, c, d] = sectionFitOf(fit).linear;
  const det = a * d - b * c;
  return places.map(([offset, elevation]) => {
    const X = offset - fit.sectionOrigin[0];
    const Z = elevation - fit.sectionOrigin[1];
    return known(
      fit.sheetOrigin[0] + (d * X - b * Z) / det,
      fit.sheetOrigin[1] + (a * Z - c * X) / det,
      offset,
      elevation,
    );
  });
}

const CORNERS = [
  [0, 90],
  [120, 90],
  [0, 112],
  [110, 109],
] as const;

const drawing = fc.record({
  along: fc.double({ min: 0.01, max: 0.5, noNaN: true }),
  up: fc.double({ min: 0.01, max: 0.5, noNaN: true }),
  rotation: fc.double({ min: -0.9, max: 0.9, noNaN: true }),
  mirrored: fc.boolean(),
  sheetOrigin: fc.constant([2400, 1500] as const),
  sectionOrigin: fc.constant([60, 100] as const),
});

describe('two scales by known points', () => {
  it('are found again, with turn and side, from the places that they give', () => {
    fc.assert(
      fc.property(drawing, (fit) => {
        const { reading, map } = readSetOut(sectionOf(drawnBy(fit, CORNERS), TWO));
        expect(reading.state).toBe('fitted');
        expect(reading.unitsPerPx! / fit.along).toBeCloseTo(1, 9);
        expect(reading.unitsPerPxUp! / fit.up).toBeCloseTo(1, 9);
        expect(reading.exaggeration! / (fit.along / fit.up)).toBeCloseTo(1, 9);
        expect(reading.rotationDeg).toBeCloseTo((fit.rotation * 180) / Math.PI, 7);
        expect(reading.offsetsGrowLeft).toBe(fit.mirrored);
        expect(reading.residual).toBeLessThan(1e-8);
        const [probe] = drawnBy(fit, [[47, 101]]);
        const [offset, elevation] = map!.toSection(sheetPx(...probe!.at));
        expect(offset).toBeCloseTo(47, 7);
        expect(elevation).toBeCloseTo(101, 7);
        const back = map!.toSheet(map!.toSection(sheetPx(...probe!.at)));
        expect(Math.hypot(back[0] - probe!.at[0], back[1] - probe!.at[1])).toBeLessThan(1e-6);
      }),
    );
  });

  it('lie where no neighbouring fit misses the clicks by less', () => {
    fc.assert(
      fc.property(
        drawing,
        fc.array(fc.double({ min: -4, max: 4, noNaN: true }), { minLength: 8, maxLength: 8 }),
        (fit, off) => {
          const pairs = drawnBy(fit, CORNERS).map(({ at, offset, elevation }, i) => ({
            sheet: [at[0] + off[2 * i]!, at[1] + off[2 * i + 1]!] as const,
            section: [offset!, elevation!] as const,
          }));
          const best = fitTwoScales(pairs, null);
          fc.pre(best !== null);
          const least = missInPixels(best!, pairs);
          for (const by of [-1e-4, 1e-4]) {
            expect(missInPixels({ ...best!, rotation: best!.rotation + by }, pairs)).toBeGreaterThanOrEqual(
              least,
            );
            expect(missInPixels({ ...best!, along: best!.along * (1 + by) }, pairs)).toBeGreaterThanOrEqual(
              least,
            );
            expect(missInPixels({ ...best!, up: best!.up * (1 + by) }, pairs)).toBeGreaterThanOrEqual(least);
          }
        },
      ),
    );
  });

  it('agree with one scale where there is one', () => {
    const points = drawnBy(
      {
        along: 0.05,
        up: 0.05,
        rotation: 0.02,
        mirrored: true,
        sheetOrigin: [900, 900],
        sectionOrigin: [20, 100],
      },
      CORNERS,
    );
    const one = readSetOut(sectionOf(points));
    const two = readSetOut(sectionOf(points, TWO));
    expect(two.findings.map(({ code }) => code)).toEqual(['scalesEqual']);
    expect(two.reading.unitsPerPx).toBeCloseTo(one.reading.unitsPerPx!, 12);
    expect(two.reading.rotationDeg).toBeCloseTo(one.reading.rotationDeg!, 9);
    expect(two.map!.up[0]).toBeCloseTo(one.map!.up[0], 12);
    expect(two.map!.up[1]).toBeCloseTo(one.map!.up[1], 12);
    expect(two.map!.elevationPerPx).toBeCloseTo(one.map!.elevationPerPx, 12);
  });

  it('follow from two points when the sheet’s own horizontal is level', () => {
    const points = [known(200, 1500, 0, 100), known(2200, 500, 100, 110)];
    expect(codesOf(points, TWO)).toEqual(['turnUnknown']);
    const level = readSetOut(sectionOf(points, { ...TWO, level: 'sheet' }));
    expect(level.reading.unitsPerPx).toBeCloseTo(0.05, 12);
    expect(level.reading.unitsPerPxUp).toBeCloseTo(0.01, 12);
    expect(level.reading.exaggeration).toBeCloseTo(5, 10);
    const left = [known(200, 1500, 0, 100), known(2200, 500, -100, 110)];
    expect(readSetOut(sectionOf(left, { ...TWO, level: 'sheet' })).reading.offsetsGrowLeft).toBe(true);
    expect(codesOf(left, { ...TWO, level: 'sheet', offsetsGrow: 'right' })).toEqual(['setOutContradiction']);
    const lying = [known(200, 1500, 0, 110), known(2200, 500, 100, 100)];
    expect(codesOf(lying, { ...TWO, level: 'sheet' })).toEqual(['upUnknown']);
  });

  it('are asked for what is missing', () => {
    expect(codesOf([known(0, 0, 0, 100), known(900, 0, 50, 100)], TWO)).toEqual(['setOutIncomplete']);
    expect(codesOf([known(0, 900, 0, 100), known(900, 450, 50, 110), known(1800, 0, 100, 120)], TWO)).toEqual(
      ['turnUnknown'],
    );
    expect(
      codesOf([known(0, 900, 0, 100), known(900, 900, 50, 100)], {
        ...TWO,
        method: 'distance',
        distance: 50,
      }),
    ).toEqual(['scalesNeedPoints']);
    expect(codesOf([known(0, 900, 0, 100), known(900, 899, 50, 110)], { ...TWO, level: 'sheet' })).toEqual([
      'knownPointsCoincide',
    ]);
  });

  it('imply kh/kv = (sx/sz)² of a section drawn transformed, and nothing of an exaggerated one', () => {
    const points = [known(0, 1000, 0, 100), known(1000, 1000, 60, 100), known(0, 0, 0, 120)];
    expect(readSetOut(sectionOf(points, { scales: 'transformedSection' })).impliedRatio).toBeCloseTo(9, 10);
    expect(readSetOut(sectionOf(points, TWO)).impliedRatio).toBeNull();
  });
});

describe('a drawing of two scales that is taken for one of one scale', () => {
  it('withholds the figures by three points or more', () => {
    const stretched = [
      known(0, 1000, 0, 100),
      known(2000, 1000, 100, 100),
      known(0, 0, 0, 110),
      known(2000, 0, 100, 110),
    ];
    expect(codesOf(stretched)).toEqual(['scalesUnequal']);
    expect(codesOf(stretched.slice(0, 3))).toEqual(['scalesUnequal']);
    // Paper that has shrunk by a hundredth one way is still one scale.
    const shrunk = stretched.map((point) => ({ ...point, elevation: 100 + (point.elevation! - 100) * 5.05 }));
    expect(codesOf(shrunk)).toEqual([]);
  });

  it('withholds them by two points when the scale stated holds in one direction only', () => {
    // 300 dpi and 1:500 make 0.04233 m to the pixel.
    const unit = (500 * 0.0254) / 300;
    const points = [known(200, 1500, 0, 100), known(2200, 700, 2000 * unit, 100 + 800 * (unit / 2))];
    expect(codesOf(points, { statedScale: 500 }, { dpi: 300 })).toEqual(['scalesUnequal']);
    expect(codesOf(points, { ...TWO, level: 'sheet', statedScale: 500 }, { dpi: 300 })).toEqual([]);
    expect(codesOf(points, { ...TWO, level: 'sheet', statedScale: 250 }, { dpi: 300 })).toEqual([]);
    expect(codesOf(points, { ...TWO, level: 'sheet', statedScale: 400 }, { dpi: 300 })).toEqual([
      'scaleDisagrees',
    ]);
  });

  it('shows in a turn that no scan has where two points are all there is', () => {
    expect(codesOf([known(200, 1500, 0, 100), known(2200, 700, 100, 110)])).toEqual(['sheetTurnedFar']);
    expect(codesOf([known(200, 1500, 0, 100), known(2200, 1400, 100, 104)])).toEqual([]);
  });
});
