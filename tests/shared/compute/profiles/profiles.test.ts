import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import { MOST_PLACES, placesOf } from '#shared/compute/profiles/profile-places.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { sectionMapOf } from '#shared/compute/section-map.ts';
import type { EntityOf, FlowNetDocument } from '#shared/contract/document.ts';
import { netReading } from '#shared/contract/reading.ts';
import { profileCsv } from '#shared/text/profile-csv.ts';
import { changed, withAdded, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';

const apron = flatApronNet({
  width: 20,
  headwater: 106,
  tailwater: 100,
  drops: 12,
  channels: 7,
  middle: [0, 98],
});
const parabola = basicParabolaNet({ head: 20, drops: 10, channels: 3, focus: [14, 98] });

function profileOf(change: Partial<EntityOf<'profile'>>): EntityOf<'profile'> {
  return {
    kind: 'profile',
    name: 'Base',
    use: 'base',
    place: {
      on: 'section',
      points: [
        [-10, 98],
        [10, 98],
      ],
    },
    spacing: 0.25,
    finished: true,
    order: 1,
    ...change,
  };
}

function readProfile(document: FlowNetDocument, profile: EntityOf<'profile'>) {
  const reading = readNet(withAdded(document, profile));
  expect(netReading.safeParse(reading).success).toBe(true);
  return reading.profiles[0]!;
}

describe('a base', () => {
  it('has the resultant of the closed form with its line of action (published case 1A-13)', () => {
    const { samples, uplift } = readProfile(exactNetDocument(apron, { pxPerUnit: 55 }), profileOf({}));
    expect(samples).toHaveLength(81);
    // Excess: γw·H·b/2 at 3/8 of the base from its upstream edge.
    expect(uplift!.excess!.vertical / 588.6).toBeCloseTo(1, 2);
    expect(uplift!.excess!.arm! / 20).toBeCloseTo(0.375, 2);
    // Tailwater 2 m above the base besides: γw·2·20 at its middle.
    const still = 9.81 * 2 * 20;
    expect(uplift!.total!.vertical / (588.6 + still)).toBeCloseTo(1, 2);
    expect(uplift!.total!.arm!).toBeCloseTo((588.6 * 7.5 + still * 10) / (588.6 + still), 1);
    expect(uplift!.total!.horizontal).toBeCloseTo(0, 6);
    for (const { offset, totalHead } of samples.slice(1, -1))
      expect(Math.abs(totalHead! - apron.headAt(offset, 98))).toBeLessThan(0.03 * 0.5);
  });

  it('is the same traced the other way round, measured from its other end', () => {
    const document = exactNetDocument(apron, { pxPerUnit: 55 });
    const there = readProfile(document, profileOf({})).uplift!.total!;
    const points = profileOf({}).place;
    const back = readProfile(
      document,
      profileOf({
        place: { on: 'section', points: points.on === 'section' ? points.points.toReversed() : [] },
      }),
    ).uplift!.total!;
    expect(back.vertical).toBeCloseTo(there.vertical, 6);
    expect(back.arm!).toBeCloseTo(20 - there.arm!, 6);
  });

  it('has no resultant when a part of it lies outside the net', () => {
    const place = {
      on: 'section' as const,
      points: [
        [-10, 98],
        [60, 98],
      ] as [number, number][],
    };
    const { uplift, samples } = readProfile(exactNetDocument(apron), profileOf({ place, spacing: 5 }));
    expect(samples.at(-1)!.status).toBe('withheld');
    expect(uplift).toMatchObject({ total: null, excess: null });
    expect(uplift!.note).toContain('nothing could be read');
  });

  it('says at every place that a line seems to be missing from the net', () => {
    const whole = exactNetDocument(apron, { pxPerUnit: 55 });
    expect(readProfile(whole, profileOf({})).samples.some(({ doubtful }) => doubtful !== null)).toBe(false);
    const without = changed(
      withLines(whole, 'equipotential', (line, i) => (i === 3 ? null : line)),
      'netCount',
      (value) => ({ ...value, drops: apron.drops - 1 }),
    );
    const { samples } = readProfile(without, profileOf({}));
    const read = samples.filter(({ status }) => status === 'read');
    expect(read.length).toBeGreaterThan(10);
    expect(read.every(({ doubtful }) => doubtful?.code === 'lineMissing')).toBe(true);
  });

  it('is not read while the net is unfinished', () => {
    const document = changed(exactNetDocument(apron), 'waterLevels', (value) => ({
      ...value,
      headwater: null,
    }));
    expect(readProfile(document, profileOf({}))).toMatchObject({
      samples: [],
      uplift: null,
      remark: { code: 'netUnfinished' },
    });
  });
});

describe('a slip surface', () => {
  const document = exactNetDocument(parabola, { pxPerUnit: 110 });
  const slip = profileOf({
    name: '=slip',
    use: 'slipSurface',
    spacing: null,
    place: { on: 'section', points: [-6, -3, 0, 2].map((dx) => [14 + dx - 2, 100]) },
  });

  it('has u = γw(h − z) at every place that is read, and 0 with the flag above the phreatic line', () => {
    const high = profileOf({
      ...slip,
      place: {
        on: 'section',
        points: [
          [0, 117],
          [4, 118],
          [0, 99],
        ],
      },
    });
    const { samples, uplift } = readProfile(document, high);
    expect(uplift).toBeNull();
    const air = samples.filter(({ status }) => status === 'abovePhreatic');
    expect(air.length).toBeGreaterThan(0);
    for (const sample of air) expect(sample).toMatchObject({ porePressure: 0, totalHead: null });
    for (const { status, totalHead, elevation, pressureHead, porePressure } of samples) {
      if (status !== 'read') continue;
      expect(pressureHead).toBeCloseTo(totalHead! - elevation, 12);
      expect(porePressure).toBeCloseTo(9.81 * (totalHead! - elevation), 10);
    }
  });

  it('has r_u only under a ground line, of the weights above and below the phreatic line', () => {
    const weighed = changed(document, 'permeability', (value) => ({
      ...value,
      saturatedUnitWeight: 20,
      moistUnitWeight: 18,
    }));
    const bare = readProfile(weighed, slip).samples;
    expect(bare.some(({ status }) => status === 'read')).toBe(true);
    expect(bare.every(({ ru }) => ru === null)).toBe(true);
    const ground: EntityOf<'line'> = {
      kind: 'line',
      line: 'ground',
      name: '',
      points: sheetPointsOf(weighed, [
        [-30, 122],
        [30, 122],
      ]),
      finished: true,
      water: null,
      head: null,
      drops: null,
      origin: 'traced',
    };
    const at = profileOf({ ...slip, place: { on: 'section', points: [[4, 99]] } });
    const [sample] = readProfile(withAdded(weighed, ground), at).samples;
    const wet = phreaticAt(4);
    const overburden = 18 * (122 - wet) + 20 * (wet - 99);
    expect(sample!.ru! / (sample!.porePressure! / overburden)).toBeCloseTo(1, 2);
  });

  it('is a CSV with units and decimal points that no spreadsheet runs as a formula', () => {
    const profile = readProfile(document, slip);
    const [head, first] = profileCsv(document, profile).split('\r\n');
    expect(head).toBe(
      'Profile,"Distance, m","Offset, m","Elevation, m LD","Total head, m LD","Pressure head, m","Pore pressure, kPa",r_u,Remark',
    );
    expect(first!.startsWith("'=slip,0,6,100,")).toBe(true);
  });
});

/** Places of the section on the sheet, by the map of the document's known points. */
function sheetPointsOf(
  document: FlowNetDocument,
  places: ReadonlyArray<[number, number]>,
): [number, number][] {
  const points = places.map(
    ([offset, elevation], i): EntityOf<'readingPoint'> => ({
      kind: 'readingPoint',
      name: '',
      order: i,
      elevationPlusMinus: null,
      measured: null,
      place: { on: 'section', offset, elevation },
    }),
  );
  return readNet(withAdded(document, ...points)).points.map(({ sheetAt }) => sheetAt!);
}

/** Elevation of the basic parabola, where its head equals the elevation: found by halving below 40 m of height. */
function phreaticAt(offset: number): number {
  let [low, high] = [98.001, 138];
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (Number.isNaN(parabola.headAt(offset, middle))) high = middle;
    else low = middle;
  }
  return low;
}

