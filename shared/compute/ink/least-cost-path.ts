import type { InkMap } from '#shared/compute/ink/ink-window.ts';

/** Cost of a step over bare paper as against one along full ink. */
const PAPER_COST = 14;
/** Costs are counted in sixteenths, so that a step's queue is an array of buckets. */
const UNIT = 16;
const STRAIGHT = [1, 0, -1, 0, 0, 1, 0, -1] as const;
const DIAGONAL = [1, 1, 1, -1, -1, 1, -1, -1] as const;

type Cell = readonly [x: number, y: number];

/**
 * The least-cost way from one pixel to another over a map of ink: a step costs its length times 1 on full ink and up to
 * 14 on paper, so that the way keeps to strokes, runs on through gaps and straight on at crossings. Pixels of the map,
 * both ends included. Source: Dijkstra (1959) with the straight distance as a lower bound after Hart, Nilsson and
 * Raphael (1968); buckets after Dial (1969).
 */
export function leastCostPath(map: InkMap, from: Cell, to: Cell): Cell[] {
  const search = new BucketSearch(map, from, to);
  return search.run();
}

class BucketSearch {
  private readonly width: number;
  private readonly cost: Int32Array;
  private readonly cameFrom: Uint8Array;
  private readonly done: Uint8Array;
  private readonly table: Float64Array;
  private buckets: Array<number[] | undefined> = [];

  constructor(
    private readonly map: InkMap,
    private readonly from: Cell,
    private readonly to: Cell,
  ) {
    const pixels = map.width * map.height;
    this.width = map.width;
    this.cost = new Int32Array(pixels).fill(0x7fffffff);
    this.cameFrom = new Uint8Array(pixels);
    this.done = new Uint8Array(pixels);
    this.table = Float64Array.from({ length: 256 }, (_, ink) => {
      const paper = 1 - ink / 255;
      return UNIT * (1 + (PAPER_COST - 1) * paper * paper);
    });
  }

  run(): Cell[] {
    const start = this.from[1] * this.width + this.from[0];
    const goal = this.to[1] * this.width + this.to[0];
    this.cost[start] = 0;
    this.push(this.bound(this.from[0], this.from[1]), start);
    for (let level = 0; level < this.buckets.length; level += 1) {
      const bucket = this.buckets[level];
      if (bucket === undefined) continue;
      // A step may add to the bucket that is being emptied: it is read until it stays empty.
      for (let next = bucket.pop(); next !== undefined; next = bucket.pop()) {
        if (this.done[next] === 1) continue;
        this.done[next] = 1;
        if (next === goal) return this.wayBack(start, goal);
        this.leave(next);
      }
      this.buckets[level] = undefined;
    }
    return [this.from, this.to];
  }

  private leave(cell: number): void {
    const x = cell % this.width;
    const y = (cell - x) / this.width;
    for (let k = 0; k < 4; k += 1) {
      this.step(cell, x + STRAIGHT[2 * k]!, y + STRAIGHT[2 * k + 1]!, 1, k);
      this.step(cell, x + DIAGONAL[2 * k]!, y + DIAGONAL[2 * k + 1]!, Math.SQRT2, 4 + k);
    }
  }

  private step(cell: number, x: number, y: number, length: number, direction: number): void {
    if (x < 0 || y < 0 || x >= this.width || y >= this.map.height) return;
    const next = y * this.width + x;
    if (this.done[next] === 1) return;
    const cost = this.cost[cell]! + Math.round(length * this.table[this.map.ink[next]!]!);
    if (cost >= this.cost[next]!) return;
    this.cost[next] = cost;
    this.cameFrom[next] = direction;
    this.push(cost + this.bound(x, y), next);
  }

  /** No way to the goal costs less: eightfold distance at the cost of full ink. */
  private bound(x: number, y: number): number {
    const dx = Math.abs(this.to[0] - x);
    const dy = Math.abs(this.to[1] - y);
    return Math.floor(UNIT * (Math.max(dx, dy) + (Math.SQRT2 - 1) * Math.min(dx, dy)) * 0.97);
  }

  private push(level: number, cell: number): void {
    const bucket = this.buckets[level];
    if (bucket === undefined) this.buckets[level] = [cell];
    else bucket.push(cell);
  }

  private wayBack(start: number, goal: number): Cell[] {
    const way: Cell[] = [];
    for (let cell = goal; ; ) {
      const x = cell % this.width;
      const y = (cell - x) / this.width;
      way.push([x, y]);
      if (cell === start) return way.reverse();
      const direction = this.cameFrom[cell]!;
      const steps = direction < 4 ? STRAIGHT : DIAGONAL;
      const k = direction % 4;
      cell = (y - steps[2 * k + 1]!) * this.width + (x - steps[2 * k]!);
    }
  }
}
