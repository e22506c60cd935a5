import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { isotropicTransform, type Tensor } from '#shared/compute/independent/conductivity.ts';

/**
 * The frame of the computation: shifted to an origin in the section, so that offsets of hundreds of kilometres cost no
 * digits, and transformed so that a reference permeability is alike in all directions. Areas and heads are unchanged.
 * `origin`: offset and elevation; `transform`: the symmetric M of determinant 1 with place = M·(point − origin).
 */
export type SectionFrame = { readonly origin: Pair; readonly transform: Tensor };

/** A frame about the middle of the box of some points for a reference permeability. */
export function sectionFrame(points: readonly Pair[], reference: Tensor): SectionFrame {
  return { origin: middleOf(points), transform: isotropicTransform(reference) };
}

/** Offset and elevation to the frame's coordinates. */
export function toFrame({ origin, transform: m }: SectionFrame, [x, z]: Pair): Pair {
  const [dx, dz] = [x - origin[0], z - origin[1]];
  return [m.xx * dx + m.xy * dz, m.xy * dx + m.yy * dz];
}

/** The frame's coordinates to offset and elevation, by the inverse of a symmetric matrix of determinant 1. */
export function toSection({ origin, transform: m }: SectionFrame, [x, y]: Pair): Pair {
  return [origin[0] + m.yy * x - m.xy * y, origin[1] - m.xy * x + m.xx * y];
}

/** A gradient by the frame's coordinates as one by offset and elevation. */
export function gradientToSection({ transform: m }: SectionFrame, [gx, gy]: Pair): Pair {
  return [m.xx * gx + m.xy * gy, m.xy * gx + m.yy * gy];
}

function middleOf(points: readonly Pair[]): Pair {
  const low = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
  const high = [Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const point of points) {
    for (const k of [0, 1] as const) {
      low[k] = Math.min(low[k]!, point[k]);
      high[k] = Math.max(high[k]!, point[k]);
    }
  }
  return [(low[0]! + high[0]!) / 2, (low[1]! + high[1]!) / 2];
}
