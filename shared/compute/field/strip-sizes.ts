import type { EdgeKind } from '#shared/compute/field/node-edges.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import {
  distanceToPolyline,
  firstOf,
  lastOf,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** A chain of points along the outline of a strip, or of a wall inside it. */
export type Chain = { readonly points: readonly Pair[]; readonly kind: EdgeKind };

/** Elements across a strip from line to line, along its lines. */
const ACROSS = 6;
/** Growth of the elements away from a place where the gradient is endless, and their size there, pixels. */
const GROWTH = 0.3;
const LEAST_SIZE_PX = 0.25;
/** Among more steep places than this, as in a maze of walls, each gets coarser elements in turn. */
const MANY_STEEP = 16;
/**
 * Near a corner the head varies with the distance to the power π/θ, θ the angle inside, or π/2θ where a held line meets
 * a closed one. Below this power it is too steep for the usual elements.
 */
const STEEP_POWER = 0.8;

/** Sizes wanted at a place: of the elements there, and the width of the strip. Pixels. */
export type Sizes = {
  readonly widthAt: (x: number, y: number) => number;
  readonly sizeAt: (x: number, y: number) => number;
};

/** Sizes of the elements of a strip with `inner` walls: a part of its width, finer towards tips and sharp corners. */
export function sizesOf(strip: Strip, inner: readonly Pair[][], slack: number): Sizes {
  const steep = [
    ...steepCorners(strip, slack),
    // A boundary held beside the way begins and ends where the flow turns from one to the other.
    ...strip.held.flatMap(({ shape }) => [firstOf(shape), lastOf(shape)]),
    ...inner.flatMap((points) => thinned(points, 3 * slack)),
  ];
  // The width is wanted roughly: the lines without their bends are a tenth as many segments.
  const before = polylineOf(thinned(verticesOf(strip.beforeShape), slack)) ?? strip.beforeShape;
  const after = polylineOf(thinned(verticesOf(strip.afterShape), slack)) ?? strip.afterShape;
  const widthAt = (x: number, y: number) =>
    distanceToPolyline(before, x, y) + distanceToPolyline(after, x, y);
  const least = LEAST_SIZE_PX * Math.max(1, steep.length / MANY_STEEP);
  const sizeAt = (x: number, y: number) => {
    let toCorner = Number.POSITIVE_INFINITY;
    for (const corner of steep) toCorner = Math.min(toCorner, lengthOfVector(corner[0] - x, corner[1] - y));
    return Math.max(least, Math.min(widthAt(x, y) / ACROSS, 0.5 * least + GROWTH * toCorner));
  };
  return { widthAt, sizeAt };
}

type Side = { readonly points: readonly Pair[]; readonly held: boolean };

/** Corners of a strip's outline about which the head is too steep for the usual elements. */
function steepCorners(strip: Strip, slack: number): Pair[] {
  const [start, end] = strip.ways;
  const sides: Side[] = [
    { points: verticesOf(strip.beforeShape), held: true },
    { points: end?.points ?? [], held: false },
    { points: verticesOf(strip.afterShape).reverse(), held: true },
    { points: [...(start?.points ?? [])].reverse(), held: false },
  ];
  const outline: Array<{ at: Pair; heldAfter: boolean }> = [];
  for (const { points, held } of sides) {
    for (const at of thinned(points, slack)) {
      const last = outline[outline.length - 1];
      if (last !== undefined && apart(last.at, at) < 0.5) last.heldAfter = held;
      else outline.push({ at, heldAfter: held });
    }
  }
  const turn = Math.sign(areaOf(outline.map(({ at }) => at)));
  return outline
    .filter(({ at, heldAfter }, i) => {
      const before = outline[(i + outline.length - 1) % outline.length]!;
      const after = outline[(i + 1) % outline.length]!;
      const mixed = before.heldAfter !== heldAfter;
      return Math.PI / insideAngle(before.at, at, after.at, turn) < STEEP_POWER * (mixed ? 2 : 1);
    })
    .map(({ at }) => at);
}

function apart(a: Pair, b: Pair): number {
  return lengthOfVector(a[0] - b[0], a[1] - b[1]);
}

function areaOf(points: readonly Pair[]): number {
  return points.reduce((sum, [x, y], i) => {
    const [nx, ny] = points[(i + 1) % points.length]!;
    return sum + (x * ny - nx * y) / 2;
  }, 0);
}

/** The angle inside an outline at a vertex, radians, above 0 up to 2π; `turn`: sign of the outline's area. */
function insideAngle(before: Pair, at: Pair, after: Pair, turn: number): number {
  const into = Math.atan2(at[1] - before[1], at[0] - before[0]);
  const out = Math.atan2(after[1] - at[1], after[0] - at[0]);
  const left = Math.atan2(Math.sin(out - into), Math.cos(out - into)) * turn;
  return Math.max(1e-3, Math.PI - left);
}
