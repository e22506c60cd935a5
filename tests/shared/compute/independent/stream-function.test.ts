import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { computedNet } from '#shared/compute/independent/computed-net.ts';
import type { SectionChain, SectionProblem } from '#shared/compute/independent/section-problem.ts';
import { inflowOf, solved, UNIT_SOIL } from './weir-section.ts';

function ring(x: number, z: number, radius: number, count: number): Pair[] {
  return Array.from({ length: count + 1 }, (_, i): Pair => {
    const turn = (2 * Math.PI * (i % count)) / count;
    return [x + radius * Math.cos(turn), z + radius * Math.sin(turn)];
  });
}

const held = (id: string, head: number, points: readonly Pair[]): SectionChain => ({
  points,
  condition: { kind: 'head', id, head },
});
const closed = (points: readonly Pair[]): SectionChain => ({
  points,
  condition: { kind: 'closed', id: 'closed' },
});

function section(boundary: readonly SectionChain[], inner: readonly SectionChain[] = []): SectionProblem {
  return { boundary, inner, soilBoundaries: [], soils: [UNIT_SOIL], unconfined: false };
}

/** Water on level ground over a layer of 10 on an impervious base. */
const ground = [
  held('ground', 5, [
    [-60, 0],
    [60, 0],
  ]),
  closed([
    [60, 0],
    [60, -10],
    [-60, -10],
    [-60, 0],
  ]),
];

/**
 * The gap between the two solutions is the square of an error (Prager and Synge 1947): it is small only where ψ is the
 * stream function of the head, with the right values on every piece of the edge.
 */
describe('the stream function', () => {
  it('of radial flow to a drain: q = 2πk·H/ln(R/r) (Thiem 1906), the mesh cut once', () => {
    const solution = solved(
      section([held('far', 3, ring(0, 0, 10, 240)), held('drain', 1, ring(0, 0, 1, 120))]),
    );
    expect(Math.abs(inflowOf(solution, 'far') / ((2 * Math.PI * 2) / Math.log(10)) - 1)).toBeLessThan(2e-3);
    expect(solution.stream!.mesh.x.length).toBeGreaterThan(solution.mesh.x.length);
    expect(solution.gap!).toBeLessThan(1e-3);
    expect(computedNet(solution, 10).channels).toBeCloseTo((10 * 2 * Math.PI) / Math.log(10), 1);
  });

  it('of a pipe drain under a level layer: q by images between ground and base (Kirkham 1949, formula from memory)', () => {
    // Drain of radius r at depth d over a base at depth D, period far: q = 2πkH / ln(tan(π(2d − r)/4D)·cot(πr/4D)).
    const [depth, radius, layer] = [5, 0.1, 10];
    const solution = solved(section([...ground, held('drain', 0, ring(0, -depth, radius, 60))]));
    const cot = 1 / Math.tan((Math.PI * radius) / (4 * layer));
    const exact =
      (2 * Math.PI * 5) / Math.log(Math.tan((Math.PI * (2 * depth - radius)) / (4 * layer)) * cot);
    expect(Math.abs(inflowOf(solution, 'ground') / exact - 1)).toBeLessThan(0.005);
    expect(solution.gap!).toBeLessThan(1e-3);
  });

  it.each([
    {
      name: 'a drain without thickness',
      inner: [
        held('drain', 0, [
          [2, -5],
          [4, -5],
        ]),
      ],
    },
    {
      name: 'two drains at heads of their own',
      inner: [
        held('drain', 0, [
          [2, -5],
          [4, -5],
        ]),
        held('other', 1, [
          [-9, -5],
          [-6, -6],
        ]),
      ],
    },
    {
      name: 'a drain beside a wall that hangs free',
      inner: [
        held('drain', 0, [
          [2, -5],
          [4, -5],
        ]),
        closed([
          [-1, -3],
          [-1, -7],
        ]),
      ],
    },
    {
      name: 'a pipe closed on its upper half',
      inner: [held('drain', 0, ring(3, -5, 1, 40).slice(20)), closed(ring(3, -5, 1, 40).slice(0, 21))],
    },
  ])('$name', ({ inner }) => {
    const pipe = inner.length === 2 && inner[0]!.points.length > 10;
    const solution = solved(pipe ? section([...ground, ...inner]) : section(ground, inner));
    expect(solution.stream).not.toBeNull();
    expect(solution.gap!).toBeLessThan(1e-3);
    expect(solution.imbalance).toBeLessThan(1e-9);
  });

  it('gives the flow between a wall that hangs free and each side, alike for a wall in the middle', () => {
    const solution = solved(
      section(
        [
          held('in', 1, [
            [0, 0],
            [0, 10],
          ]),
          held('out', 0, [
            [20, 0],
            [20, 10],
          ]),
          closed([
            [0, 0],
            [20, 0],
          ]),
          closed([
            [0, 10],
            [20, 10],
          ]),
        ],
        [
          closed([
            [10, 2],
            [10, 8],
          ]),
        ],
      ),
    );
    const { mesh, values } = solution.stream!;
    const onWall = values.filter((_, node) => {
      const [x, y] = [mesh.x[node]!, mesh.y[node]!];
      return Math.abs(x) < 1e-9 && Math.abs(y) < 2.999;
    });
    expect(onWall.length).toBeGreaterThan(10);
    for (const value of onWall) expect(value / solution.inflow).toBeCloseTo(0.5, 3);
  });

  it('of two parts that do not touch one another', () => {
    const part = (x: number) => [
      held('in', 1, [
        [x, 0],
        [x, 4],
      ]),
      held('out', 0, [
        [x + 8, 0],
        [x + 8, 4],
      ]),
      closed([
        [x, 0],
        [x + 8, 0],
      ]),
      closed([
        [x, 4],
        [x + 8, 4],
      ]),
    ];
    const solution = solved(section([...part(0), ...part(20)]));
    expect(solution.inflow).toBeCloseTo(1, 9);
    expect(solution.gap!).toBeLessThan(1e-9);
  });
});
