import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import { followInk } from '#shared/compute/ink/follow-ink.ts';
import { type InkMap, inkMapOf } from '#shared/compute/ink/ink-window.ts';
import { type Bench, type BenchRow, percentile, rowOf } from './bench.ts';
import { INK_LOOKS, type InkScan, inkScan } from './ink-scan.ts';

type Place = readonly [x: number, y: number];

const SEEDS = [1, 2, 3, 4, 5];
/** Clicks of the hand that joins them straight, over the same stretch. */
const STRAIGHT_CLICKS = 5;
const PAPER_COST = 14;

export const inkFollow: Bench = {
  name: 'ink-follow',
  about:
    'a segment of 620 px followed over clean, toned, faded and bilevel scans, beside a bare search over the same window; its distance from the strokes’ middle beside straight joins',
  async run(): Promise<BenchRow[]> {
    const scans = Object.values(INK_LOOKS).flatMap((look) => SEEDS.map((seed) => inkScan({ ...look, seed })));
    // One round thrown away: the first also compiles.
    for (const { window, from, to } of scans.slice(0, 4)) followInk(window, from, to);
    const times: number[] = [];
    const references: number[] = [];
    const errors: number[] = [];
    const straight: number[] = [];
    for (const scan of scans) {
      const { window, from, to, middle } = scan;
      const start = performance.now();
      const { line } = followInk(window, from, to);
      times.push(performance.now() - start);
      references.push(bareSearch(scan));
      errors.push(...distances(line, middle));
      straight.push(...distances(straightJoins(middle), middle));
    }
    const p95 = (values: number[]) => [percentile(values, 0.95)];
    return [
      rowOf('ink-follow', 'ms', times, references),
      rowOf('ink-follow-error', 'px', p95(errors), p95(straight)),
    ];
  },
};

/** Distances of the true middle's places from a line. */
function distances(line: readonly Place[], middle: readonly Place[]): number[] {
  return middle
    .filter((_, i) => i % 4 === 0)
    .map((place) => Math.min(...line.slice(1).map((end, i) => distanceToSegment(place, line[i]!, end))));
}

/** What a hand gets that clicks the middle exactly and joins the clicks straight. */
function straightJoins(middle: readonly Place[]): Place[] {
  return Array.from(
    { length: STRAIGHT_CLICKS },
    (_, i) => middle[Math.round((i * (middle.length - 1)) / (STRAIGHT_CLICKS - 1))]!,
  );
}

/** Milliseconds of Dijkstra's search (1959) with a binary heap, nothing before it and nothing after, on a map that is there. */
function bareSearch({ window, from, to }: InkScan): number {
  const map = inkMapOf(window);
  const start = performance.now();
  const cost = search(map, indexOf(map, from), indexOf(map, to));
  if (!Number.isFinite(cost)) throw new Error('The bare search found no way.');
  return performance.now() - start;
}

function indexOf({ width }: InkMap, [x, y]: Place): number {
  return Math.floor(y) * width + Math.floor(x);
}

function search({ width, height, ink }: InkMap, from: number, to: number): number {
  const cost = new Float64Array(width * height).fill(Number.POSITIVE_INFINITY);
  const heap: Array<readonly [number, number]> = [[0, from]];
  cost[from] = 0;
  for (let next = popped(heap); next !== null; next = popped(heap)) {
    const [sofar, cell] = next;
    if (cell === to) return sofar;
    if (sofar > cost[cell]!) continue;
    const x = cell % width;
    for (const [dx, dy] of AROUND) {
      if (x + dx < 0 || x + dx >= width) continue;
      const beside = cell + dx + dy * width;
      if (beside < 0 || beside >= ink.length) continue;
      const paper = 1 - ink[beside]! / 255;
      const there = sofar + Math.hypot(dx, dy) * (1 + (PAPER_COST - 1) * paper * paper);
      if (there >= cost[beside]!) continue;
      cost[beside] = there;
      pushed(heap, [there, beside]);
    }
  }
  return Number.POSITIVE_INFINITY;
}

const AROUND = [
  [1, 0],
  [-1, 0],
  [0, 1],
  [0, -1],
  [1, 1],
  [1, -1],
  [-1, 1],
  [-1, -1],
] as const;

function pushed(heap: Array<readonly [number, number]>, entry: readonly [number, number]): void {
  let i = heap.length;
  heap.push(entry);
  for (let above = (i - 1) >> 1; i > 0 && heap[above]![0] > entry[0]; above = (i - 1) >> 1) {
    heap[i] = heap[above]!;
    i = above;
  }
  heap[i] = entry;
}

function popped(heap: Array<readonly [number, number]>): readonly [number, number] | null {
  const first = heap[0];
  const last = heap.pop();
  if (first === undefined || last === undefined) return null;
  if (heap.length === 0) return first;
  let i = 0;
  for (let below = 1; below < heap.length; below = 2 * i + 1) {
    if (below + 1 < heap.length && heap[below + 1]![0] < heap[below]![0]) below += 1;
    if (heap[below]![0] >= last[0]) break;
    heap[i] = heap[below]!;
    i = below;
  }
  heap[i] = last;
  return first;
}
