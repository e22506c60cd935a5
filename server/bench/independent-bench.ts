import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import {
  assemble,
  elementStiffness,
  eliminationOrder,
  solveField,
  type Unknowns,
  unknownsOf,
} from '#shared/compute/independent/elliptic-system.ts';
import { type HeadProblem, headField } from '#shared/compute/independent/head-field.ts';
import { headProblemOf } from '#shared/compute/independent/head-problem.ts';
import { OUTSIDE, outlineOf } from '#shared/compute/independent/section-outline.ts';
import type { SectionProblem } from '#shared/compute/independent/section-problem.ts';
import { coarsestSize, fineCorners, sizeField } from '#shared/compute/independent/size-field.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { refine } from '#shared/compute/mesh/refine.ts';
import { type Bench, type BenchRow, repeated, rowOf } from './bench.ts';

const RUNS = 5;
/** Elements over the area with which the weir below has about 20,000 nodes. */
const ELEMENTS = 7600;

/** A floor with a pile on a layer: the section of the published case 1A-16. */
const WEIR: SectionProblem = {
  boundary: [
    held('headwater', 1, [
      [-60, 0],
      [-10, 0],
    ]),
    held('tailwater', 0, [
      [10, 0],
      [60, 0],
    ]),
    {
      points: [
        [60, 0],
        [60, -10],
        [-60, -10],
        [-60, 0],
      ],
      condition: { kind: 'closed', id: 'base' },
    },
    {
      points: [
        [-10, 0],
        [10, 0],
      ],
      condition: { kind: 'closed', id: 'floor' },
    },
  ],
  inner: [
    {
      points: [
        [0, 0],
        [0, -5],
      ],
      condition: { kind: 'closed', id: 'pile' },
    },
  ],
  soilBoundaries: [],
  soils: [{ id: 'soil', kh: 1, kv: 1, dipDeg: 0, places: [] }],
  unconfined: false,
};

function held(id: string, head: number, points: Array<[number, number]>): SectionProblem['boundary'][number] {
  return { points, condition: { kind: 'head', id, head } };
}

function meshedWeir(): HeadProblem {
  const outline = outlineOf(WEIR);
  if ('ok' in outline) throw new Error(outline.text);
  const sizeAt = sizeField(fineCorners(outline), coarsestSize(outline, ELEMENTS));
  refine(outline.mesh, { sizeAt, wanted: (region) => region !== OUTSIDE, mostVertices: 50_000 });
  return headProblemOf(outline);
}

/** Reads a matrix in compressed rows, solves it several times and prints the seconds and the farthest of two answers. */
const SCIPY = `
import sys, time, json, numpy as np
from scipy.sparse import csc_matrix
from scipy.sparse.linalg import spsolve
folder, runs = sys.argv[1], int(sys.argv[2])
read = lambda name, kind: np.fromfile(folder + '/' + name, dtype=kind)
a = csc_matrix((read('values', 'f8'), read('columns', 'i4'), read('starts', 'i4')))
b, own = read('right', 'f8'), read('own', 'f8')
seconds = []
for _ in range(runs + 1):
    start = time.perf_counter()
    x = spsolve(a, b)
    seconds.append(time.perf_counter() - start)
print(json.dumps({'seconds': seconds[1:], 'apart': float(abs(x - own).max())}))
`;

/** Milliseconds of scipy's sparse direct solve of the same system; null where Python or scipy is missing. */
async function scipyMilliseconds(
  { mesh, tensorOf }: HeadProblem,
  unknowns: Unknowns,
  values: Float64Array,
): Promise<number[] | null> {
  const has = await promisify(execFile)('python3', ['-c', 'import scipy.sparse.linalg']).catch(() => null);
  if (has === null) return null;
  const { matrix, right } = assemble(mesh, elementStiffness(mesh, tensorOf), unknowns);
  const own = new Float64Array(unknowns.count);
  unknowns.unknown.forEach((u, node) => {
    if (u >= 0) own[u] = values[node]!;
  });
  const folder = await mkdtemp(path.join(tmpdir(), 'bench-matrix-'));
  try {
    const files = Object.entries({ ...withDiagonal(matrix), right, own });
    for (const [name, numbers] of files)
      await writeFile(path.join(folder, name), new Uint8Array(numbers.buffer));
    const { stdout } = await promisify(execFile)('python3', ['-c', SCIPY, folder, String(RUNS)]);
    const { seconds, apart } = JSON.parse(stdout) as { seconds: number[]; apart: number };
    if (!(apart < 1e-8)) throw new Error(`The two solutions are ${apart} apart.`);
    return seconds.map((each) => 1000 * each);
  } finally {
    await rm(folder, { recursive: true });
  }
}

/** The matrix by rows with its diagonal among the entries; by columns too, as it is symmetric. */
function withDiagonal({ n, starts, columns, values, diagonal }: ReturnType<typeof assemble>['matrix']) {
  const all = {
    starts: starts.map((start, i) => start + i),
    columns: new Int32Array(columns.length + n),
    values: new Float64Array(columns.length + n),
  };
  for (let i = 0; i < n; i += 1) {
    all.columns.set(columns.subarray(starts[i]!, starts[i + 1]!), all.starts[i]!);
    all.values.set(values.subarray(starts[i]!, starts[i + 1]!), all.starts[i]!);
    all.columns[all.starts[i + 1]! - 1] = i;
    all.values[all.starts[i + 1]! - 1] = diagonal[i]!;
  }
  return all;
}

async function timed(work: () => unknown): Promise<number> {
  const start = performance.now();
  work();
  return performance.now() - start;
}

export const independentSolution: Bench = {
  name: 'independent-20k',
  about:
    'heads under a weir with a pile on a mesh of 20,000 nodes, assembled, ordered and solved, beside scipy’s sparse direct solve of the same matrix',
  async run(): Promise<BenchRow[]> {
    const problem = meshedWeir();
    const head = headField(problem);
    if (head === null) throw new Error('The weir was not solved.');
    const unknowns = unknownsOf(head.held);
    const own = await repeated(RUNS, () =>
      timed(() => {
        const fresh = elementStiffness(problem.mesh, problem.tensorOf);
        return solveField(problem.mesh, fresh, unknowns, eliminationOrder(problem.mesh));
      }),
    );
    const whole = await repeated(RUNS, () =>
      timed(() => solveSection(WEIR, { elements: ELEMENTS, mostNodes: 50_000 })),
    );
    return [
      rowOf('independent-20k', 'ms', own, await scipyMilliseconds(problem, unknowns, head.values)),
      rowOf('independent-20k-whole', 'ms', whole, null),
      rowOf('independent-20k-nodes', 'nodes', [problem.mesh.x.length], null),
    ];
  },
};
