import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { distanceToPolyline, type Polyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * True when a place lies above the phreatic line: going down from it, the phreatic line is met before any face or
 * ground. `up` is the direction of the section's up in the frame of the shapes (unit vector); a place within `slack` of
 * the phreatic line counts as on it, not above.
 */
export function liesAbovePhreatic(
  at: Pair,
  up: Pair,
  phreaticLines: readonly Polyline[],
  faces: readonly Polyline[],
  slack: number,
): boolean {
  const down = dropFrom(at, up, [...phreaticLines, ...faces]);
  if (down === null) return false;
  const depthTo = (lines: readonly Polyline[]) =>
    Math.min(...lines.flatMap((line) => crossingsOf(down, line).map((crossing) => crossing.s)));
  const phreatic = depthTo(phreaticLines);
  if (!Number.isFinite(phreatic) || depthTo(faces) < phreatic) return false;
  return phreaticLines.every((line) => distanceToPolyline(line, at[0], at[1]) > slack);
}

/** A straight way down from a place, long enough to pass every line. */
function dropFrom(at: Pair, up: Pair, lines: readonly Polyline[]): Polyline | null {
  const far = Math.max(
    0,
    ...lines.flatMap(({ box }) => [
      Math.hypot(box.minX - at[0], box.minY - at[1]),
      Math.hypot(box.maxX - at[0], box.maxY - at[1]),
      Math.hypot(box.minX - at[0], box.maxY - at[1]),
      Math.hypot(box.maxX - at[0], box.minY - at[1]),
    ]),
  );
  return polylineOf([at, [at[0] - up[0] * far, at[1] - up[1] * far]]);
}
