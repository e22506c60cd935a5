import { describe, expect, it } from 'vitest';
import {
  mmPerUnitAt,
  pictureScaleAt,
  roundLength,
  roundScales,
  scaleNumber,
  scalesDiffer,
} from '#client/features/desk/model/picture-scale.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { sectionMapOfFit } from '#shared/compute/section-map.ts';

/** Four pixels to a metre along the level and twelve upwards, on a sheet turned by 3°. */
function turnedStretched() {
  const angle = (3 * Math.PI) / 180;
  const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
  return sectionMapOfFit({
    linear: [cos / 4, sin / 4, sin / 12, -cos / 12],
    sheetOrigin: [100, 800],
    sectionOrigin: [0, 98],
  });
}

describe('the scale of a picture', () => {
  it('is that of the set-out, along the level and upwards, also on a turned sheet', () => {
    const scale = pictureScaleAt(turnedStretched(), null, sheetPx(500, 300));
    expect(scale.level).toBeCloseTo(4, 9);
    expect(scale.up).toBeCloseTo(12, 9);
    expect(scalesDiffer(scale)).toBe(true);
  });

  it('follows the map through which the section is seen', () => {
    const scale = pictureScaleAt(turnedStretched(), [2, 0, 0, 2], sheetPx(500, 300));
    expect(scale.level).toBeCloseTo(8, 9);
    expect(scale.up).toBeCloseTo(24, 9);
  });

  it('is one where both are the same', () => {
    expect(scalesDiffer({ level: 4, up: 4.0001 })).toBe(false);
  });

  it('is 1:500 where a metre is two millimetres, and 1:120 where a foot is a tenth of an inch', () => {
    expect(scaleNumber(2, 'SI')).toBeCloseTo(500, 9);
    expect(scaleNumber(2.54, 'US')).toBeCloseTo(120, 9);
    expect(mmPerUnitAt(500, 'SI')).toBeCloseTo(2, 9);
    expect(mmPerUnitAt(scaleNumber(3.21, 'US'), 'US')).toBeCloseTo(3.21, 9);
  });
});

describe('round figures', () => {
  it.each([
    [487, 'SI', [500, 1000, 2000, 2500]],
    [500, 'SI', [500, 1000, 2000, 2500]],
    [18, 'SI', [20, 25, 50, 100]],
    [251, 'US', [360, 480, 600, 720]],
  ] as const)('after 1:%d of %s are those of a scale rule', (least, system, scales) => {
    expect(roundScales(least, system)).toEqual(scales);
  });

  it.each([
    [56, 50],
    [50, 50],
    [49.9, 20],
    [3.2, 2],
    [0.97, 0.5],
    [1300, 1000],
  ])('up to %d the longest bar is %d', (length, bar) => {
    expect(roundLength(length)).toBe(bar);
  });
});
