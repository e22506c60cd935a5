import { type Ring, ringContains } from '#shared/compute/geometry/polygon.ts';

/** A square of the tree: its middle and half its side. */
type Square = { readonly x: number; readonly y: number; readonly half: number };

const MOST_POINTS = 20_000;

/**
 * Points inside a ring for a mesh whose elements have about the size asked for: the middles of squares that are parted
 * into four until their side is not above `sizeAt`. Pixels throughout. Points nearer to the outline than 0.55 of the size,
 * by `clearanceAt`, are left out, as they would make slivers. `sizeAt` must fall off gently (a slope below 1) and stay
 * above zero.
 */
export function innerPoints(
  ring: Ring,
  sizeAt: (x: number, y: number) => number,
  clearanceAt: (x: number, y: number) => number,
): number[] {
  const { minX, minY, maxX, maxY } = ring.box;
  const half = Math.max(maxX - minX, maxY - minY) / 2;
  const open: Square[] = [{ x: (minX + maxX) / 2, y: (minY + maxY) / 2, half }];
  const points: number[] = [];
  while (open.length > 0 && points.length < 2 * MOST_POINTS) {
    const square = open.pop()!;
    if (outside(square, ring)) continue;
    const size = sizeAt(square.x, square.y);
    if (2 * square.half > size) {
      open.push(...quarters(square));
      continue;
    }
    if (!ringContains(ring, square.x, square.y)) continue;
    if (clearanceAt(square.x, square.y) > 0.55 * size) points.push(square.x, square.y);
  }
  return points;
}

function outside({ x, y, half }: Square, { box }: Ring): boolean {
  return x + half < box.minX || x - half > box.maxX || y + half < box.minY || y - half > box.maxY;
}

function quarters({ x, y, half }: Square): Square[] {
  const q = half / 2;
  return [
    { x: x - q, y: y - q, half: q },
    { x: x + q, y: y - q, half: q },
    { x: x - q, y: y + q, half: q },
    { x: x + q, y: y + q, half: q },
  ];
}
