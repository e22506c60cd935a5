import { eliminationOrder } from '#shared/compute/independent/elliptic-system.ts';
import type { HeadProblem } from '#shared/compute/independent/head-field.ts';
import { quadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import { toSection } from '#shared/compute/independent/section-frame.ts';
import { OUTSIDE, type SectionOutline } from '#shared/compute/independent/section-outline.ts';

/**
 * The head problem on the mesh of an outline as it is refined now. Heads and elevations are counted from the frame's
 * origin, so that high ground costs no digits.
 */
export function headProblemOf({ mesh: triangles, frame, conditions, tensors }: SectionOutline): HeadProblem {
  const mesh = quadraticMesh(
    triangles,
    (region) => region !== OUTSIDE,
    (label) => label < conditions.length,
  );
  const datum = frame.origin[1];
  return {
    mesh,
    order: eliminationOrder(mesh),
    conditions: conditions.map((each) =>
      each.kind === 'head' ? { ...each, head: each.head - datum } : each,
    ),
    tensorOf: (n) => tensors[mesh.regions[n]! - 1]!,
    elevations: mesh.x.map((x, node) => toSection(frame, [x, mesh.y[node]!])[1] - datum),
  };
}
