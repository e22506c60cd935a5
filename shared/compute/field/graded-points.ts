import type { Ring } from '#shared/compute/geometry/polygon.ts';

/** No mesh gets more squares than this, whatever the outline asks for. */
const MOST_SQUARES = 60_000;
/** Part of a square's side by which its point is moved off the middle, so that no four points lie on one circle. */
const OFF_MIDDLE = 0.08;

/**
 * Points inside a ring for a mesh that is as fine as `nodes` along its outline and grows coarser away from it: the
 * middles of squares that are parted until none is larger than the spacing of the nodes in it, nor twice as large as its
 * neighbour. Squares that hold a node have no point, as it would make slivers. `nodes`: flat x y, `spacing`: one each;
 * one frame. Returns flat x y. Source: balanced quadtrees, de Berg and others (2008), Computational Geometry, ch. 14.
 */
export function gradedPoints(ring: Ring, nodes: Float64Array, spacing: Float64Array): number[] {
  const tree = new QuadTree(ring);
  for (let i = 0; i < spacing.length; i += 1) tree.part(nodes[2 * i]!, nodes[2 * i + 1]!, spacing[i]!);
  tree.balance();
  for (let i = 0; i < spacing.length; i += 1) tree.occupy(nodes[2 * i]!, nodes[2 * i + 1]!);
  return tree.pointsIn(ring);
}

/** Squares that there is room for at first. */
const FIRST_ROOM = 4096;

/** Squares by number: middle, half side, first of four children (0: none), whether a node lies in it. */
class QuadTree {
  private count = 0;
  private x = new Float64Array(FIRST_ROOM);
  private y = new Float64Array(FIRST_ROOM);
  private half = new Float64Array(FIRST_ROOM);
  private child = new Int32Array(FIRST_ROOM);
  private held = new Uint8Array(FIRST_ROOM);

  constructor({ box }: Ring) {
    const half = 0.5 * Math.max(box.maxX - box.minX, box.maxY - box.minY);
    // The middle is set off a little, so that lines along the axes do not run along the sides of squares.
    this.add((box.minX + box.maxX) / 2 + 0.013 * half, (box.minY + box.maxY) / 2 + 0.017 * half, 1.05 * half);
  }

  part(x: number, y: number, spacing: number): void {
    let square = this.leafAt(x, y);
    while (2 * this.half[square]! > spacing && this.count < MOST_SQUARES) {
      this.split(square);
      square = this.leafAt(x, y);
    }
  }

  occupy(x: number, y: number): void {
    this.held[this.leafAt(x, y)] = 1;
  }

  /** Parts squares until none is more than twice as large as one beside it. */
  balance(): void {
    const open = this.leaves();
    while (open.length > 0 && this.count < MOST_SQUARES) {
      const square = open.pop()!;
      if (this.child[square] !== 0) continue;
      const x = this.x[square]!;
      const y = this.y[square]!;
      const half = this.half[square]!;
      for (let side = 0; side < 4; side += 1) {
        const along = side % 2 === 0 ? -1.5 * half : 1.5 * half;
        const other = this.leafAt(side < 2 ? x + along : x, side < 2 ? y : y + along, 2.5 * half);
        if (this.half[other]! <= 2.5 * half) continue;
        this.split(other);
        const first = this.child[other]!;
        open.push(first, first + 1, first + 2, first + 3, square);
        break;
      }
    }
  }

  pointsIn(ring: Ring): number[] {
    const rows = new RingRows(ring);
    const points: number[] = [];
    for (const square of this.leaves()) {
      if (this.held[square] === 1) continue;
      const reach = OFF_MIDDLE * this.half[square]!;
      const x = this.x[square]! + reach * scatter(square);
      const y = this.y[square]! + reach * scatter(square + 0.5);
      if (rows.contain(x, y)) points.push(x, y);
    }
    return points;
  }

  private leaves(): number[] {
    const leaves: number[] = [];
    for (let i = 0; i < this.count; i += 1) if (this.child[i] === 0) leaves.push(i);
    return leaves;
  }

  /** The leaf at a place, or the first square above it that is no larger than `enough`. */
  private leafAt(x: number, y: number, enough = 0): number {
    let square = 0;
    while (this.child[square] !== 0 && this.half[square]! > enough) {
      square = this.child[square]! + (x > this.x[square]! ? 1 : 0) + (y > this.y[square]! ? 2 : 0);
    }
    return square;
  }

  private split(square: number): void {
    const x = this.x[square]!;
    const y = this.y[square]!;
    const q = this.half[square]! / 2;
    this.child[square] = this.count;
    this.add(x - q, y - q, q);
    this.add(x + q, y - q, q);
    this.add(x - q, y + q, q);
    this.add(x + q, y + q, q);
  }

  private add(x: number, y: number, half: number): void {
    if (this.count === this.x.length) this.grow();
    this.x[this.count] = x;
    this.y[this.count] = y;
    this.half[this.count] = half;
    this.count += 1;
  }

  private grow(): void {
    const room = 2 * this.count;
    const larger = (from: Float64Array) => {
      const to = new Float64Array(room);
      to.set(from);
      return to;
    };
    [this.x, this.y, this.half] = [larger(this.x), larger(this.y), larger(this.half)];
    const child = new Int32Array(room);
    child.set(this.child);
    const held = new Uint8Array(room);
    held.set(this.held);
    [this.child, this.held] = [child, held];
  }
}

/**
 * The edges of a ring by the rows that they reach into, to ask of many places whether they lie in it. Even-odd rule; a
 * place on the ring itself may count either way.
 */
class RingRows {
  private readonly rows: number[][];
  private readonly height: number;

  constructor(private readonly ring: Ring) {
    const { xy, box } = ring;
    const n = xy.length / 2;
    const count = Math.max(1, Math.ceil(n / 4));
    this.height = (box.maxY - box.minY) / count || 1;
    this.rows = Array.from({ length: count }, () => []);
    for (let i = 0; i < n; i += 1) {
      const [a, b] = [xy[2 * i + 1]!, xy[2 * ((i + 1) % n) + 1]!];
      const last = this.rowOf(Math.max(a, b));
      for (let row = this.rowOf(Math.min(a, b)); row <= last; row += 1) this.rows[row]!.push(i);
    }
  }

  contain(x: number, y: number): boolean {
    const { xy, box } = this.ring;
    if (x < box.minX || x > box.maxX || y < box.minY || y > box.maxY) return false;
    const n = xy.length / 2;
    let inside = false;
    for (const i of this.rows[this.rowOf(y)]!) {
      const j = i + 1 === n ? 0 : i + 1;
      const ay = xy[2 * i + 1]!;
      const by = xy[2 * j + 1]!;
      if (ay > y === by > y) continue;
      const ax = xy[2 * i]!;
      if (x < ax + ((y - ay) / (by - ay)) * (xy[2 * j]! - ax)) inside = !inside;
    }
    return inside;
  }

  private rowOf(y: number): number {
    const row = Math.floor((y - this.ring.box.minY) / this.height);
    return Math.min(this.rows.length - 1, Math.max(0, row));
  }
}

/** A number between −1 and 1 that hangs on `n` alone and follows no pattern. */
function scatter(n: number): number {
  const wave = Math.sin(12.9898 * n + 4.1) * 43758.5453;
  return 2 * (wave - Math.floor(wave)) - 1;
}
