import { describe, expect, it } from 'vitest';
import { adoptableLines } from '#shared/compute/beside/adopted-lines.ts';
import type { PlacedNet } from '#shared/compute/beside/placed-net.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import { type SheetPoint, tracedLine } from '#shared/contract/document.ts';

/** A contour as the mesh gives it: a vertex every few pixels along a parabola. */
const contour = Array.from({ length: 200 }, (_, i): SheetPoint => [3 * i, 0.002 * (3 * i - 300) ** 2]);
const net: PlacedNet = {
  drops: 10,
  dropHead: 2,
  channels: 3.4,
  equipotentials: [
    { value: 118, lines: [contour] },
    {
      value: 116,
      lines: [
        contour.slice(0, 90),
        contour.slice(100),
        [
          [5, 5],
          [6, 5],
        ],
      ],
    },
  ],
  flowLines: [],
  surface: [],
};

describe('lines of a computed net that may be adopted', () => {
  it('have few vertices, within half a pixel of the contour, its ends kept', () => {
    const [line] = adoptableLines(net);
    const points = line!.pieces[0]!.points;
    expect(points.length).toBeLessThan(40);
    expect(points[0]).toEqual(contour[0]);
    expect(points.at(-1)).toEqual(contour.at(-1));
    for (const place of contour) {
      const off = points.slice(1).map((end, i) => distanceToSegment(place, points[i]!, end));
      expect(Math.min(...off)).toBeLessThan(0.31);
    }
  });

  it('are a line for each piece of a contour but for specks, finished, marked, their heads left to the count', () => {
    const lines = adoptableLines(net);
    expect(lines.map(({ kind, value, pieces }) => [kind, value, pieces.length])).toEqual([
      ['equipotential', 118, 1],
      ['equipotential', 116, 2],
    ]);
    for (const piece of lines.flatMap(({ pieces }) => pieces)) {
      expect(tracedLine.parse(piece)).toEqual(piece);
      expect(piece).toMatchObject({ origin: 'adopted', finished: true, head: null, drops: null });
    }
  });

  it('hold the free surface where one was found', () => {
    const kinds = adoptableLines({ ...net, surface: [contour] }).map(({ kind }) => kind);
    expect(kinds).toEqual(['equipotential', 'equipotential', 'phreaticLine']);
  });
});
