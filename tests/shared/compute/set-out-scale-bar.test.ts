import { describe, expect, it } from 'vitest';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { scaleBarOf } from '#shared/compute/set-out-findings.ts';
import { type EntityOf, singleOf } from '#shared/contract/document.ts';
import { type Known, known, sectionOf } from '#tests/support/known-points.ts';

/** 20 px to the metre. */
const THREE = [known(100, 1400, 5, 100), known(2100, 1400, 105, 100), known(2100, 600, 105, 140)];
/** Ends of a bar of 800 px, which is 40 m long. */
const BAR: Known[] = [{ at: [400, 1800] }, { at: [1200, 1800] }];

const readWith = (distance: number | null, points: Known[] = [...THREE, ...BAR]) => {
  const document = sectionOf(points, { distance });
  const setOut = readSetOut(document);
  const value = singleOf(document, 'setOut')!.value;
  return { setOut, bar: scaleBarOf(document, value as EntityOf<'setOut'>, setOut.map!) };
};
const found = (distance: number) =>
  readWith(distance).setOut.findings.filter(({ code }) => code === 'scaleBarDisagrees');

describe('a scale bar that checks the fit by known points', () => {
  it('needs a length and two points without a figure', () => {
    expect(readWith(null).bar).toBeNull();
    expect(readWith(0).bar).toBeNull();
    expect(readWith(40, [...THREE, BAR[0]!]).bar).toBeNull();
  });

  it('has the length that the fit gives it, and changes nothing of the fit', () => {
    const { bar, setOut } = readWith(40);
    expect(bar!.stated).toBe(40);
    expect(bar!.fitted).toBeCloseTo(40, 9);
    expect(setOut.reading.unitsPerPx).toBeCloseTo(0.05, 12);
    expect(readWith(50).setOut.map!.toSection(sheetPx(700, 900))).toEqual(
      setOut.map!.toSection(sheetPx(700, 900)),
    );
  });

  it('agrees within a fiftieth of its length', () => {
    expect(found(40)).toEqual([]);
    expect(found(40 * 1.019)).toEqual([]);
    expect(found(40 / 1.019)).toEqual([]);
  });

  it.each([40 * 1.022, 40 / 1.022, 100])('is questioned when it states %f m', (stated) => {
    const [finding, ...others] = found(stated);
    expect(others).toEqual([]);
    expect(finding).toMatchObject({ weight: 'question', cell: 'scale' });
    expect(finding!.entityIds).toHaveLength(2);
    expect(finding!.text).toContain('is 40 m by the known points');
  });
});

describe('setting out by a scale bar', () => {
  const answers = { method: 'distance', distance: 40, offsetsGrow: 'right', level: 'line' } as const;
  const level: Known = { at: [300, 1000], offset: 12, elevation: 118, use: 'check' };
  const section = (bar: Known[]) => readSetOut(sectionOf([...bar, level], answers));

  it('takes scale and level from its ends, offset and elevation from another point', () => {
    const { reading, map } = section(BAR);
    expect(reading.state).toBe('fitted');
    expect(reading.unitsPerPx).toBeCloseTo(0.05, 12);
    // 400 px right and 200 px up of the point that gives both figures.
    const [offset, elevation] = map!.toSection(sheetPx(700, 800));
    expect(offset).toBeCloseTo(32, 9);
    expect(elevation).toBeCloseTo(128, 9);
  });

  it('is the same whichever end was marked first, and when the level was marked before the bar', () => {
    const places = (setOut: ReturnType<typeof readSetOut>) => setOut.map!.toSection(sheetPx(700, 800));
    const first = places(section(BAR));
    for (const other of [section([...BAR].reverse()), readSetOut(sectionOf([level, ...BAR], answers))]) {
      const [offset, elevation] = places(other);
      expect(offset).toBeCloseTo(first[0], 9);
      expect(elevation).toBeCloseTo(first[1], 9);
    }
  });

  it('follows a bar that lies askew, by which the sheet is turned', () => {
    // 3 : 4 : 5 – 800 px along a line that falls by 3 in 4 on the sheet.
    const { reading } = section([{ at: [400, 1000] }, { at: [1040, 1480] }]);
    expect(reading.unitsPerPx).toBeCloseTo(0.05, 12);
    expect(reading.rotationDeg).toBeCloseTo((Math.atan2(480, 640) * 180) / Math.PI, 9);
  });

  it('asks for the ends, and refuses a bar without length', () => {
    expect(section([BAR[0]!]).reading.state).toBe('incomplete');
    const refused = section([BAR[0]!, { at: [400, 1800] }]);
    expect(refused.reading.state).toBe('refused');
    expect(refused.findings.map(({ code }) => code)).toEqual(['knownPointsCoincide']);
  });
});
