import type { HeadField, HeadProblem } from '#shared/compute/independent/head-field.ts';
import type { PieceFlow } from '#shared/compute/independent/section-solution.ts';

/**
 * What flows in through the pieces of each id: the sum of the consistent nodal flows K·h along them, which balance to
 * rounding (Hughes, Engel, Mazzei and Larson 2000). A node shared by pieces of two ids is shared by the lengths of its sides. Ids in
 * the order of the conditions; closed pieces are left out.
 */
export function pieceFlows({ mesh, conditions }: HeadProblem, { inflow, held }: HeadField): PieceFlow[] {
  const shares = new Map<number, Map<string, number>>();
  for (const { nodes, label } of mesh.sides) {
    const condition = conditions[label];
    if (condition === undefined || condition.kind === 'closed' || Number.isNaN(held[nodes[1]]!)) continue;
    const length = Math.hypot(mesh.x[nodes[2]]! - mesh.x[nodes[0]]!, mesh.y[nodes[2]]! - mesh.y[nodes[0]]!);
    for (const node of nodes) {
      const byId = shares.get(node) ?? new Map<string, number>();
      byId.set(condition.id, (byId.get(condition.id) ?? 0) + length);
      shares.set(node, byId);
    }
  }
  const sums = new Map<string, number>();
  for (const condition of conditions) if (condition.kind !== 'closed') sums.set(condition.id, 0);
  for (const [node, byId] of shares) {
    const whole = [...byId.values()].reduce((a, b) => a + b, 0);
    for (const [id, length] of byId) sums.set(id, sums.get(id)! + (inflow[node]! * length) / whole);
  }
  return [...sums].map(([id, sum]) => ({ id, inflow: sum }));
}
