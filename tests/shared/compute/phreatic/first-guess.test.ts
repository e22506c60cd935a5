import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parabolaHeight } from '#shared/compute/phreatic/base-parabola.ts';
import { guessPhreaticLine } from '#shared/compute/phreatic/first-guess.ts';
import { guessCurve } from '#shared/compute/phreatic/guess-curve.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { damDocument } from '#tests/support/exact-nets/dam-document.ts';

describe('the curve of the guess', () => {
  it('follows the parabola between its ends', () => {
    const curve = guessCurve({ edge: [40, 18], heel: [116, 0], exitAngleDeg: 180 })!;
    const inner = curve.places.filter(([x]) => x > 5 && x < 15);
    expect(inner.length).toBeGreaterThan(3);
    for (const [x, y] of inner) expect(y).toBeCloseTo(parabolaHeight(curve.S, x), 9);
    expect(curve.places[0]).toEqual([40, 18]);
    const [x, y] = curve.places[curve.places.length - 1]!;
    expect(x).toBeCloseTo(-curve.S / 2, 9);
    expect(y).toBeCloseTo(0, 9);
  });

  it('starts square to the face, or level where the face overhangs', () => {
    const sloping = guessCurve({ edge: [40, 18], heel: [94, 0], exitAngleDeg: 180 })!.places;
    const [dx, dy] = [sloping[1]![0] - sloping[0]![0], sloping[1]![1] - sloping[0]![1]];
    const square = (dx * -54 + dy * 18) / (Math.hypot(dx, dy) * Math.hypot(54, 18));
    expect(Math.abs(square)).toBeLessThan(0.35);
    const upright = guessCurve({ edge: [40, 18], heel: [40, 0], exitAngleDeg: 180 })!.places;
    expect(Math.abs((upright[1]![1] - upright[0]![1]) / (upright[1]![0] - upright[0]![0]))).toBeLessThan(0.2);
  });

  it('falls all along, whatever the dam', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 200, noNaN: true }),
        fc.double({ min: 1, max: 60, noNaN: true }),
        fc.double({ min: -20, max: 150, noNaN: true }),
        fc.double({ min: 1, max: 180, noNaN: true }),
        (edgeX, height, run, exitAngleDeg) => {
          const curve = guessCurve({ edge: [edgeX, height], heel: [edgeX + run, 0], exitAngleDeg });
          if (curve === null) return;
          const heights = curve.places.map((place) => place[1]);
          for (let i = 1; i < heights.length; i += 1)
            expect(heights[i]!).toBeLessThanOrEqual(heights[i - 1]!);
          expect(curve.places.flat().every(Number.isFinite)).toBe(true);
        },
      ),
    );
  });
});

describe('the guess of a document', () => {
  it.each([false, true])('lies between waterline and drain (mirrored: %s)', (mirrored) => {
    const document = damDocument({ outlet: 'drain', mirrored });
    const guess = guessPhreaticLine(document);
    expect(guess.ok).toBe(true);
    if (!guess.ok) return;
    const { map } = readSetOut(document);
    const places = guess.points.map((at) => map!.toSection(at));
    expect(places[0]![1]).toBeCloseTo(18, 6);
    expect(places[places.length - 1]![1]).toBeCloseTo(0, 6);
    expect(guess.basis).toContain('Kozeny');
  });

  it('breaks out on the face where there is no drain', () => {
    const document = damDocument({ outlet: 'face' });
    const guess = guessPhreaticLine(document);
    if (!guess.ok) throw new Error(guess.text);
    const { map } = readSetOut(document);
    const [x, z] = map!.toSection(guess.points[guess.points.length - 1]!);
    // The face of the fixture rises 1 in 2 from its toe at offset 146.
    expect((146 - x) / 2).toBeCloseTo(z, 6);
    expect(z).toBeGreaterThan(1);
    expect(guess.basis).toContain('Schaffernak');
  });

  it('says what is lacking', () => {
    const without = (document: ReturnType<typeof damDocument>, kind: string) => ({
      ...document,
      entities: Object.fromEntries(
        Object.entries(document.entities).filter(
          ([, { value }]) => !('line' in value && value.line === kind),
        ),
      ),
    });
    const document = damDocument({ outlet: 'drain' });
    expect(guessPhreaticLine(without(document, 'submergedFace'))).toMatchObject({ ok: false });
    expect(guessPhreaticLine(without(document, 'drain'))).toMatchObject({ ok: false });
    expect(guessPhreaticLine({ ...document, entities: {} })).toMatchObject({ ok: false });
  });
});
