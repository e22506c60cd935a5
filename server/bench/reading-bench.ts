import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sheetPileNet } from '#shared/compute/exact/sheet-pile-net.ts';
import type { NetReader } from '#shared/compute/net-reader.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { conjugateGradient, type SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type Bench, type BenchRow, percentile, repeated, rowOf } from './bench.ts';
import { builtEngine } from './built-engine.ts';
import { placesOver, tracedDocument } from './traced-exact-net.ts';

const RUNS = 15;
const POINTS = 200;

/** 60 lines in all: the two beds, the apron, 36 equipotentials and 21 flow lines; some 8,500 vertices. */
function sixtyLines(): FlowNetDocument {
  const net = flatApronNet({
    width: 20,
    headwater: 108,
    tailwater: 100,
    drops: 37,
    channels: 21,
    middle: [0, 100],
  });
  const document = tracedDocument({
    net,
    pxPerUnit: 60,
    jitterPx: 1.5,
    seed: 1,
    places: placesOver(net, POINTS, 3),
  });
  const { state, points } = readNet(document);
  // A net that is not read would be measured as a fast one.
  if (state !== 'read' || points.some(({ byField }) => byField === null)) {
    throw new Error('The net of the bench is not read.');
  }
  return document;
}

/** The document with one vertex of an equipotential dragged by a few pixels; another line each time. */
function dragged(document: FlowNetDocument, turn: number): FlowNetDocument {
  const copy = structuredClone(document);
  const lines = Object.values(copy.entities).filter(
    ({ value }) => value.kind === 'line' && value.line === 'equipotential',
  );
  const { value } = lines[(7 * turn + 5) % lines.length]!;
  if (value.kind !== 'line') throw new Error('An equipotential is a line.');
  const at = value.points.length >> 1;
  const [x, y] = value.points[at]!;
  value.points[at] = [x + 3, y + 2];
  return copy;
}

function readAgain(reader: NetReader, document: FlowNetDocument): void {
  // Points that are not read ahead would be measured as fast ones.
  if (reader.readPoints(document) === null) throw new Error('The points of the bench are not read ahead.');
}

async function timed(work: () => unknown): Promise<number> {
  const start = performance.now();
  work();
  return performance.now() - start;
}

export const reread200: Bench = {
  name: 'reread-200',
  about:
    '200 points of a net of 60 lines read again after a vertex was dragged, by the code as built for the desk, beside reading the net from scratch',
  async run(): Promise<BenchRow[]> {
    const { createNetReader, readNet } = await builtEngine();
    const document = sixtyLines();
    const reader = createNetReader();
    reader.read(document);
    const changes = Array.from({ length: RUNS + 1 }, (_, turn) => dragged(document, turn));
    let turn = 0;
    const again = await repeated(RUNS, () => {
      // As on the desk, where the whole net is read between one drag and the next.
      reader.read(document);
      return timed(() => readAgain(reader, changes[turn++]!));
    });
    const scratch = await repeated(RUNS, () => timed(() => readNet(structuredClone(document))));
    return [rowOf('reread-200', 'ms', again, scratch)];
  },
};

export const wholeNet60: Bench = {
  name: 'whole-net-60',
  about: 'a net of 60 lines with 200 points read from scratch',
  async run(): Promise<BenchRow[]> {
    const { readNet } = await builtEngine();
    const document = sixtyLines();
    const copies = Array.from({ length: RUNS + 1 }, () => structuredClone(document));
    const values = await repeated(RUNS, () => timed(() => readNet(copies.pop()!)));
    return [rowOf('whole-net-60', 'ms', values, null)];
  },
};

