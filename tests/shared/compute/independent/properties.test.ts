import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type {
  SectionChain,
  SectionProblem,
  SectionSoil,
} from '#shared/compute/independent/section-problem.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { inflowOf, solved, UNIT_SOIL, type Weir, weirSection } from './weir-section.ts';

const weir: Weir = { pile: 5, layer: 10, floor: [8, 3], reach: 60, lost: 4 };
const dipping: SectionSoil = { id: 's', kh: 3e-6, kv: 1e-6, dipDeg: 20, places: [] };
const probes: readonly Pair[] = [
  [-12, -3],
  [-4, -1],
  [-0.4, -4],
  [0, -6],
  [2, -0.5],
  [7, -8],
];

/** Heads at the probes of a weir that was moved by `place`. */
function headsOf(each: Weir): number[] {
  const { headAt } = solutionReader(solved(weirSection(each)));
  return probes.map(([x, z]) => headAt(each.place?.(x, z) ?? [x, z])! - (each.tailwater ?? 0));
}

describe('a section moved, turned, mirrored or scaled', () => {
  const plain = solved(weirSection({ ...weir, soil: dipping }));
  const q = inflowOf(plain, 'headwater');
  const heads = headsOf({ ...weir, soil: dipping });

  it('gives the same far from the origin: offset 250,000, elevation 3,000', () => {
    const far: Weir = {
      ...weir,
      soil: dipping,
      place: (x, z) => [x + 250_000, z + 3000],
      tailwater: 3000,
    };
    expect(inflowOf(solved(weirSection(far)), 'headwater') / q).toBeCloseTo(1, 7);
    headsOf(far).forEach((head, i) => {
      expect(head).toBeCloseTo(heads[i]!, 6);
    });
  });

  it('gives the same mirrored, the dip with it', () => {
    const mirrored: Weir = { ...weir, soil: { ...dipping, dipDeg: -20 }, place: (x, z) => [-x, z] };
    expect(Math.abs(inflowOf(solved(weirSection(mirrored)), 'headwater') / q - 1)).toBeLessThan(2e-4);
    headsOf(mirrored).forEach((head, i) => {
      expect(Math.abs(head - heads[i]!)).toBeLessThan(2e-3 * weir.lost);
    });
  });

  it('gives the same turned, the bedding with it, and scaled', () => {
    fc.assert(
      fc.property(fc.integer({ min: -60, max: 60 }), fc.constantFrom(0.01, 3.28, 700), (turn, scale) => {
        const [cos, sin] = [Math.cos((turn * Math.PI) / 180), Math.sin((turn * Math.PI) / 180)];
        const moved: Weir = {
          ...weir,
          // Turned counter-clockwise, beds that fell towards growing offsets fall less.
          soil: { ...dipping, dipDeg: 20 - turn },
          place: (x, z) => [scale * (cos * x - sin * z), scale * (sin * x + cos * z)],
        };
        const solution = solved(weirSection(moved));
        expect(Math.abs(inflowOf(solution, 'headwater') / q - 1)).toBeLessThan(2e-4);
        headsOf(moved).forEach((head, i) => {
          expect(Math.abs(head - heads[i]!)).toBeLessThan(2e-3 * weir.lost);
        });
      }),
      { numRuns: 4 },
    );
  });

  it('keeps heads between the least and the greatest that are held', () => {
    for (const head of plain.heads) {
      expect(head).toBeGreaterThan(-1e-3);
      expect(head).toBeLessThan(4 + 1e-3);
    }
  });
});

/** An upright strip of given soils one beside the other or one above the other, heads at its two ends. */
function strip(soils: ReadonlyArray<{ k: number; thickness: number }>, beside: boolean): SectionProblem {
  const ends = [0];
  for (const { thickness } of soils) ends.push(ends.at(-1)! + thickness);
  const whole = ends.at(-1)!;
  const [width, height] = beside ? [whole, 4] : [9, whole];
  const line = (points: readonly Pair[], condition: SectionChain['condition']) => ({ points, condition });
  const boundaryAt = (d: number): Pair[] =>
    beside
      ? [
          [d, 0],
          [d, height],
        ]
      : [
          [0, d],
          [width, d],
        ];
  return {
    boundary: [
      line(
        [
          [0, 0],
          [0, height],
        ],
        { kind: 'head', id: 'in', head: 12 },
      ),
      line(
        [
          [width, 0],
          [width, height],
        ],
        { kind: 'head', id: 'out', head: 5 },
      ),
      line(
        [
          [0, 0],
          [width, 0],
        ],
        { kind: 'closed', id: 'bottom' },
      ),
      line(
        [
          [0, height],
          [width, height],
        ],
        { kind: 'closed', id: 'top' },
      ),
    ],
    inner: [],
    soilBoundaries: ends.slice(1, -1).map(boundaryAt),
    soils: soils.map(({ k }, i) => {
      const middle = (ends[i]! + ends[i + 1]!) / 2;
      return { id: `${i}`, kh: k, kv: k, dipDeg: 0, places: [beside ? [middle, 1] : [1, middle]] };
    }),
    unconfined: false,
  };
}

