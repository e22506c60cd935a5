import { sheetPx } from '#shared/compute/frames.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { SectionChain, SectionCondition } from '#shared/compute/independent/section-problem.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';

/** A traced line with what holds along it; shape in pixels. */
export type TracedChain = { readonly shape: Polyline; readonly condition: SectionCondition };

/**
 * Traced lines as chains of an outline in section coordinates. What a hand leaves is made good up to `reach` (pixels):
 * a boundary that runs on past a closed line that it meets ends there, so that no head leaks round a wall's foot; an
 * end that stops short of another line is joined to it by a closed piece.
 */
export function chainsOfTraces(
  traces: readonly TracedChain[],
  map: SectionMap,
  reach: number,
): SectionChain[] {
  const closed = traces.filter(({ condition }) => condition.kind === 'closed');
  const trimmed = traces.flatMap((trace) => {
    const shape = trace.condition.kind === 'closed' ? trace.shape : trimmedAt(trace.shape, closed, reach);
    return shape === null ? [] : [{ ...trace, shape }];
  });
  const toSection = (points: readonly Pair[]) =>
    points.map(([x, y]): Pair => {
      const place = map.toSection(sheetPx(x, y));
      return [place[0], place[1]];
    });
  const bridges = trimmed.flatMap((trace) => bridgesOf(trace, trimmed, reach));
  return [
    ...trimmed.map(({ shape, condition }) => ({ points: toSection(verticesOf(shape)), condition })),
    ...bridges.map((points) => ({ points: toSection(points), condition: BRIDGE })),
  ];
}

const BRIDGE: SectionCondition = { kind: 'closed', id: 'bridge' };

/** A boundary without what sticks out past a closed line by less than the reach; null when nothing is left. */
function trimmedAt(shape: Polyline, closed: readonly TracedChain[], reach: number): Polyline | null {
  const whole = lengthOf(shape);
  let [from, to] = [0, whole];
  for (const { s } of closed.flatMap((other) => crossingsOf(shape, other.shape))) {
    if (s <= reach && s < whole / 2) from = Math.max(from, s);
    else if (s >= whole - reach && s > whole / 2) to = Math.min(to, s);
  }
  return from === 0 && to === whole ? shape : polylineOf(pieceOf(shape, from, to));
}

/** Pieces from the ends of a line to the nearest place of another one within the reach, where they do not meet it. */
function bridgesOf({ shape }: TracedChain, all: readonly TracedChain[], reach: number): Pair[][] {
  const vertices = verticesOf(shape);
  return [vertices[0]!, vertices.at(-1)!].flatMap((end) => {
    const nearest = all
      .filter((other) => other.shape !== shape)
      .map((other) => nearestOnPolyline(other.shape, ...end))
      .reduce<{ distance: number; at: Pair } | null>(
        (best, each) => (best === null || each.distance < best.distance ? each : best),
        null,
      );
    return nearest !== null && nearest.distance > 0 && nearest.distance <= reach ? [[end, nearest.at]] : [];
  });
}