export const fieldSolve: Bench = {
  name: 'field-solve',
  about: 'all strips of that net meshed and solved, beside bare five-point grids of as many unknowns',
  async run(): Promise<BenchRow[]> {
    const { prepareNet, readSetOut, singleInputs } = await builtEngine();
    const document = sixtyLines();
    const setOut = readSetOut(document);
    if (setOut.map === null) throw new Error('The net of the bench is not set out.');
    const { map } = setOut;
    const fresh = () => prepareNet(document, setOut, map, singleInputs(document)).ground;
    const grounds = Array.from({ length: RUNS + 1 }, fresh);
    let unknowns: number[] = [];
    const values = await repeated(RUNS, () => {
      const ground = grounds.pop()!;
      return timed(() => {
        unknowns = ground.strips.map((strip) => ground.fieldOf(strip)?.unknowns ?? 0);
      });
    });
    const references = await repeated(RUNS, () => timed(() => unknowns.forEach(solveGrid)));
    return [rowOf('field-solve', 'ms', values, references)];
  },
};

/** Laplace's equation on a grid six cells wide and as long as the unknowns ask for, one end line at head 1. */
function solveGrid(unknowns: number): void {
  const wide = 6;
  const n = wide * Math.max(1, Math.round(unknowns / wide));
  const starts = new Int32Array(n + 1);
  const columns: number[] = [];
  for (let i = 0; i < n; i += 1) {
    if (i >= wide) columns.push(i - wide);
    if (i % wide > 0) columns.push(i - 1);
    if (i % wide < wide - 1) columns.push(i + 1);
    if (i + wide < n) columns.push(i + wide);
    starts[i + 1] = columns.length;
  }
  const rows: SparseRows = {
    n,
    starts,
    columns: Int32Array.from(columns),
    values: new Float64Array(columns.length).fill(-1),
    diagonal: new Float64Array(n).fill(4),
  };
  const right = Float64Array.from({ length: n }, (_, i) => (i % wide === 0 ? 1 : 0));
  conjugateGradient(rows, right, new Float64Array(n), 1e-8);
}

const LEVELS = { headwater: 106, tailwater: 100 };

/** Exact nets of 6 to 16 drops, with the pixels to a metre that fill the sheet. */
const EXACT: ReadonlyArray<{ net: ExactNet; pxPerUnit: number }> = [6, 10, 16].flatMap((drops) => [
  { net: flatApronNet({ ...LEVELS, width: 20, drops, channels: 5, middle: [0, 98] }), pxPerUnit: 55 },
  { net: sheetPileNet({ ...LEVELS, depth: 10, drops, channels: 4, head: [0, 99] }), pxPerUnit: 90 },
  { net: basicParabolaNet({ head: 20, drops, channels: 3, focus: [14, 98] }), pxPerUnit: 110 },
]);

export const readingError: Bench = {
  name: 'reading-error',
  about:
    "error of the figure on exact nets of 6 to 16 drops traced with 1.5 px of jitter, beside the hand rule's",
  async run(): Promise<BenchRow[]> {
    const field: number[] = [];
    const hand: number[] = [];
    EXACT.forEach(({ net, pxPerUnit }, seed) => {
      const places = placesOver(net, POINTS, 50 + seed);
      const drop = (net.headwater - net.outHead) / net.drops;
      const { points } = readNet(tracedDocument({ net, pxPerUnit, jitterPx: 1.5, seed: seed + 1, places }));
      points.forEach((point, i) => {
        if (point.byField === null || point.byHand === null) {
          throw new Error(`A point of the bench has no figure: ${point.reason?.text}`);
        }
        const exact = net.headAt(...places[i]!);
        field.push(Math.abs(point.byField.totalHead - exact) / drop);
        hand.push(Math.abs(point.byHand.totalHead - exact) / drop);
      });
    });
    const row = (name: string, share: number): BenchRow => {
      const [value, reference] = [percentile(field, share), percentile(hand, share)];
      return { name, value, unit: 'drop', reference, ratio: value / reference, samples: field.length };
    };
    return [row('reading-error-p95', 0.95), row('reading-error-worst', 1)];
  },
};
