import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { seepagePerRun } from '#shared/compute/net/seepage.ts';
import { heaveFactor, meanOverBase } from '#shared/compute/quantities/heave.ts';
import { commonAnisotropy } from '#shared/compute/soils/anisotropy.ts';
import { UNSAID } from '#shared/contract/document.ts';
import { inflowOf, solved, type Weir, weirSection } from '#tests/shared/compute/independent/weir-section.ts';
import type { Runner } from './closed-form-runners.ts';
import { inputOf, type PublishedCase } from './published-cases.ts';

/** Side by which a place lies off a thin wall, and depth that stands for a half-space. */
const BESIDE = 1e-7;
const HALF_SPACE = 2000;

const maybe = ({ inputs }: PublishedCase, name: string) => {
  const value = inputs[name];
  return typeof value === 'number' ? value : 0;
};

function solve(weir: Omit<Weir, 'reach' | 'lost'> & { lost?: number }): SectionSolution {
  const reach = weir.layer >= HALF_SPACE ? HALF_SPACE : 8 * weir.layer + 2 * Math.max(...weir.floor);
  return solved(weirSection({ lost: 1, reach, ...weir }));
}

const exitAt = (solution: SectionSolution, offset: number) =>
  solution.exits.find(({ at }) => Math.abs(at[0] - offset) < 1e-9)?.gradient ?? Number.NaN;

const sheetPile: Runner = (published) => {
  const [s, T] = [inputOf(published, 's'), inputOf(published, 'T')];
  const H =
    maybe(published, 'H') || maybe(published, 'upstream water') - maybe(published, 'downstream water');
  const solution = solve({ pile: s, layer: T, floor: [0, 0] });
  const q = inflowOf(solution, 'headwater');
  return {
    H,
    q_over_kH: q,
    q: seepagePerRun(maybe(published, 'k'), H, q, 1, 1),
    exit_gradient_over_H: exitAt(solution, 0),
    head_at_tip_over_H: solutionReader(solution).headAt([0, -s])!,
  };
};

const floor: Runner = (published) => {
  const [b, T] = [inputOf(published, 'b'), inputOf(published, 'T')];
  const s = maybe(published, 's');
  const solution = solve({ pile: s, layer: T, floor: [b / 2, b / 2] });
  const { headAt } = solutionReader(solution);
  const at = (part: number) => headAt([part * b, 0])!;
  return {
    q_over_kH: inflowOf(solution, 'headwater'),
    'head_over_H_at_-0.40b': at(-0.4),
    'head_over_H_at_-0.25b': at(-0.25),
    'head_over_H_at_+0.10b': at(0.1),
    h_over_H_upstream_corner: headAt([-BESIDE, 0])!,
    h_over_H_downstream_corner: headAt([BESIDE, 0])!,
    h_over_H_tip: headAt([0, -s])!,
  };
};

/** The grid of q/kH by s/T and b/T, its keys as "s0.2_b0.5". */
const grid: Runner = ({ expected }) =>
  Object.fromEntries(
    Object.keys(expected).map((key) => {
      const [, s, b] = /^s([\d.]+)_b([\d.]+)$/.exec(key)!.map(Number) as [number, number, number];
      const solution = solve({ pile: 10 * s, layer: 10, floor: [5 * b, 5 * b] });
      return [key, inflowOf(solution, 'headwater')];
    }),
  );

const endPile: Runner = (published) => {
  const [b, d] = [inputOf(published, 'b'), inputOf(published, 'd')];
  const solution = solve({ pile: d, layer: HALF_SPACE, floor: [b, 0] });
  const { headAt } = solutionReader(solution);
  return {
    phiE: headAt([-BESIDE, 0])!,
    phiD: headAt([0, -d])!,
    GE_times_d_over_H: exitAt(solution, 0) * d,
  };
};

const innerPile: Runner = (published) => {
  const [b1, b2, d] = ['b1', 'b2', 'd'].map((name) => inputOf(published, name)) as [number, number, number];
  const { headAt } = solutionReader(solve({ pile: d, layer: HALF_SPACE, floor: [b1, b2] }));
  return { phiE: headAt([-BESIDE, 0])!, phiD: headAt([0, -d])!, phiC: headAt([BESIDE, 0])! };
};