describe('the places of a profile', () => {
  const map = sectionMapOf({
    re: 0.1,
    im: 0,
    sheetOrigin: [0, 0],
    sectionOrigin: [0, 100],
    mirrored: false,
  });

  it('hold every vertex, and no two lie farther apart than the spacing', () => {
    const figure = fc.integer({ min: -100, max: 100 });
    fc.assert(
      fc.property(
        fc.array(fc.tuple(figure, figure), { minLength: 2, maxLength: 8 }),
        // Seven lengths of at most 283 are no more places than can be read.
        fc.double({ min: 1, max: 30, noNaN: true }),
        (points, spacing) => {
          const { places, coarser } = placesOf(profileOf({ place: { on: 'section', points }, spacing }), map);
          expect(coarser).toBe(false);
          for (const point of points) expect(places.map(({ at }) => at)).toContainEqual(sectionPt(...point));
          for (const [i, { at }] of places.entries()) {
            if (i === 0) continue;
            const [x, z] = places[i - 1]!.at;
            expect(Math.hypot(at[0] - x, at[1] - z)).toBeLessThanOrEqual(spacing * (1 + 1e-6));
          }
        },
      ),
    );
  });

  it('are no more than can be read, and say when the spacing is wider than asked for', () => {
    const line = placesOf(profileOf({ spacing: 1e-9 }), map);
    expect(line.places.length).toBeLessThanOrEqual(MOST_PLACES);
    expect(line.coarser).toBe(true);
    const corners: [[number, number], [number, number]] = [
      [0, 0],
      [1000, 0.001],
    ];
    const grid = placesOf(profileOf({ place: { on: 'grid', corners }, spacing: 1e-6 }), map);
    expect(grid.places.length).toBeLessThanOrEqual(MOST_PLACES);
    expect(grid.coarser).toBe(true);
  });

  it('of a grid go row by row, both corners held', () => {
    const corners: [[number, number], [number, number]] = [
      [2, 1],
      [0, 0],
    ];
    const { places } = placesOf(profileOf({ place: { on: 'grid', corners }, spacing: 0.5 }), map);
    expect(places).toHaveLength(15);
    expect(places[0]!.at).toEqual([0, 0]);
    expect(places[14]!.at).toEqual([2, 1]);
  });
});

