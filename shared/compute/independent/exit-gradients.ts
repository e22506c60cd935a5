import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { HeadField, HeadProblem } from '#shared/compute/independent/head-field.ts';
import { gradientIn, shapeOf } from '#shared/compute/independent/quadratic-element.ts';
import type { BoundarySide } from '#shared/compute/independent/quadratic-mesh.ts';
import {
  gradientToSection,
  type SectionFrame,
  toSection,
} from '#shared/compute/independent/section-frame.ts';
import type { ExitGradient } from '#shared/compute/independent/section-solution.ts';
import type { FineCorner } from '#shared/compute/independent/size-field.ts';

/**
 * Point values of the gradient where water comes out, −∂h/∂n along the outward normal of the section as it lies: at the
 * ends of the sides of the mesh along held pieces, the mean of the two sides at each. In order along each piece.
 */
export function exitGradients(
  problem: HeadProblem,
  head: HeadField,
  frame: SectionFrame,
  corners: readonly FineCorner[],
): ExitGradient[] {
  const { mesh, conditions } = problem;
  const found = new Map<number, { id: string; values: number[] }>();
  for (const side of mesh.sides) {
    const condition = conditions[side.label];
    if (condition === undefined || condition.kind === 'closed' || !(head.inflow[side.nodes[1]]! < 0))
      continue;
    for (const end of [0, 2] as const) {
      const node = side.nodes[end];
      const entry = found.get(node) ?? { id: condition.id, values: [] };
      entry.values.push(outwardGradient(problem, head, frame, side, end));
      found.set(node, entry);
    }
  }
  const singularAt = new Set(corners.filter((corner) => corner.singular).map(({ x, y }) => `${x},${y}`));
  return [...found].map(([node, { id, values }]) => {
    const at: Pair = [mesh.x[node]!, mesh.y[node]!];
    const singular = singularAt.has(`${at[0]},${at[1]}`);
    const mean = values.reduce((a, b) => a + b, 0) / values.length;
    return { id, at: toSection(frame, at), gradient: singular ? null : mean, singular };
  });
}

function outwardGradient(
  { mesh }: HeadProblem,
  { values }: HeadField,
  frame: SectionFrame,
  side: BoundarySide,
  end: 0 | 2,
): number {
  const corner = [0, 1, 2].findIndex((k) => mesh.elements[6 * side.element + k] === side.nodes[end]);
  const at = [0, 0, 0] as [number, number, number];
  at[corner] = 1;
  const inFrame = gradientIn(mesh, side.element, shapeOf(mesh, side.element), values, at);
  const [gx, gz] = gradientToSection(frame, inFrame);
  const [from, to] = [side.nodes[0], side.nodes[2]].map((node) =>
    toSection(frame, [mesh.x[node]!, mesh.y[node]!]),
  );
  // The section lies to the left of its sides; a transform of determinant 1 keeps it there.
  const [tx, tz] = [to![0] - from![0], to![1] - from![1]];
  return (-gx * tz + gz * tx) / Math.hypot(tx, tz);
}