const anisotropic: Runner = (published) => {
  const [b, s, T, kx, kz, H] = ['b', 's', 'T', 'kx', 'kz', 'H'].map((name) => inputOf(published, name)) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const { ratio } = commonAnisotropy([{ ...UNSAID.soil, k: kx, kv: kz, unit: 'm/s' }], null);
  const soil = { id: 's', kh: kx, kv: kz, dipDeg: 0, places: [] };
  const solution = solved(
    weirSection({ pile: s, layer: T, floor: [b / 2, b / 2], reach: 240, lost: H, soil }),
  );
  const q = inflowOf(solution, 'headwater');
  const k = solution.permeabilities[0]!;
  return { x_factor: Math.sqrt(1 / ratio), k_equivalent: k, shape_factor: q / (k * H), q };
};

/** Mean excess head over H on the base of the prism beside a pile of depth D in a layer T. */
function meanExcess(D: number, T: number): number {
  const { headAt } = solutionReader(solve({ pile: D, layer: T, floor: [0, 0] }));
  return meanOverBase((part) => headAt([BESIDE + part * (D / 2), -D]))!;
}

const heaveHead: Runner = (published) => ({ C0: meanExcess(10 * inputOf(published, 'D/T'), 10) });

/** The cases that are answered by solving the section from its boundaries alone. */
export const SOLVED_RUNNERS: Readonly<Record<string, Runner>> = {
  '1A-01': sheetPile,
  '1A-02': sheetPile,
  '1A-03': sheetPile,
  '1A-04': sheetPile,
  '1A-09': floor,
  '1A-10': floor,
  '1A-11': floor,
  '1A-15': floor,
  '1A-16': floor,
  '1A-17': floor,
  '1A-18': (published) => {
    const [b1, b2, s, T] = ['b1', 'b2', 's', 'T'].map((name) => inputOf(published, name)) as [
      number,
      number,
      number,
      number,
    ];
    return { q_over_kH: inflowOf(solve({ pile: s, layer: T, floor: [b1, b2] }), 'headwater') };
  },
  '1A-19': grid,
  '1B-01': endPile,
  '1B-02': endPile,
  '1B-03': innerPile,
  '1B-04': innerPile,
  '2-10': uprightDamOf,
  '2-11': uprightDamOf,
  '2-12': uprightDamOf,
  '3-01': anisotropic,
  '3-02': anisotropic,
  '3-03': anisotropic,
  '4-05': heaveHead,
  '4-06': heaveHead,
  '4-07': heaveHead,
  '4-08': heaveHead,
  '4-09': heaveHead,
  '4-11': (published) => {
    const [D, T, H, saturated, gammaW] = ['D', 'T', 'H', 'gamma_sat', 'gamma_w'].map((name) =>
      inputOf(published, name),
    ) as [number, number, number, number, number];
    const mean = H * meanExcess(D, T);
    return { mean_excess_head: mean, F: heaveFactor(saturated - gammaW, D, mean, gammaW)! };
  },
};

/** A dam with upright faces, its top a tenth above the headwater. */
function uprightDamOf(published: PublishedCase): Record<string, number> {
  const [h1, h2, L] = ['h1', 'h2', 'L'].map((name) => inputOf(published, name)) as [number, number, number];
  const top = 1.1 * h1;
  const line = (
    points: ReadonlyArray<readonly [number, number]>,
    condition: Parameters<typeof solved>[0]['boundary'][number]['condition'],
  ) => ({ points, condition });
  const tailwater =
    h2 > 0
      ? [
          line(
            [
              [L, 0],
              [L, h2],
            ],
            { kind: 'head', id: 'tailwater', head: h2 },
          ),
        ]
      : [];
  const solution = solved({
    boundary: [
      line(
        [
          [0, 0],
          [0, h1],
        ],
        { kind: 'head', id: 'headwater', head: h1 },
      ),
      ...tailwater,
      line(
        [
          [L, h2],
          [L, top],
        ],
        { kind: 'freeOutflow', id: 'face' },
      ),
      line(
        [
          [0, h1],
          [0, top],
          [L, top],
        ],
        { kind: 'closed', id: 'closed' },
      ),
      line(
        [
          [0, 0],
          [L, 0],
        ],
        { kind: 'closed', id: 'closed' },
      ),
    ],
    inner: [],
    soilBoundaries: [],
    soils: [{ id: 'soil', kh: 1, kv: 1, dipDeg: 0, places: [] }],
    unconfined: true,
  });
  return { q_over_k: inflowOf(solution, 'headwater') };
}
