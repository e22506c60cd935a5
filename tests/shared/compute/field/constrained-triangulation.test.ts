import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nextOf, type Triangulation, triangulate } from '#shared/compute/field/constrained-triangulation.ts';
import { nodeEdges } from '#shared/compute/field/node-edges.ts';
import { orientation } from '#shared/compute/geometry/predicates.ts';

function edgesOf({ triangles }: Triangulation): Set<string> {
  return new Set(Array.from(triangles, (v, e) => [v, triangles[nextOf(e)]!].sort((a, b) => a - b).join()));
}

/** Sum of the triangles' areas; every one of them turned the same way. */
function areaOf({ xy, triangles }: Triangulation): number {
  let area = 0;
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!];
    const twice =
      (xy[2 * b]! - xy[2 * a]!) * (xy[2 * c + 1]! - xy[2 * a + 1]!) -
      (xy[2 * b + 1]! - xy[2 * a + 1]!) * (xy[2 * c]! - xy[2 * a]!);
    area += twice / 2;
  }
  return area;
}

const coordinate = fc.integer({ min: 0, max: 40 });
const chain = fc.array(fc.tuple(coordinate, coordinate), { minLength: 2, maxLength: 7 });
const kinds = ['before', 'after', 'closed', 'open'] as const;

describe('noding and triangulating', () => {
  it('refuses too few points and edges that cross', () => {
    expect(triangulate(Float64Array.from([0, 0, 1, 1]), [])).toBeNull();
    const square = Float64Array.from([0, 0, 10, 0, 10, 10, 0, 10]);
    expect(
      triangulate(square, [
        [0, 2],
        [1, 3],
      ]),
    ).toBeNull();
  });

  it('splits two edges where they cross, and one where an end touches it', () => {
    const cross = nodeEdges(
      [
        {
          points: [
            [0, 0],
            [10, 10],
          ],
          kind: 'before',
        },
        {
          points: [
            [0, 10],
            [10, 0],
          ],
          kind: 'after',
        },
      ],
      0.05,
    )!;
    expect(cross.edges).toHaveLength(4);
    expect([...cross.xy.slice(8)]).toEqual([5, 5]);
    const touching = nodeEdges(
      [
        {
          points: [
            [0, 0],
            [10, 0],
          ],
          kind: 'before',
        },
        {
          points: [
            [4, 0.001],
            [4, 7],
          ],
          kind: 'closed',
        },
      ],
      0.05,
    )!;
    expect(touching.edges).toHaveLength(3);
  });

  it('lets a held line hold where a wall is traced over it', () => {
    const points: Array<[number, number]> = [
      [0, 0],
      [10, 0],
    ];
    const noded = nodeEdges(
      [
        { points, kind: 'closed' },
        { points, kind: 'after' },
      ],
      0.05,
    )!;
    expect(noded.edges.map((edge) => edge.kind)).toEqual(['after']);
  });

  it('keeps every edge of any tangle, covers its hull and turns no triangle over', () => {
    fc.assert(
      fc.property(fc.array(chain, { minLength: 1, maxLength: 5 }), (chains) => {
        const noded = nodeEdges(
          chains.map((points, i) => ({ points, kind: kinds[i % kinds.length]! })),
          0.05,
        );
        if (noded === null || noded.xy.length < 6) return;
        const frame = [-9, -9, 59, -8, 60, 57, -7, 61];
        const n = noded.xy.length / 2;
        const mesh = triangulate(
          Float64Array.from([...noded.xy, ...frame]),
          noded.edges.map(({ from, to }) => [from, to] as const),
        )!;
        expect(mesh).not.toBeNull();
        const edges = edgesOf(mesh);
        for (const { from, to } of noded.edges)
          expect(edges).toContain([from, to].sort((a, b) => a - b).join());
        // Shoelace of the frame (−9,−9) (59,−8) (60,57) (−7,61), worked by hand: 603 + 3843 + 4059 + 612 = 9117.
        expect(Math.abs(areaOf(mesh))).toBeCloseTo(4558.5, 6);
        const { xy, triangles } = mesh;
        const turns = new Set<number>();
        for (let t = 0; t < triangles.length; t += 3) {
          const at = (k: number) => [xy[2 * triangles[t + k]!]!, xy[2 * triangles[t + k]! + 1]!] as const;
          turns.add(orientation(...at(0), ...at(1), ...at(2)));
        }
        expect(turns.size).toBe(1);
        expect(n).toBeGreaterThan(0);
      }),
      { numRuns: 300 },
    );
  });
});
