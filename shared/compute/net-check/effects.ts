import type { NetCell } from '#shared/compute/cells/cells.ts';
import type { NetMeeting } from '#shared/compute/net-check/crossings.ts';
import type { NetEffect } from '#shared/contract/reading-net-check.ts';

/**
 * By how many drops the head beside a cell may be off, from its shape alone. Between two flow lines the head lost over
 * each cell goes with its resistance L/B (Forchheimer), so that a cell drawn for ΔNd drops loses ΔNd·R/R' of them, with
 * R' = 1/`expected` that of its neighbours: effect = ΔNd·|expected/(B/L) − 1|, the shift of one of its two head lines
 * while the other stays. First order: the flow lines are taken as right. Dimensionless.
 */
export function cellEffect(cell: NetCell, expected: number, drops: number): number {
  return drops * Math.abs(expected / cell.ratio - 1);
}

/**
 * By how many drops the head beside a crossing may be off, from its angle alone. A head line that leaves the right angle
 * by δ has strayed by tan δ·b/2 along the flow when it has gone half a cell across it, and a drop is L long there:
 * effect = ½·(b/L)·tan δ with b the lesser of B and L, since it turns back to its way within a cell. First order: the flow
 * line is taken as right. `offDeg`: δ, below 90 degrees; L, B in one unit.
 */
export function meetingEffect(
  { length, width }: Pick<NetMeeting, 'length' | 'width'>,
  offDeg: number,
): number {
  const slope = Math.tan((Math.min(offDeg, MOST_OFF_DEG) * Math.PI) / 180);
  return (0.5 * Math.min(width, length) * slope) / length;
}

/** Lines that meet at a sharper angle than this run along one another; their effect is not extrapolated further. */
const MOST_OFF_DEG = 80;

/**
 * An effect in drops as a head and a pressure: head = drops·Δh with Δh the head per drop there, pressure = γw·head.
 * Null without a head per drop. γw in kN/m³ or lb/ft³.
 */
export function effectOf(drops: number, headPerDrop: number | null, gammaW: number): NetEffect {
  const head = headPerDrop === null ? null : drops * headPerDrop;
  const pressure = head === null ? null : gammaW * head;
  const finite = (value: number | null) => (value !== null && Number.isFinite(value) ? value : null);
  return { drops, head: finite(head), pressure: finite(pressure) };
}
