import { FREE, nextOf, previousOf, type TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

export type RefineOptions = {
  /** Wanted length of edges at a place, in the mesh's unit; must not grow faster than about half of the distance. */
  readonly sizeAt: (x: number, y: number) => number;
  /** True for the regions to refine; triangles of others are left as they are. */
  readonly wanted: (region: number) => boolean;
  /** Refinement ends when the mesh has this many vertices. */
  readonly mostVertices: number;
  /** Triangles to part whatever their size. */
  readonly marked?: Iterable<number>;
};

/** Greatest circumradius over shortest edge that is left alone: √2, no angle below 20.7° (Ruppert 1995). */
const WORST_RATIO_SQUARED = 2;
/** Parts of the wanted size below which an edge is not parted for the shape of triangles alone, so that slivers end. */
const SHORTEST_FOR_SHAPE = 0.03;
/** Parts of the wanted size above which a segment or a circumradius counts as too long. */
const LONGEST_SEGMENT = 1.25;
const LARGEST_RADIUS = 0.72;

/**
 * Refines a constrained Delaunay triangulation in place until its triangles are as small as wanted and well shaped:
 * encroached segments are halved, circumcentres of bad triangles put in (Ruppert 1995), with a shortest edge below
 * which a bad shape is tolerated, so that acute corners and slivers of the input come to an end. False when the
 * vertices ran out before.
 */
export function refine(mesh: TriangleMesh, options: RefineOptions): boolean {
  return new Refiner(mesh, options).run();
}

type Corners = readonly [t: number, a: number, b: number, c: number];

class Refiner {
  private readonly segments: Array<readonly [number, number]> = [];
  private triangles: Corners[] = [];
  private later: Corners[] = [];
  private readonly firstNew: number;

  constructor(
    private readonly mesh: TriangleMesh,
    private readonly options: RefineOptions,
  ) {
    this.firstNew = mesh.x.length;
  }

  run(): boolean {
    for (let t = 0; t < this.mesh.triangleCount; t += 1) this.note(t);
    for (const t of this.options.marked ?? []) this.later.push(this.cornersOf(t));
    while (this.mesh.x.length < this.options.mostVertices) {
      const segment = this.segments.pop();
      if (segment !== undefined) {
        this.halveIfNeeded(...segment);
        continue;
      }
      if (this.triangles.length === 0) {
        if (this.later.length === 0) return true;
        // First come, first served keeps the mesh even while it grows finer.
        this.triangles = this.later.reverse();
        this.later = [];
      }
      this.improve(this.triangles.pop()!);
    }
    return this.segments.length + this.triangles.length + this.later.length === 0;
  }

  private isWanted(t: number): boolean {
    return this.options.wanted(this.mesh.region[t]!);
  }

  /** Puts what is wrong with a triangle, or with its segments, on the lists. */
  private note(t: number): void {
    if (!this.isWanted(t)) return;
    const { corner, label } = this.mesh;
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      if (label[e] !== FREE && this.mustHalve(e)) this.segments.push([corner[e]!, corner[nextOf(e)]!]);
    }
    if (this.isBad(t)) this.later.push(this.cornersOf(t));
  }

  private cornersOf(t: number): Corners {
    const { corner } = this.mesh;
    return [t, corner[3 * t]!, corner[3 * t + 1]!, corner[3 * t + 2]!];
  }

  private noteAround(vertex: number): void {
    for (const e of this.mesh.around(vertex)) this.note(Math.floor(e / 3));
  }

  private mustHalve(e: number): boolean {
    const { mesh } = this;
    const [a, b] = [mesh.corner[e]!, mesh.corner[nextOf(e)]!];
    const length = Math.hypot(mesh.x[b]! - mesh.x[a]!, mesh.y[b]! - mesh.y[a]!);
    const size = this.options.sizeAt((mesh.x[a]! + mesh.x[b]!) / 2, (mesh.y[a]! + mesh.y[b]!) / 2);
    if (length > LONGEST_SEGMENT * size) return true;
    if (length < 2 * SHORTEST_FOR_SHAPE * size) return false;
    return [e, mesh.twin[e]!].some(
      (side) =>
        side >= 0 &&
        this.isWanted(Math.floor(side / 3)) &&
        this.encroaches(
          a,
          b,
          mesh.x[mesh.corner[previousOf(side)]!]!,
          mesh.y[mesh.corner[previousOf(side)]!]!,
        ),
    );
  }

  /** True when a place lies inside the circle over a segment. */
  private encroaches(a: number, b: number, px: number, py: number): boolean {
    const { x, y } = this.mesh;
    return (x[a]! - px) * (x[b]! - px) + (y[a]! - py) * (y[b]! - py) < 0;
  }

  private halveIfNeeded(a: number, b: number): void {
    const e = this.mesh.find(a, b);
    if (e >= 0 && this.mesh.label[e] !== FREE && this.mustHalve(e)) this.halve(e);
  }

  private halve(e: number): void {
    const { mesh } = this;
    const [a, b] = [mesh.corner[e]!, mesh.corner[nextOf(e)]!];
    const part = this.partOf(a, b);
    const vertex = mesh.addVertex(
      mesh.x[a]! + part * (mesh.x[b]! - mesh.x[a]!),
      mesh.y[a]! + part * (mesh.y[b]! - mesh.y[a]!),
    );
    mesh.insertAt(vertex, { triangle: Math.floor(e / 3), edge: e, vertex: null });
    this.noteAround(vertex);
  }

  /**
   * Where to part a segment: in the middle, but where only one of its ends was given, at a power of two from that end,
   * so that the segments of an acute corner are parted at equal distances and do not encroach on one another for ever.
   */
  private partOf(a: number, b: number): number {
    const givenA = a < this.firstNew;
    if (givenA === b < this.firstNew) return 0.5;
    const { x, y } = this.mesh;
    const length = Math.hypot(x[b]! - x[a]!, y[b]! - y[a]!);
    const power = 2 ** Math.round(Math.log2(length / 2));
    const part = Math.min(2 / 3, Math.max(1 / 3, power / length));
    return givenA ? part : 1 - part;
  }

  private isBad(t: number): boolean {
    const { x, y, corner } = this.mesh;
    const [a, b, c] = [corner[3 * t]!, corner[3 * t + 1]!, corner[3 * t + 2]!];
    const ab = square(x[b]! - x[a]!, y[b]! - y[a]!);
    const bc = square(x[c]! - x[b]!, y[c]! - y[b]!);
    const ca = square(x[a]! - x[c]!, y[a]! - y[c]!);
    const twice = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
    const radiusSquared = (ab * bc * ca) / (4 * twice * twice);
    const size = this.options.sizeAt((x[a]! + x[b]! + x[c]!) / 3, (y[a]! + y[b]! + y[c]!) / 3);
    const shortest = Math.min(ab, bc, ca);
    if (radiusSquared > square(LARGEST_RADIUS * size, 0) && Math.max(ab, bc, ca) > square(0.8 * size, 0))
      return shortest > square(SHORTEST_FOR_SHAPE * size, 0) || Math.max(ab, bc, ca) > square(1.5 * size, 0);
    return radiusSquared > WORST_RATIO_SQUARED * shortest && shortest > square(SHORTEST_FOR_SHAPE * size, 0);
  }

  private improve([t, a, b, c]: Corners): void {
    const { mesh } = this;
    if (mesh.corner[3 * t] !== a || mesh.corner[3 * t + 1] !== b || mesh.corner[3 * t + 2] !== c) return;
    const [px, py] = circumcentre(mesh, a, b, c);
    if (!Number.isFinite(px + py)) return;
    const place = mesh.locate(px, py, t, (e) => mesh.label[e] !== FREE);
    if (place === null) return;
    if ('stopped' in place) {
      this.halveForShape(place.stopped);
      return;
    }
    if (place.vertex !== null) return;
    if (place.edge !== null && mesh.label[place.edge] !== FREE) {
      this.halveForShape(place.edge);
      return;
    }
    const upset = this.encroachedBy(place.triangle, px, py);
    if (upset.length > 0) {
      const halved = upset.filter(([from, to]) => this.halveForShape(mesh.find(from, to)));
      if (halved.length > 0) this.note(t);
      return;
    }
    const vertex = mesh.addVertex(px, py);
    mesh.insertAt(vertex, place);
    this.noteAround(vertex);
  }

  /** Halves a segment that keeps a better triangle out, unless it is too short to matter. */
  private halveForShape(e: number): boolean {
    if (e < 0) return false;
    const { x, y, corner } = this.mesh;
    const [a, b] = [corner[e]!, corner[nextOf(e)]!];
    const size = this.options.sizeAt((x[a]! + x[b]!) / 2, (y[a]! + y[b]!) / 2);
    if (Math.hypot(x[b]! - x[a]!, y[b]! - y[a]!) < 2 * SHORTEST_FOR_SHAPE * size) return false;
    this.halve(e);
    return true;
  }

  /** Segments about the triangles whose circles hold a place, on which a vertex there would encroach. */
  private encroachedBy(start: number, px: number, py: number): Array<readonly [number, number]> {
    const { mesh } = this;
    const seen = new Set([start]);
    const open = [start];
    const found: Array<readonly [number, number]> = [];
    while (open.length > 0) {
      const t = open.pop()!;
      for (let e = 3 * t; e < 3 * t + 3; e += 1) {
        const [a, b] = [mesh.corner[e]!, mesh.corner[nextOf(e)]!];
        if (mesh.label[e] !== FREE) {
          if (this.encroaches(a, b, px, py)) found.push([a, b]);
          continue;
        }
        const next = mesh.twin[e]! < 0 ? -1 : Math.floor(mesh.twin[e]! / 3);
        if (next < 0 || seen.has(next) || !circleHolds(mesh, next, px, py)) continue;
        seen.add(next);
        open.push(next);
      }
    }
    return found;
  }
}

function square(dx: number, dy: number): number {
  return dx * dx + dy * dy;
}

function circumcentre({ x, y }: TriangleMesh, a: number, b: number, c: number): [number, number] {
  const [bx, by] = [x[b]! - x[a]!, y[b]! - y[a]!];
  const [cx, cy] = [x[c]! - x[a]!, y[c]! - y[a]!];
  const d = 2 * (bx * cy - by * cx);
  const [b2, c2] = [bx * bx + by * by, cx * cx + cy * cy];
  return [x[a]! + (cy * b2 - by * c2) / d, y[a]! + (bx * c2 - cx * b2) / d];
}

function circleHolds(mesh: TriangleMesh, t: number, px: number, py: number): boolean {
  const [a, b, c] = [mesh.corner[3 * t]!, mesh.corner[3 * t + 1]!, mesh.corner[3 * t + 2]!];
  const [ox, oy] = circumcentre(mesh, a, b, c);
  return square(px - ox, py - oy) < square(mesh.x[a]! - ox, mesh.y[a]! - oy);
}
