import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { BOX_VERTICES, constrainedDelaunay } from '#shared/compute/mesh/constrained-delaunay.ts';
import { type LabelledChain, nodeSegments } from '#shared/compute/mesh/node-segments.ts';
import { refine } from '#shared/compute/mesh/refine.ts';
import { FREE, nextOf, type TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

const chain = (points: readonly Pair[], label = 0): LabelledChain => ({
  points,
  label,
  bounds: true,
  parts: false,
});

/** A mesh of the lines with everything that the box does not reach marked as region 1. */
function meshOf(chains: readonly LabelledChain[], merge: number): TriangleMesh {
  const noded = nodeSegments(chains, merge)!;
  const mesh = constrainedDelaunay(noded)!;
  expect(mesh).not.toBeNull();
  for (const { from, to, label } of noded.segments) {
    const e = mesh.find(from + BOX_VERTICES, to + BOX_VERTICES);
    expect(e).toBeGreaterThanOrEqual(0);
    expect(mesh.label[e]).toBe(label);
  }
  mesh.region.fill(1);
  const open = mesh.around(0).map((e) => Math.floor(e / 3));
  for (let t = open.pop(); t !== undefined; t = open.pop()) {
    mesh.region[t] = 0;
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      const next = Math.floor(mesh.twin[e]! / 3);
      if (next >= 0 && mesh.label[e] === FREE && mesh.region[next] === 1) open.push(next);
    }
  }
  return mesh;
}

function anglesAndArea(mesh: TriangleMesh): { smallest: number; area: number; count: number } {
  let [smallest, area, count] = [180, 0, 0];
  for (let t = 0; t < mesh.triangleCount; t += 1) {
    if (mesh.region[t] === 0) continue;
    count += 1;
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      const [a, b, c] = [e, nextOf(e), nextOf(nextOf(e))].map((each) => mesh.corner[each]!);
      const [ux, uy] = [mesh.x[b!]! - mesh.x[a!]!, mesh.y[b!]! - mesh.y[a!]!];
      const [wx, wy] = [mesh.x[c!]! - mesh.x[a!]!, mesh.y[c!]! - mesh.y[a!]!];
      const cross = ux * wy - uy * wx;
      expect(cross).toBeGreaterThan(0);
      smallest = Math.min(smallest, (Math.atan2(cross, ux * wx + uy * wy) * 180) / Math.PI);
      area += cross / 6;
    }
  }
  return { smallest, area, count };
}

function expectTwins(mesh: TriangleMesh): void {
  mesh.twin.forEach((f, e) => {
    if (f < 0) return;
    expect(mesh.twin[f]).toBe(e);
    expect(mesh.corner[f]).toBe(mesh.corner[nextOf(e)]);
    expect(mesh.label[f]).toBe(mesh.label[e]);
  });
}

const square: Pair[] = [
  [0, 0],
  [10, 0],
  [10, 10],
  [0, 10],
  [0, 0],
];
const wanted = (region: number) => region === 1;

