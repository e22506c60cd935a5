import { makeFinding } from '#shared/compute/findings.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { firstOf, lastOf, lengthOf, nearestOnPolyline } from '#shared/compute/geometry/polyline.ts';
import type { FootedLine } from '#shared/compute/net/feet.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding } from '#shared/contract/reading.ts';

export type ChannelCount = {
  /** Channels counted along the equipotentials; null when no flow line is traced. */
  readonly counted: number | null;
  /** False when an outermost traced flow line is no real boundary: the figure is of the traced channels only. */
  readonly complete: boolean;
  readonly findings: readonly Finding[];
};

/**
 * Counts flow channels: the intervals along one equipotential across the whole flow, boundary flow lines (an
 * impervious base, the outline of a structure, the phreatic line) included. The count met on most equipotentials is
 * taken, and equipotentials that say otherwise are reported. Shapes and `slack`, within which a flow line and a foot
 * are one place, in base-raster pixels.
 */
export function countChannels(
  equipotentials: ReadonlyArray<{ readonly id: string; readonly footed: FootedLine }>,
  flowLines: readonly NetLine[],
  slack: number,
): ChannelCount {
  if (flowLines.length === 0 || equipotentials.length === 0) {
    return { counted: null, complete: false, findings: [] };
  }
  const counts = equipotentials.map(({ id, footed }) => ({ id, ...channelsAlong(footed, flowLines, slack) }));
  const counted = commonest(counts.map((count) => count.channels));
  const others = counts.filter((count) => count.channels !== counted);
  const agreeing = counts.filter((count) => count.channels === counted);
  const findings = others.length === 0 ? [] : [disagreement(counted, others)];
  return { counted, complete: agreeing.every((count) => count.complete), findings };
}

function channelsAlong(
  footed: FootedLine,
  flowLines: readonly NetLine[],
  slack: number,
): { channels: number; complete: boolean } {
  const { shape } = footed;
  const length = lengthOf(shape);
  const near = Math.min(slack, 0.1 * length);
  const places: number[] = [];
  const add = (s: number) => {
    if (!places.some((place) => Math.abs(place - s) <= near)) places.push(s);
  };
  const realStart = footed.start?.carrier.real ?? false;
  const realEnd = footed.end?.carrier.real ?? false;
  if (realStart) add(0);
  if (realEnd) add(length);
  for (const flowLine of flowLines) {
    for (const crossing of crossingsOf(shape, flowLine.shape)) add(crossing.s);
    for (const [end, s] of [[firstOf(shape), 0] as const, [lastOf(shape), length] as const]) {
      if (nearestOnPolyline(flowLine.shape, end[0], end[1]).distance <= near) add(s);
    }
  }
  return { channels: Math.max(0, places.length - 1), complete: realStart && realEnd };
}

/** The value that occurs most often; of equals the greater, as a line stopped short counts too few. */
function commonest(values: readonly number[]): number {
  const tally = new Map<number, number>();
  for (const value of values) tally.set(value, (tally.get(value) ?? 0) + 1);
  return [...tally].sort((a, b) => b[1] - a[1] || b[0] - a[0])[0]?.[0] ?? 0;
}

function disagreement(counted: number, others: ReadonlyArray<{ id: string; channels: number }>): Finding {
  const text = `Along ${others.length} of the equipotentials the channels do not come to ${counted}. Check that every flow line runs from the headwater to the outlet.`;
  return makeFinding('question', 'channelsDisagree', text, {
    cell: 'channels',
    entityIds: others.map((other) => other.id),
  });
}
