import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { fitSimilarity, similarityResidual, similarityScale } from '#shared/compute/similarity.ts';
import { type Known, known, sectionOf } from '#tests/support/known-points.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

describe('setting out: what is missing or doubtful is asked for', () => {
  it('asks for a second point and for typed values', () => {
    expect(readSetOut(sectionOf([])).findings[0]?.text).toBe('Mark two known points on the drawing.');
    expect(readSetOut(sectionOf([known(1, 1, 0, 0)])).reading.state).toBe('incomplete');
    const half = readSetOut(sectionOf([known(1, 1, 0, 0), { at: [500, 0], offset: 4 }]));
    expect(half.reading.state).toBe('incomplete');
    expect(half.map).toBeNull();
  });

  it('refuses points that coincide on the sheet or in their values', () => {
    expect(readSetOut(sectionOf([known(10, 10, 0, 0), known(10.5, 10, 40, 0)])).reading.state).toBe(
      'refused',
    );
    expect(readSetOut(sectionOf([known(10, 10, 5, 5), known(900, 10, 5, 5)])).reading.state).toBe('refused');
  });

  it('asks for the side when the line through two points is steep', () => {
    const steep = readSetOut(sectionOf([known(1000, 1500, 0, 100), known(1010, 500, 0.2, 140)]));
    expect(steep.reading.state).toBe('ambiguous');
    expect(steep.findings[0]?.code).toBe('offsetsSideUnknown');
    const said = (offsetsGrow: 'left' | 'right') =>
      readSetOut(sectionOf([known(1000, 1500, 0, 100), known(1010, 500, 0.2, 140)], { offsetsGrow }));
    expect(said('right').map!.toSection(sheetPx(1200, 1000))[0]).toBeGreaterThan(0);
    expect(said('left').map!.toSection(sheetPx(1200, 1000))[0]).toBeLessThan(0);
  });

  it('asks which way is up when the sheet lies on its side, and takes the answer', () => {
    // The sheet was turned a quarter clockwise: the section's up points to the right of the sheet.
    const points = [known(500, 300, 0, 100), known(500, 1300, 50, 100)];
    expect(readSetOut(sectionOf(points)).findings[0]?.code).toBe('upUnknown');
    const turned = readSetOut(sectionOf(points, { upQuarterTurns: 1 }));
    expect(turned.reading.state).toBe('fitted');
    expect(turned.map!.toSection(sheetPx(700, 300))[1]).toBeCloseTo(110, 9);
    expect(turned.reading.offsetsGrowLeft).toBe(false);
  });

  it('refuses an answer that contradicts the points', () => {
    const answer = { offsetsGrow: 'left' as const, upQuarterTurns: 0 as const };
    expect(
      readSetOut(sectionOf([known(0, 900, 0, 100), known(2000, 900, 50, 100)], answer)).reading.state,
    ).toBe('refused');
  });
});

describe('setting out by three known points questions what does not go together', () => {
  const corners = [known(0, 1000, 0, 100), known(2000, 1000, 50, 100), known(0, 0, 0, 125)];

  it('offset and elevation typed into one another lay the section on its side', () => {
    const swapped = corners.map((point) => ({
      ...point,
      offset: point.elevation!,
      elevation: point.offset!,
    }));
    const reading = readSetOut(sectionOf(swapped));
    expect(reading.reading.state).toBe('ambiguous');
    expect(reading.findings[0]?.code).toBe('upUnknown');
  });

  it('depths typed for elevations stand it on its head', () => {
    const depths = corners.map((point) => ({ ...point, elevation: -point.elevation! }));
    expect(readSetOut(sectionOf(depths)).findings[0]?.code).toBe('upUnknown');
  });

  it('a side said that the points deny', () => {
    expect(readSetOut(sectionOf(corners, { offsetsGrow: 'right' })).reading.state).toBe('fitted');
    expect(readSetOut(sectionOf(corners, { offsetsGrow: 'left' })).reading.state).toBe('refused');
  });

  it('one value mistyped among three', () => {
    const codes = (points: Known[]) => readSetOut(sectionOf(points)).findings.map((found) => found.code);
    expect(codes(corners)).toEqual([]);
    // Among three alone a mistyped elevation cannot be told from a scale of its own upwards: both withhold the figures.
    expect(codes([corners[0]!, corners[1]!, known(0, 0, 0, 130)])).toEqual(['scalesUnequal']);
    expect(codes([...corners, known(2000, 0, 50, 130)])).toEqual(['residualLarge', 'knownPointSuspect']);
  });
});

