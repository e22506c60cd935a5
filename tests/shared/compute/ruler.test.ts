import { describe, expect, it } from 'vitest';
import { rulerFigures } from '#shared/compute/ruler.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { known, sectionOf } from '#tests/support/known-points.ts';

/** 0.3 ft along and 0.05 ft upwards to the pixel: stretched six times. */
const exaggerated = readSetOut(
  sectionOf(
    [known(0, 1000, 0, 100), known(1000, 1000, 300, 100), known(0, 0, 0, 150), known(1000, 0, 300, 150)],
    {
      scales: 'plottingExaggeration',
    },
  ),
).map!;

describe('the ruler', () => {
  it('measures nothing with fewer than two places', () => {
    expect(rulerFigures([], false, null).legs).toEqual([]);
    expect(rulerFigures([[5, 5]], true, null)).toMatchObject({ legs: [], lengthPx: 0, areaPx: null });
  });

  it('tells pixels, slope and angle of the sheet before the section is set out', () => {
    const { legs, length, area } = rulerFigures(
      [
        [100, 500],
        [400, 100],
      ],
      false,
      null,
    );
    expect(legs[0]).toMatchObject({ lengthPx: 500, length: null, slope: 0.75, cornerDeg: null });
    expect(legs[0]!.angleDeg).toBeCloseTo(53.130102, 5);
    expect([length, area]).toEqual([null, null]);
  });

  it('takes an exaggeration out: true length, slope and angle', () => {
    // 30 ft along and 40 ft up: 100 px and 800 px.
    const { legs } = rulerFigures(
      [
        [200, 900],
        [300, 100],
      ],
      false,
      exaggerated,
    );
    expect(legs[0]!.length).toBeCloseTo(50, 8);
    expect(legs[0]!.offset).toBeCloseTo(30, 8);
    expect(legs[0]!.elevation).toBeCloseTo(40, 8);
    expect(legs[0]!.slope).toBeCloseTo(0.75, 8);
    expect(legs[0]!.angleDeg).toBeCloseTo(53.130102, 5);
  });

  it('tells a level leg and an upright one', () => {
    const [level, upright] = rulerFigures(
      [
        [0, 500],
        [100, 500],
        [100, 100],
      ],
      false,
      exaggerated,
    ).legs;
    expect(level!.slope).toBeNull();
    expect(upright!.slope).toBeCloseTo(0, 9);
    expect(upright!.angleDeg).toBeCloseTo(90, 9);
    expect(upright!.cornerDeg).toBeCloseTo(90, 9);
  });

  it('adds legs up, and gives the area of a closed shape whichever way it is gone round', () => {
    // A triangle of 60 ft by 20 ft.
    const triangle = [
      [0, 800],
      [200, 800],
      [0, 400],
    ] as const;
    const figures = rulerFigures(triangle, true, exaggerated);
    expect(figures.legs).toHaveLength(3);
    expect(figures.length).toBeCloseTo(60 + Math.hypot(60, 20) + 20, 8);
    expect(figures.area).toBeCloseTo(600, 8);
    expect(figures.areaPx).toBeCloseTo(40_000, 8);
    expect(rulerFigures([...triangle].reverse(), true, exaggerated).area).toBeCloseTo(600, 8);
    expect(rulerFigures(triangle, false, exaggerated).area).toBeNull();
  });
});
