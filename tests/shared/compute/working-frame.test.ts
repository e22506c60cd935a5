import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { greatestStretch } from '#shared/compute/linear-map.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { sectionMapOf, sectionMapOfFit } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { tracesInWorkingFrame, workingFrameOf } from '#shared/compute/working-frame.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const NATURAL = { kind: 'natural', ratio: 1, dipDeg: 0 } as const;
const layered = (ratio: number, dipDeg = 0) => ({ kind: 'transformed', ratio, dipDeg }) as const;

const turned = (deg: number, scale: number, mirrored: boolean) =>
  sectionMapOf({
    re: scale * Math.cos((deg * Math.PI) / 180),
    im: scale * Math.sin((deg * Math.PI) / 180),
    sheetOrigin: [2500, 1800],
    sectionOrigin: [212, 98],
    mirrored,
  });

const ratio = fc.double({ min: 1.2, max: 50, noNaN: true });
const dip = fc.double({ min: -60, max: 60, noNaN: true });
const placing = fc.tuple(fc.double({ min: -180, max: 180, noNaN: true }), fc.boolean());

describe('working pixels', () => {
  it('are the sheet’s own in an isotropic section at one scale, and its map the very same', () => {
    fc.assert(
      fc.property(placing, ([deg, mirrored]) => {
        const map = turned(deg, 0.02, mirrored);
        const frame = workingFrameOf(map, NATURAL);
        expect(frame.isSheet).toBe(true);
        expect(frame.map).toBe(map);
        const document = exactNetDocument(EXACT_NETS[0]!.net);
        expect(tracesInWorkingFrame(document, frame)).toBe(document);
      }),
    );
  });

  it('lead to the place in the section that the sheet leads to, and back', () => {
    fc.assert(
      fc.property(placing, ratio, dip, ([deg, mirrored], kRatio, dipDeg) => {
        const map = turned(deg, 0.02, mirrored);
        const frame = workingFrameOf(map, layered(kRatio, dipDeg));
        const place = sheetPx(3100, 700);
        const [offset, elevation] = map.toSection(place);
        const working = frame.toWorking(place);
        expect(frame.map.toSection(working)[0]).toBeCloseTo(offset, 8);
        expect(frame.map.toSection(working)[1]).toBeCloseTo(elevation, 8);
        expect(frame.toSheet(working)[0]).toBeCloseTo(3100, 7);
        expect(frame.map.toSheet(sectionPt(offset, elevation))[1]).toBeCloseTo(working[1], 6);
      }),
    );
  });

  it('shorten lengths along the bedding by √(kv/kh) and keep those across it', () => {
    fc.assert(
      fc.property(placing, ratio, dip, ([deg, mirrored], kRatio, dipDeg) => {
        const map = turned(deg, 0.02, mirrored);
        const frame = workingFrameOf(map, layered(kRatio, dipDeg));
        const angle = (dipDeg * Math.PI) / 180;
        const lengthOf = (offset: number, elevation: number) => {
          const from = frame.map.toSheet(sectionPt(212, 98));
          const to = frame.map.toSheet(sectionPt(212 + offset, 98 + elevation));
          return Math.hypot(to[0] - from[0], to[1] - from[1]) * 0.02;
        };
        expect(lengthOf(10 * Math.cos(angle), -10 * Math.sin(angle))).toBeCloseTo(10 / Math.sqrt(kRatio), 8);
        expect(lengthOf(10 * Math.sin(angle), 10 * Math.cos(angle))).toBeCloseTo(10, 8);
        expect(greatestStretch(frame.matrix)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('undo a plotting exaggeration', () => {
    const map = sectionMapOfFit({
      linear: [0.1, 0, 0, -0.02],
      sheetOrigin: [0, 0],
      sectionOrigin: [0, 100],
    });
    const frame = workingFrameOf(map, NATURAL);
    expect(frame.isSheet).toBe(false);
    const [x, y] = frame.toWorking([500, 500]);
    // 50 m along and 10 m down, in working pixels of 0.1 m.
    expect([x, y]).toEqual([500, 100]);
    expect(frame.map.lengthPerPxAlong(0.3, 0.4)).toBeCloseTo(0.1, 12);
  });

  it('are the drawing itself where the section is drawn transformed', () => {
    const map = sectionMapOfFit({
      linear: [0.06, 0.001, 0.001 / 3, -0.02],
      sheetOrigin: [900, 900],
      sectionOrigin: [0, 100],
    });
    // Offsets three times as long to the pixel as elevations: kh/kv = 9. The sheet is turned by about a degree.
    expect(workingFrameOf(map, layered(9)).isSheet).toBe(true);
    expect(workingFrameOf(map, layered(8)).isSheet).toBe(false);
  });
});

/** In drops: the mesh between the lines depends on where the pixels fall; up to 0.0035 was seen. */
const SAME_FIELD = 0.01;

function figuresOf(reading: NetReading) {
  expect(reading.state, reading.findings.map((found) => found.text).join(' ')).toBe('read');
  return reading.points.map(({ byHand, byField }) => ({
    byHand: byHand?.totalHead ?? Number.NaN,
    byField: byField?.totalHead ?? Number.NaN,
  }));
}

describe.each(EXACT_NETS)('an anisotropic section: $name', ({ net, pxPerUnit }) => {
  const readings = randomReadings(net, 10, 8, 0.1);

  it('drawn to natural scale reads as its transformed section does', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1.5, max: 16, noNaN: true }),
        fc.boolean(),
        fc.double({ min: -20, max: 20, noNaN: true }),
        (kRatio, mirrored, turnDeg) => {
          const tracing: Tracing = { pxPerUnit, readings, mirrored, turnDeg };
          const isotropic = exactNetDocument(net, tracing);
          const stretch = Math.sqrt(kRatio);
          // The natural section of the same net: everything moved apart along the level.
          const { map } = readSetOut(isotropic);
          const wide = (at: readonly [number, number]): [number, number] => {
            const [offset, elevation] = map!.toSection(sheetPx(...at));
            const [x, y] = map!.toSheet(sectionPt(offset * stretch, elevation));
            return [x, y];
          };
          const lines = changed(isotropic, 'line', (value) => ({ ...value, points: value.points.map(wide) }));
          const points = changed(lines, 'readingPoint', ({ place, ...value }) => ({
            ...value,
            place:
              place.on === 'sheet'
                ? { on: 'sheet', at: wide(place.at) }
                : { ...place, offset: place.offset * stretch },
          }));
          const natural = changed(points, 'permeability', (value) => ({
            ...value,
            k: 9e-6,
            kv: 9e-6 / kRatio,
          }));
          const expected = readNet(isotropic);
          const read = readNet(natural);
          const heads = figuresOf(expected);
          const drop = expected.quantities.headPerDrop ?? 1;
          figuresOf(read).forEach(({ byHand, byField }, i) => {
            expect(Math.abs(byHand - heads[i]!.byHand) / drop).toBeLessThan(1e-6);
            expect(Math.abs(byField - heads[i]!.byField) / drop).toBeLessThan(SAME_FIELD);
          });
          read.points.forEach(({ sheetAt, offset }, i) => {
            const other = expected.points[i]!;
            const [x, y] = wide(other.sheetAt!);
            expect(Math.hypot(sheetAt![0] - x, sheetAt![1] - y)).toBeLessThan(1e-6);
            expect(Math.abs(offset! - other.offset! * stretch)).toBeLessThan(1e-8);
          });
        },
      ),
      { numRuns: 4 },
    );
  });
});

describe('a drawing that is stretched upwards', () => {
  const { net, pxPerUnit } = EXACT_NETS[1]!;
  const readings = randomReadings(net, 8, 3, 0.1);

  it('reads as the same drawing unstretched', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.4, max: 6, noNaN: true }), fc.boolean(), (times, mirrored) => {
        const plain = exactNetDocument(net, { pxPerUnit, readings, mirrored, turnDeg: 0 });
        const up = ([x, y]: readonly [number, number]): [number, number] => [x, y * times];
        const lines = changed(plain, 'line', (value) => ({ ...value, points: value.points.map(up) }));
        const known = changed(lines, 'knownPoint', (value) => ({ ...value, at: up(value.at) }));
        const points = changed(known, 'readingPoint', (value) => ({
          ...value,
          place: value.place.on === 'sheet' ? { on: 'sheet', at: up(value.place.at) } : value.place,
        }));
        const stretched = changed(points, 'setOut', (value) => ({
          ...value,
          scales: 'plottingExaggeration' as const,
        }));
        const [expected, read] = [readNet(plain), readNet(stretched)];
        expect(read.setOut.exaggeration).toBeCloseTo(times, 9);
        const drop = expected.quantities.headPerDrop ?? 1;
        const heads = figuresOf(expected);
        figuresOf(read).forEach(({ byHand, byField }, i) => {
          expect(Math.abs(byHand - heads[i]!.byHand) / drop).toBeLessThan(2e-3);
          expect(Math.abs(byField - heads[i]!.byField) / drop).toBeLessThan(5e-3);
        });
      }),
      { numRuns: 6 },
    );
  });
});
