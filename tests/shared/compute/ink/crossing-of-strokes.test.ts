import { describe, expect, it } from 'vitest';
import { crossingOfStrokes } from '#shared/compute/ink/crossing-of-strokes.ts';
import { type DrawnStroke, drawnScan, LOOKS, randomOf, type ScanLook } from '#tests/support/crossing-scan.ts';

const SIDE = 112;
const REACH = 12;

type Place = readonly [number, number];

/** A stroke through a place, at an angle to the horizontal, reaching so far to either side. */
function through([x, y]: Place, deg: number, widthPx: number, back: number, ahead: number): DrawnStroke {
  const [cos, sin] = [Math.cos((deg * Math.PI) / 180), Math.sin((deg * Math.PI) / 180)];
  return { from: [x - back * cos, y - back * sin], to: [x + ahead * cos, y + ahead * sin], widthPx };
}

/** How two lines meet: how far each goes on beyond the meeting, from 0 to 1 of the window. */
const JUNCTIONS = { crossing: [1, 1], tee: [1, 0], corner: [0, 0] } as const;

function meeting(kind: keyof typeof JUNCTIONS, seed: number, look: ScanLook) {
  const random = randomOf(seed);
  const at: Place = [SIDE / 2 + 6 * (random() - 0.5), SIDE / 2 + 6 * (random() - 0.5)];
  const skew = 8 * (random() - 0.5);
  const between = 40 + 100 * random();
  const width = () => 1.6 + 5 * random();
  const [one, two] = JUNCTIONS[kind];
  const strokes = [
    through(at, skew, width(), 90 * one, 90),
    through(at, skew + between, width(), 90 * two, 90),
  ];
  const click: Place = [at[0] + 10 * (random() - 0.5), at[1] + 10 * (random() - 0.5)];
  return { at, click, window: drawnScan(SIDE, strokes, look, seed) };
}

const percentile95 = (values: number[]) =>
  [...values].sort((a, b) => a - b)[Math.ceil(0.95 * values.length) - 1]!;

describe('the crossing of two drawn lines', () => {
  it('is none on bare paper, along one line alone, or among specks', () => {
    const bare = drawnScan(SIDE, [], LOOKS.toned!, 1);
    expect(crossingOfStrokes(bare, [56, 56], REACH)).toBeNull();
    const one = drawnScan(SIDE, [through([56, 56], 3, 2, 90, 90)], LOOKS.toned!, 2);
    expect(crossingOfStrokes(one, [56, 56], REACH)).toBeNull();
    const specks = drawnScan(SIDE, [], { ...LOOKS.fax!, specks: 30 }, 3);
    expect(crossingOfStrokes(specks, [56, 56], REACH)).toBeNull();
  });

  it('is none where it lies further off than the reach, or the lines meet too flat', () => {
    const strokes = [through([56, 56], 0, 2, 90, 90), through([56, 56], 90, 2, 90, 90)];
    const window = drawnScan(SIDE, strokes, LOOKS.clean!, 4);
    expect(crossingOfStrokes(window, [70, 70], REACH)).toBeNull();
    const flat = [through([56, 56], 0, 2, 90, 90), through([56, 56], 12, 2, 90, 90)];
    expect(crossingOfStrokes(drawnScan(SIDE, flat, LOOKS.clean!, 5), [56, 56], REACH)).toBeNull();
  });

  it('is none between lines that end before they meet', () => {
    const apart = [through([56, 20], 0, 2, 90, 90), through([56, 90], 90, 2, 0, 60)];
    expect(crossingOfStrokes(drawnScan(SIDE, apart, LOOKS.clean!, 6), [56, 24], REACH)).toBeNull();
  });

  // P95 errors printed and held, pixels; 40 drawings each of strokes 1.6 to 6.6 px wide, skewed and at 40 to 140 degrees.
  it.each([
    ['crossing', 'clean', 0.1],
    ['crossing', 'toned', 0.2],
    ['crossing', 'faded', 0.3],
    ['crossing', 'fax', 0.3],
    ['tee', 'clean', 0.2],
    ['tee', 'fax', 0.4],
    ['corner', 'toned', 0.4],
    ['corner', 'fax', 1],
  ] as const)('of a %s on a %s scan lies within %f px at the 95th percentile', (kind, look, most) => {
    const errors = Array.from({ length: 40 }, (_, i) => {
      const { at, click, window } = meeting(kind, i + 1, LOOKS[look]!);
      const found = crossingOfStrokes(window, click, REACH);
      return found === null ? Number.POSITIVE_INFINITY : Math.hypot(found.at[0] - at[0], found.at[1] - at[1]);
    });
    const missed = errors.filter((error) => !Number.isFinite(error)).length;
    const p95 = percentile95(errors.filter(Number.isFinite));
    console.info(`${kind} on ${look}: P95 ${p95.toFixed(3)} px, ${missed} of ${errors.length} not found`);
    expect(missed).toBeLessThanOrEqual(3);
    expect(p95).toBeLessThan(most);
  });

  it('is the one nearest to the pointer on a ruled sheet', () => {
    const rules = [20, 36, 52, 68, 84].map((y) => through([56, y + 0.3], 0.5, 1.8, 90, 90));
    const upright = [through([50.4, 56], 90.5, 2.4, 90, 90)];
    const window = drawnScan(SIDE, [...rules, ...upright], LOOKS.fax!, 9);
    const found = crossingOfStrokes(window, [53, 49], REACH)!;
    expect(found.angleDeg).toBeGreaterThan(88);
    expect(Math.abs(found.at[0] - 50.4)).toBeLessThan(0.4);
    expect(Math.abs(found.at[1] - 52.3)).toBeLessThan(0.4);
  });

  it('moves with the scan: shifted by whole pixels, the crossing is the same', () => {
    const { window, click } = meeting('crossing', 7, LOOKS.fax!);
    const grey = new Uint8Array(SIDE * SIDE).fill(255);
    for (let y = 0; y < SIDE - 5; y += 1) {
      grey.set(window.grey.subarray(y * SIDE, y * SIDE + SIDE - 3), (y + 5) * SIDE + 3);
    }
    const before = crossingOfStrokes(window, click, REACH)!.at;
    const after = crossingOfStrokes({ ...window, grey }, [click[0] + 3, click[1] + 5], REACH)!.at;
    expect(Math.abs(after[0] - before[0] - 3)).toBeLessThan(0.1);
    expect(Math.abs(after[1] - before[1] - 5)).toBeLessThan(0.1);
  });
});