describe('layers', () => {
  const soils = [
    { k: 1e-5, thickness: 4 },
    { k: 1e-7, thickness: 0.5 },
    { k: 3e-6, thickness: 6 },
  ];

  it('in series: resistances add up, q = H·height/Σ(d/k) (Darcy 1856), the head a straight line in each', () => {
    const solution = solved(strip(soils, true));
    const resistance = soils.reduce((sum, { k, thickness }) => sum + thickness / k, 0);
    expect(inflowOf(solution, 'in') / ((7 * 4) / resistance)).toBeCloseTo(1, 8);
    const { headAt, gradientAt } = solutionReader(solution);
    expect(headAt([2, 2])).toBeCloseTo(12 - (7 * (2 / 1e-5)) / resistance, 6);
    expect(headAt([4.25, 3])).toBeCloseTo(12 - (7 * (4 / 1e-5 + 0.25 / 1e-7)) / resistance, 6);
    expect(gradientAt([4.25, 3])![0]).toBeCloseTo(-7 / 1e-7 / resistance, 5);
  });

  it('in parallel: conductances add up', () => {
    const solution = solved(strip(soils, false));
    const conductance = soils.reduce((sum, { k, thickness }) => sum + k * thickness, 0);
    expect(inflowOf(solution, 'in') / ((7 * conductance) / 9)).toBeCloseTo(1, 8);
  });

  it('a place claims a region to its soil boundary, also through a wall', () => {
    const problem = strip(soils, true);
    const wall: SectionChain = {
      points: [
        [0.5, 0],
        [0.5, 4],
      ],
      condition: { kind: 'closed', id: 'wall' },
    };
    expect(solveSection({ ...problem, inner: [wall] })).toMatchObject({ ok: true });
    const solution = solved({ ...problem, inner: [wall] });
    expect(solution.inflow).toBeCloseTo(0, 12);
  });
});

describe('several outlets', () => {
  /** A strip with a head at its left end and two outlets at heads of their own at the right, parted by a closed piece. */
  const problem = (second: number): SectionProblem => ({
    boundary: [
      {
        points: [
          [0, 0],
          [0, 6],
        ],
        condition: { kind: 'head', id: 'in', head: 10 },
      },
      {
        points: [
          [20, 0],
          [20, 2],
        ],
        condition: { kind: 'head', id: 'low', head: 1 },
      },
      {
        points: [
          [20, 2],
          [20, 4],
        ],
        condition: { kind: 'closed', id: 'between' },
      },
      {
        points: [
          [20, 4],
          [20, 6],
        ],
        condition: { kind: 'head', id: 'high', head: second },
      },
      {
        points: [
          [0, 0],
          [20, 0],
        ],
        condition: { kind: 'closed', id: 'bottom' },
      },
      {
        points: [
          [0, 6],
          [20, 6],
        ],
        condition: { kind: 'closed', id: 'top' },
      },
    ],
    inner: [],
    soilBoundaries: [],
    soils: [UNIT_SOIL],
    unconfined: false,
  });

  it('alike take alike; a higher one takes less; what flows in flows out', () => {
    const alike = solved(problem(1));
    expect(inflowOf(alike, 'low') / inflowOf(alike, 'high')).toBeCloseTo(1, 3);
    const apart = solved(problem(3));
    expect(inflowOf(apart, 'low')).toBeLessThan(inflowOf(alike, 'low'));
    expect(inflowOf(apart, 'high')).toBeGreaterThan(inflowOf(alike, 'high'));
    for (const { flow, inflow, outflow, imbalance } of [alike, apart]) {
      expect(flow.reduce((sum, piece) => sum + piece.inflow, 0)).toBeCloseTo(0, 9);
      expect(outflow / inflow).toBeCloseTo(1, 9);
      expect(imbalance).toBeLessThan(1e-9);
    }
  });

  it('superpose: heads and flows of two cases add up (linearity)', () => {
    const [one, two, mean] = [1, 3, 2].map((head) => solved(problem(head)));
    const midway = (inflowOf(one!, 'high') + inflowOf(two!, 'high')) / 2;
    expect(Math.abs(inflowOf(mean!, 'high') / midway - 1)).toBeLessThan(1e-3);
  });
});

describe('refusals say what to do and where', () => {
  const problem = weirSection(weir);

  it.each([
    ['nothing-drawn', { ...problem, boundary: [] }],
    ['nothing-drawn', { ...problem, soils: [] }],
    ['bad-figure', { ...problem, soils: [{ ...UNIT_SOIL, kv: 0 }] }],
    [
      'bad-figure',
      {
        ...problem,
        inner: [{ points: [[0, Number.NaN] as Pair], condition: { kind: 'closed', id: 'x' } as const }],
      },
    ],
    ['outline-open', { ...problem, boundary: problem.boundary.slice(1) }],
    [
      'no-head',
      {
        ...problem,
        boundary: problem.boundary.map((each) => ({
          ...each,
          condition: { kind: 'closed', id: 'x' } as const,
        })),
      },
    ],
  ])('%s', (code, wrong) => {
    expect(solveSection(wrong as SectionProblem)).toMatchObject({ ok: false, code });
  });

  it('two heads at one place', () => {
    const [up, down] = problem.boundary;
    const touching: SectionProblem = {
      ...problem,
      boundary: [
        {
          ...up!,
          points: [
            [-60, 0],
            [0, 0],
          ],
        },
        {
          ...down!,
          points: [
            [0, 0],
            [60, 0],
          ],
        },
        problem.boundary[2]!,
      ],
      inner: [],
    };
    expect(solveSection(touching)).toMatchObject({ ok: false, code: 'contradictory-heads', at: [0, 0] });
    expect(solveSection({ ...touching, inner: problem.inner })).toMatchObject({ ok: true });
  });

  it('a part of the section that no water reaches', () => {
    const island: SectionChain = {
      points: [
        [100, 0],
        [110, 0],
        [110, 10],
        [100, 0],
      ],
      condition: { kind: 'closed', id: 'island' },
    };
    expect(solveSection({ ...problem, boundary: [...problem.boundary, island] })).toMatchObject({
      ok: false,
      code: 'no-head',
    });
  });
});
