import { describe, expect, it } from 'vitest';
import {
  firstHandles,
  type Setting,
  shownWhile,
  turnedBy,
  turnedTo,
  withHandles,
} from '#client/features/clean-up/model/handles.ts';
import { settingsWords } from '#client/features/clean-up/model/settings-words.ts';
import { AS_SCANNED } from '#shared/contract/renditions.ts';

const base = { widthPx: 4000, heightPx: 3000 };

describe('handles on a picture', () => {
  it.each<[Setting, Array<[number, number]>]>([
    [
      'level',
      [
        [5, 5],
        [5, 5],
      ],
    ],
    [
      'corners',
      [
        [0, 0],
        [0, 3000],
        [4000, 3000],
        [4000, 0],
      ],
    ],
    [
      'crop',
      [
        [10, 10],
        [14, 900],
      ],
    ],
  ])('that say nothing that can be done change nothing: %s', (setting, handles) => {
    expect(withHandles(AS_SCANNED, setting, handles, base)).toBeNull();
  });

  it('make a line level on top of the turn that is there', () => {
    const turned = { ...AS_SCANNED, turnDeg: 90, crop: [0, 0, 100, 100] as [number, number, number, number] };
    const next = withHandles(
      turned,
      'level',
      [
        [100, 100],
        [1100, 100 + 1000 * Math.tan(Math.PI / 90)],
      ],
      base,
    )!;
    expect(next.turnDeg).toBeCloseTo(88, 9);
    // A crop is of the turned picture.
    expect(next.crop).toBeNull();
  });

  it('crop between two corners in any order, by whole pixels', () => {
    const next = withHandles(
      AS_SCANNED,
      'crop',
      [
        [900.4, 800.2],
        [100.3, 50.6],
      ],
      base,
    )!;
    expect(next.crop).toEqual([100, 51, 800, 749]);
  });

  it('stand at first where they were set before, and within the picture where they were not', () => {
    const corners = withHandles(AS_SCANNED, 'corners', firstHandles('corners', AS_SCANNED, base), base)!;
    expect(firstHandles('corners', corners, base)).toEqual(corners.corners);
    const crop = { ...AS_SCANNED, crop: [10, 20, 300, 200] as [number, number, number, number] };
    expect(firstHandles('crop', crop, base)).toEqual([
      [10, 20],
      [310, 220],
    ]);
    for (const setting of ['level', 'corners', 'crop'] as const)
      for (const [x, y] of firstHandles(setting, AS_SCANNED, base)) {
        expect(x).toBeGreaterThan(0);
        expect(x).toBeLessThan(4000);
        expect(y).toBeGreaterThan(0);
        expect(y).toBeLessThan(3000);
      }
  });

  it('are set on the picture without what they change', () => {
    const all = {
      ...AS_SCANNED,
      turnDeg: 3,
      crop: [0, 0, 9, 9] as [number, number, number, number],
      invert: true,
    };
    expect(shownWhile(all, 'crop')).toEqual({ ...all, crop: null });
    expect(shownWhile(all, 'corners')).toEqual({ ...all, crop: null, turnDeg: 0 });
    expect(shownWhile(all, 'level')).toEqual(all);
  });
});

describe('a turn', () => {
  it('stays within half a turn each way', () => {
    expect(turnedBy({ ...AS_SCANNED, turnDeg: 170 }, 90).turnDeg).toBe(-100);
    expect(turnedBy({ ...AS_SCANNED, turnDeg: -90 }, -90).turnDeg).toBe(180);
    expect(turnedTo(AS_SCANNED, -180).turnDeg).toBe(180);
    expect(turnedTo(AS_SCANNED, 1.25).turnDeg).toBe(1.25);
  });
});

describe('what was done to a picture', () => {
  it('is said in a few words', () => {
    expect(settingsWords(AS_SCANNED)).toBe('as scanned');
    expect(settingsWords({ ...AS_SCANNED, turnDeg: 1.256, threshold: 140, black: 20 })).toBe(
      'turned 1.26°, contrast, black and white',
    );
  });
});
