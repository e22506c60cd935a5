import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { netCheckGuides } from '#client/features/desk/model/check-guides.ts';
import { poorPlacesOf } from '#shared/compute/net-check/poor-places.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { NetCheckReading } from '#shared/contract/reading-net-check.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { checkOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

/** What a fault stands for, in the list that its index is of. */
const placesOf = (check: NetCheckReading) =>
  check.faults.map(({ of, index, ...told }) => ({ ...told, of, place: check[of][index] }));

/** Marks without their ids, which name the index. */
const shown = (check: NetCheckReading) => {
  const { areas, marks } = netCheckGuides(check, null);
  return { areas: areas.map(({ outlines }) => outlines), marks: marks.map(({ at, text }) => ({ at, text })) };
};

describe.each(EXACT_NETS)('poor places of $name', ({ net, pxPerUnit }) => {
  const document = exactNetDocument(net, { pxPerUnit, jitterPx: 1.5 });

  it('shows what the whole check shows, wherever lines have been moved', () => {
    let faults = 0;
    const move = fc.tuple(fc.nat(), fc.constantFrom(-70, -35, 35, 70));
    fc.assert(
      fc.property(fc.array(move, { minLength: 1, maxLength: 3 }), (moves) => {
        const moved = withLines(document, 'equipotential', (line, number) => {
          const by = moves.find(([which]) => which % (net.drops - 1) === number)?.[1] ?? 0;
          return { ...line, points: line.points.map(([x, y]): [number, number] => [x + by, y]) };
        });
        const { netCheck: whole } = readNet(moved);
        if (whole === null) return;
        const poor = poorPlacesOf(whole);
        faults += poor.faults.length;
        expect(placesOf(poor)).toEqual(placesOf(whole));
        expect(shown(poor)).toEqual(shown(whole));
        const others = { cells: [], meetings: [], faults: [] };
        expect({ ...poor, ...others }).toEqual({ ...whole, ...others });
      }),
      { numRuns: 20 },
    );
    expect(faults).toBeGreaterThan(0);
  });

  it('is empty for a net that is drawn well', () => {
    const whole = checkOfDocument(document);
    expect(whole.cells.length).toBeGreaterThan(20);
    expect(poorPlacesOf(whole)).toMatchObject({ cells: [], meetings: [], faults: [] });
  });
});