describe('profiles of any sort on any net', () => {
  const far = fc.oneof(
    fc.double({ min: -1e9, max: 1e9, noNaN: true }),
    fc.double({ min: -30, max: 130, noNaN: true }),
  );
  const place = fc.tuple(far, far);
  const document = exactNetDocument(apron, { pxPerUnit: 55 });

  it('are read without an exception, and the reading keeps to its schema', () => {
    fc.assert(
      fc.property(
        fc.array(place, { maxLength: 4 }),
        fc.tuple(place, place),
        fc.option(fc.double({ min: 1e-9, max: 1e6, noNaN: true })),
        fc.constantFrom('section', 'sheet', 'grid'),
        fc.constantFrom('base', 'slipSurface', 'borehole'),
        (points, corners, spacing, on, use) => {
          const at: EntityOf<'profile'>['place'] = on === 'grid' ? { on, corners } : { on, points };
          const few = {
            ...profileOf({ place: at, use }),
            spacing: spacing === null ? null : Math.max(spacing, 1),
          };
          const reading = readNet(withAdded(document, few));
          expect(netReading.safeParse(reading).error).toBeUndefined();
          expect(reading.profiles).toHaveLength(1);
          expect(reading.profiles[0]!.samples.length).toBeLessThanOrEqual(MOST_PLACES);
        },
      ),
      { numRuns: 12 },
    );
  });
});