describe('a scale that no drawing has', () => {
  const refusals = (section: ReturnType<typeof sectionOf>) => {
    const { reading, map, findings } = readSetOut(section);
    expect([reading.state, map]).toEqual(['refused', null]);
    return findings.map(({ code }) => code);
  };

  it('is refused, so that no figure is worked out of nothing', () => {
    const ends: Known[] = [{ at: [500, 1000], offset: 0, elevation: 98 }, { at: [1500, 1000] }];
    for (const distance of [1e-7, 1e-160, 1e-320])
      expect(
        refusals(sectionOf(ends, { method: 'distance', distance, offsetsGrow: 'right' })),
        String(distance),
      ).toEqual(['setOutTooSmall']);
    expect(refusals(sectionOf([known(0, 0, 0, 0), known(900, 300, 1e-170, -1e-171)]))).toEqual([
      'setOutTooSmall',
    ]);
  });

  it('is not that of the smallest model: a microscope’s picture of half a micrometre to the pixel', () => {
    const ends: Known[] = [{ at: [500, 1000], offset: 0, elevation: 0 }, { at: [1500, 1000] }];
    const { reading } = readSetOut(
      sectionOf(ends, { method: 'distance', distance: 5e-4, offsetsGrow: 'right' }),
    );
    expect(reading.unitsPerPx).toBeCloseTo(5e-7, 18);
  });
});

describe('setting out by known points', () => {
  it('finds scale, rotation and a probe from two points (published check 7-01, complex algebra)', () => {
    const { reading, map } = readSetOut(sectionOf([known(412, 1310, 0, 100), known(2860, 1262, 61.2, 100)]));
    expect(reading.unitsPerPx).toBeCloseTo(PUBLISHED['7-01'].scale, 9);
    expect(reading.rotationDeg).toBeCloseTo(PUBLISHED['7-01'].rotation, 6);
    const [x, z] = map!.toSection(sheetPx(1500, 900));
    expect(x).toBeCloseTo(PUBLISHED['7-01'].probe_x, 6);
    expect(z).toBeCloseTo(PUBLISHED['7-01'].probe_z, 6);
    expect(reading.residual).toBeNull();
  });

  it('fits four points and gives their residuals (published check 7-02, numpy lstsq)', () => {
    const { reading } = readSetOut(
      sectionOf([
        known(100, 100, 10.02, 80.01),
        known(900, 120, 50.03, 78.98),
        known(880, 700, 48.97, 50.02),
        known(110, 690, 10.51, 50.49),
      ]),
    );
    const check = PUBLISHED['7-02'];
    expect(reading.unitsPerPx).toBeCloseTo(Math.hypot(check.a, check.b), 8);
    expect(reading.residual).toBeCloseTo(check.rms_per_point, 6);
    const sizes = reading.residuals.map((r) => Math.hypot(r.offset!, r.elevation!));
    expect(Math.max(...sizes)).toBeCloseTo(check.max_point_residual, 6);
  });

  it('fits large coordinates as the textbook does (published check 7-04, Ghilani and Wolf ch. 18)', () => {
    const pair = (x: number, y: number, X: number, Y: number) =>
      ({ sheet: [x, -y], section: [X, Y] }) as const;
    const pairs = [
      pair(121.622, -128.066, 1049422.4, 51089.2),
      pair(141.228, 187.718, 1049413.95, 49659.3),
      pair(175.802, 135.728, 1049244.95, 49884.95),
    ];
    const check = PUBLISHED['7-04'];
    const fit = fitSimilarity(pairs, false)!;
    expect(fit.re).toBeCloseTo(check.a, 5);
    expect(fit.im).toBeCloseTo(check.b, 5);
    expect(similarityScale(fit)).toBeCloseTo(check.scale, 5);
    const residuals = pairs.flatMap((entry) => similarityResidual(fit, entry));
    const expected = [check.vX1, check.vY1, check.vX2, check.vY2, check.vX3, check.vY3];
    residuals.forEach((residual, i) => {
      expect(Math.abs(residual - expected[i]!)).toBeLessThan(0.001);
    });
  });

  it('finds offsets that grow to the left by themselves from a level line', () => {
    const { reading, map } = readSetOut(sectionOf([known(500, 1000, 40, 100), known(2500, 1010, 0, 100)]));
    expect(reading.offsetsGrowLeft).toBe(true);
    expect(map!.toSection(sheetPx(500, 500))[1]).toBeGreaterThan(105);
  });

  it('leaves check points out of the fit and shows their residual', () => {
    const { reading } = readSetOut(
      sectionOf([known(0, 1000, 0, 100), known(2000, 1000, 40, 100), known(1000, 500, 20.3, 110, 'check')]),
    );
    expect(reading.residuals[2]!.offset).toBeCloseTo(-0.3, 9);
    expect(reading.residual).toBeCloseTo(0.3, 9);
  });

  it('warns when the scale departs from the stated one by more than 2 %, lengths in feet being feet', () => {
    // 1:480 at 300 dpi: a pixel is 1/300 inch on paper, so 480/300/12 ft on the ground.
    const feet = (480 / 300 / 12) * 1200;
    const points = [known(100, 900, 0, 50), known(1300, 900, feet, 50)];
    const fits = readSetOut(sectionOf(points, { statedScale: 480 }, { dpi: 300, unitSystem: 'US' }));
    expect(fits.reading.impliedScale).toBeCloseTo(480, 9);
    expect(fits.findings).toEqual([]);
    const off = readSetOut(sectionOf(points, { statedScale: 500 }, { dpi: 300, unitSystem: 'US' }));
    expect(off.findings.map((found) => found.code)).toEqual(['scaleDisagrees']);
    expect(off.findings[0]!.text).toContain('the scale 1:480, the drawing states 1:500.');
    const small = readSetOut(sectionOf(points, { statedScale: 2000 }, { dpi: 1000, unitSystem: 'US' }))
      .findings[0];
    expect(small!.text).toContain('the scale 1:1600, the drawing states 1:2000.');
  });

  it('gives the same places, shifted, for a chainage of 250,000 and an elevation of 3,000', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 3000, noNaN: true }),
        fc.double({ min: 0, max: 2000, noNaN: true }),
        (x, y) => {
          const at = (dx: number, dz: number) =>
            readSetOut(
              sectionOf([
                known(412, 1310, 0.13 + dx, 100.2 + dz),
                known(2860, 1262, 61.2 + dx, 99.9 + dz),
                known(1400, 400, 25.1 + dx, 122 + dz),
              ]),
            ).map!.toSection(sheetPx(x, y));
          const near = at(0, 0);
          const far = at(250_000, 3_000);
          // 1e-8 m beside 2.5e5 m is 4e-14, a few units in the last place.
          expect(Math.abs(far[0] - 250_000 - near[0])).toBeLessThan(1e-8);
          expect(Math.abs(far[1] - 3_000 - near[1])).toBeLessThan(1e-8);
        },
      ),
    );
  });

  it('carries places there and back', () => {
    const { map } = readSetOut(sectionOf([known(412, 1310, 0, 100), known(2860, 1262, 61.2, 100)]));
    const there = map!.toSheet(sectionPt(27.3, 109));
    const back = map!.toSection(there);
    expect(back[0]).toBeCloseTo(27.3, 10);
    expect(back[1]).toBeCloseTo(109, 10);
  });
});

