import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { SectionChain, SectionProblem } from '#shared/compute/independent/section-problem.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { inflowOf, solved, UNIT_SOIL, weirSection } from './weir-section.ts';

/** Coarse, so that many sections are solved in a short time. */
const COARSE = { elements: 60, mostNodes: 1500, accuracy: 0.05 };

const place = fc.tuple(fc.integer({ min: 0, max: 30 }), fc.integer({ min: 0, max: 20 }));
const condition = fc.oneof(
  fc.record({
    kind: fc.constant('head' as const),
    id: fc.constant('a'),
    head: fc.integer({ min: -5, max: 30 }),
  }),
  fc.record({ kind: fc.constant('freeOutflow' as const), id: fc.constant('b') }),
  fc.record({ kind: fc.constant('closed' as const), id: fc.constant('c') }),
);
const chain: fc.Arbitrary<SectionChain> = fc.record({
  points: fc.array(place, { minLength: 0, maxLength: 6 }),
  condition,
});
const box: SectionChain[] = [
  {
    points: [
      [0, 0],
      [0, 20],
    ],
    condition: { kind: 'head', id: 'in', head: 18 },
  },
  {
    points: [
      [30, 0],
      [30, 20],
    ],
    condition: { kind: 'freeOutflow', id: 'out' },
  },
  {
    points: [
      [0, 0],
      [30, 0],
    ],
    condition: { kind: 'closed', id: 'base' },
  },
  {
    points: [
      [0, 20],
      [30, 20],
    ],
    condition: { kind: 'closed', id: 'top' },
  },
];

describe('whatever is drawn', () => {
  it('is answered without an error thrown, heads within those that are held', () => {
    fc.assert(
      fc.property(
        fc.boolean(),
        fc.array(chain, { maxLength: 4 }),
        fc.array(chain, { maxLength: 3 }),
        fc.array(fc.array(place, { maxLength: 4 }), { maxLength: 2 }),
        // A free surface takes many rounds: fewer of these.
        fc.integer({ min: 0, max: 3 }).map((one) => one === 0),
        (isBoxed, boundary, inner, soilBoundaries, unconfined) => {
          const problem: SectionProblem = {
            boundary: isBoxed ? [...box, ...boundary] : boundary,
            inner,
            soilBoundaries,
            soils: [
              UNIT_SOIL,
              { ...UNIT_SOIL, id: 'other', kh: 0.01, kv: 0.001, dipDeg: 12, places: [[15, 10]] },
            ],
            unconfined,
          };
          const solution = solveSection(problem, COARSE);
          if (!solution.ok) {
            expect(solution.text.length).toBeGreaterThan(20);
            return;
          }
          expect(solution.heads.every(Number.isFinite)).toBe(true);
          expect(solution.imbalance).toBeLessThan(1e-4);
          expect(solution.leastHead).toBeGreaterThan(-5 - 1);
          expect(solution.greatestHead).toBeLessThan(30 + 1);
        },
      ),
      { numRuns: 8 },
    );
  });
});

describe('lines as a hand leaves them', () => {
  const plain = weirSection({ pile: 5, layer: 10, floor: [8, 3], reach: 40, lost: 4 });
  const exact = inflowOf(solved(plain), 'headwater');

  it('points that nearly coincide, repeated points, reversed and parted chains change nothing', () => {
    const noisy = (points: readonly Pair[]): Pair[] =>
      points.flatMap(([x, z], i): Pair[] => {
        const [nx, nz] = points[i + 1] ?? [x, z];
        return [
          [x, z],
          [x, z],
          [x + (nx - x) * 0.4, z + (nz - z) * 0.4],
          [x + (nx - x) * 0.4 + 1e-7, z + (nz - z) * 0.4 - 1e-7],
        ];
      });
    const untidy: SectionProblem = {
      ...plain,
      boundary: plain.boundary.map((each) => ({ ...each, points: noisy(each.points).reverse() })).reverse(),
    };
    expect(Math.abs(inflowOf(solved(untidy), 'headwater') / exact - 1)).toBeLessThan(5e-4);
  });

  it('a wall drawn down and up again as part of the outline is the same wall', () => {
    const [up, down, base] = plain.boundary;
    const folded: SectionProblem = {
      ...plain,
      boundary: [
        up!,
        down!,
        base!,
        {
          points: [
            [-8, 0],
            [0, 0],
            [0, -5],
            [0, 0],
            [3, 0],
          ],
          condition: { kind: 'closed', id: 'floor' },
        },
      ],
      inner: [],
    };
    expect(Math.abs(inflowOf(solved(folded), 'headwater') / exact - 1)).toBeLessThan(5e-4);
  });

  it('a sliver of soil and a wall thinner than a line are taken as they are', () => {
    const thin: SectionProblem = {
      ...plain,
      soilBoundaries: [
        [
          [-40, -4],
          [40, -4],
        ],
        [
          [-40, -4.0005],
          [40, -4.0005],
        ],
      ],
      soils: [UNIT_SOIL, { ...UNIT_SOIL, id: 'seam', kh: 1, kv: 1, places: [[20, -4.00025]] }],
    };
    const solution = solved(thin);
    expect(Math.abs(inflowOf(solution, 'headwater') / exact - 1)).toBeLessThan(2e-3);
    expect(solutionReader(solution).headAt([20, -4.0002])).not.toBeNull();
  });
});