describe('refinement', () => {
  it('keeps the area, the outline and the angles (20.7° by Ruppert 1995)', () => {
    const wall = chain(
      [
        [5, 10],
        [5, 4],
      ],
      1,
    );
    const mesh = meshOf([chain(square), wall], 1e-6);
    const sizeAt = (x: number, y: number) => Math.min(1, 0.001 + 0.35 * Math.hypot(x - 5, y - 4));
    expect(refine(mesh, { sizeAt, wanted, mostVertices: 20_000 })).toBe(true);
    const { smallest, area, count } = anglesAndArea(mesh);
    expect(area).toBeCloseTo(100, 9);
    expect(smallest).toBeGreaterThan(20.6);
    expect(count).toBeGreaterThan(400);
    expect(count).toBeLessThan(4000);
    expectTwins(mesh);
    const ofWall = mesh.label.flatMap((label, e) => (label === 1 ? [e] : []));
    const length = ofWall.reduce((sum, e) => {
      const [a, b] = [mesh.corner[e]!, mesh.corner[nextOf(e)]!];
      return sum + Math.hypot(mesh.x[b]! - mesh.x[a]!, mesh.y[b]! - mesh.y[a]!);
    }, 0);
    expect(length / 2).toBeCloseTo(6, 9);
  });

  it('parts triangles that are marked', () => {
    const mesh = meshOf([chain(square)], 1e-6);
    const options = { sizeAt: () => 2, wanted, mostVertices: 20_000 };
    refine(mesh, options);
    const before = anglesAndArea(mesh).count;
    refine(mesh, options);
    expect(anglesAndArea(mesh).count).toBe(before);
    refine(mesh, { ...options, marked: mesh.region.flatMap((region, t) => (region === 1 ? [t] : [])) });
    expect(anglesAndArea(mesh).count).toBeGreaterThan(1.5 * before);
  });

  it('says when the vertices run out', () => {
    const mesh = meshOf([chain(square)], 1e-6);
    expect(refine(mesh, { sizeAt: () => 0.05, wanted, mostVertices: 500 })).toBe(false);
    expect(mesh.x.length).toBeLessThan(510);
  });

  it.each([
    {
      name: 'a sharp corner of 1°',
      line: [
        [0, 0],
        [10, 0.17],
        [10, 5],
        [0, 0],
      ] as Pair[],
      area: 24.15,
    },
    {
      name: 'a sliver',
      line: [
        [0, 0],
        [10, 0],
        [10, 1e-4],
        [0, 1e-4],
        [0, 0],
      ] as Pair[],
      area: 1e-3,
    },
    {
      name: 'points that nearly coincide',
      line: [
        [0, 0],
        [5, 0],
        [5 + 3e-5, 2e-5],
        [10, 0],
        [10, 10],
        [0, 10],
        [0, 0],
      ] as Pair[],
      area: 100,
    },
    {
      name: 'a crack in the outline',
      line: [
        [0, 0],
        [4.9999, 0],
        [5, 5],
        [5.0001, 0],
        [10, 0],
        [10, 10],
        [0, 10],
        [0, 0],
      ] as Pair[],
      area: 100,
    },
  ])('comes to an end at $name', ({ line, area }) => {
    const mesh = meshOf([chain(line)], 1e-6);
    expect(refine(mesh, { sizeAt: () => 0.7, wanted, mostVertices: 50_000 })).toBe(true);
    const found = anglesAndArea(mesh);
    expect(found.area).toBeCloseTo(area, 2);
    expect(found.count).toBeLessThan(8000);
    expectTwins(mesh);
  });

  it('meshes any tangle of lines without an overlap', () => {
    const place = fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 40 }));
    fc.assert(
      fc.property(
        fc.array(fc.array(place, { minLength: 2, maxLength: 6 }), { minLength: 1, maxLength: 8 }),
        (lines) => {
          const box: Pair[] = [
            [-1, -1],
            [41, -1],
            [41, 41],
            [-1, 41],
            [-1, -1],
          ];
          const mesh = meshOf([chain(box), ...lines.map((points) => chain(points, 1))], 1e-4);
          mesh.region.forEach((_, t) => {
            const [x, y] = [0, 1, 2].reduce(
              ([sx, sy], k) => [
                sx! + mesh.x[mesh.corner[3 * t + k]!]! / 3,
                sy! + mesh.y[mesh.corner[3 * t + k]!]! / 3,
              ],
              [0, 0],
            );
            mesh.region[t] = Math.min(x! + 1, 41 - x!, y! + 1, 41 - y!) > 0 ? 1 : 0;
          });
          expect(refine(mesh, { sizeAt: () => 6, wanted, mostVertices: 100_000 })).toBe(true);
          expect(anglesAndArea(mesh).area).toBeCloseTo(42 * 42, 6);
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe('noding', () => {
  it('splits crossings, touches and overlaps and counts what runs along a piece', () => {
    const noded = nodeSegments(
      [
        chain([
          [0, 0],
          [10, 0],
        ]),
        {
          points: [
            [2, 0],
            [6, 0],
          ],
          label: 1,
          bounds: false,
          parts: true,
        },
        chain([
          [4, -3],
          [4, 3],
        ]),
      ],
      1e-6,
    )!;
    const along = noded.segments.filter(({ parts }) => parts === 1);
    expect(along).toHaveLength(2);
    expect(along.every(({ label, outlines }) => label === 0 && outlines === 1)).toBe(true);
    expect(noded.segments).toHaveLength(6);
  });
});