describe('setting out by a distance', () => {
  const points: Known[] = [
    { at: [500, 1000], offset: 10 },
    { at: [1500, 1000], elevation: 98 },
  ];

  it('needs distance, one elevation, one offset and the side', () => {
    expect(readSetOut(sectionOf(points, { method: 'distance' })).reading.state).toBe('incomplete');
    const asked = readSetOut(sectionOf(points, { method: 'distance', distance: 25 }));
    expect(asked.findings[0]?.code).toBe('offsetsSideUnknown');
  });

  it('sets out with the line level, either side', () => {
    const right = readSetOut(sectionOf(points, { method: 'distance', distance: 25, offsetsGrow: 'right' }));
    expect(right.reading.unitsPerPx).toBeCloseTo(0.025, 12);
    expect(right.map!.toSection(sheetPx(1500, 900))).toEqual([35, 100.5]);
    const left = readSetOut(sectionOf(points, { method: 'distance', distance: 25, offsetsGrow: 'left' }));
    expect(left.map!.toSection(sheetPx(1500, 900))[0]).toBeCloseTo(-15, 9);
  });

  it('questions a second elevation that denies the level line', () => {
    const answers = { method: 'distance' as const, distance: 40, offsetsGrow: 'right' as const };
    const codes = (second: number | null) =>
      readSetOut(
        sectionOf([known(100, 900, 0, 100), { at: [1100, 900], elevation: second }], answers),
      ).findings.map((found) => found.code);
    expect(codes(null)).toEqual([]);
    expect(codes(100)).toEqual([]);
    expect(codes(103)).toEqual(['distanceDenied']);
  });

  it('takes the sheet for level where the line is not', () => {
    const sloping: Known[] = [{ at: [500, 1000], offset: 0, elevation: 98 }, { at: [800, 600] }];
    const { map, reading } = readSetOut(
      sectionOf(sloping, { method: 'distance', distance: 10, level: 'sheet', offsetsGrow: 'right' }),
    );
    expect(reading.rotationDeg).toBeCloseTo(0, 12);
    expect(map!.toSection(sheetPx(800, 600))[0]).toBeCloseTo(6, 9);
    expect(map!.toSection(sheetPx(800, 600))[1]).toBeCloseTo(106, 9);
  });

  it('asks for up when a line said to be level stands upright', () => {
    const upright: Known[] = [{ at: [500, 1000], offset: 0, elevation: 98 }, { at: [510, 200] }];
    const asked = readSetOut(sectionOf(upright, { method: 'distance', distance: 10, offsetsGrow: 'right' }));
    expect(asked.findings[0]?.code).toBe('upUnknown');
  });
});
