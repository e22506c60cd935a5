import { makeFinding } from '#shared/compute/findings.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { distanceToPolyline, firstOf, lastOf, lengthOf } from '#shared/compute/geometry/polyline.ts';
import type { FootedLine } from '#shared/compute/net/feet.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { FlowOrder } from '#shared/compute/net/order.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** Channels along one equipotential; `complete` is false where an outermost flow line is no real boundary. */
export type LineChannels = { readonly channels: number; readonly complete: boolean };

export type ChannelCount = {
  /** Channels of the whole flow from the headwater; null when no flow line is traced. */
  readonly counted: number | null;
  /** False when an outermost traced flow line is no real boundary: the figure is of the traced channels only. */
  readonly complete: boolean;
  /** Channels along each equipotential, by its id. */
  readonly along: ReadonlyMap<string, number>;
  readonly findings: readonly Finding[];
};

/**
 * Counts flow channels: the intervals along one equipotential across the whole flow, boundary flow lines (an
 * impervious base, the outline of a structure, the phreatic line) included. Only equipotentials across the whole flow
 * are asked, those before any water has left or come in: the count met on most of them is taken, and the others are
 * reported. Where the headwater gives water to several sides, their counts are added. Shapes and `slack`, within which a
 * flow line and a foot are one place, in working pixels.
 */
export function countChannels(
  equipotentials: ReadonlyArray<{ readonly id: string; readonly footed: FootedLine }>,
  flowLines: readonly NetLine[],
  order: Pick<FlowOrder, 'paths' | 'passed' | 'place'>,
  slack: number,
): ChannelCount {
  const nothing = { counted: null, complete: false, along: new Map(), findings: [] };
  if (flowLines.length === 0 || equipotentials.length === 0) return nothing;
  const counts = new Map(
    equipotentials.map(({ id, footed }) => [id, channelsAlong(footed, flowLines, slack)]),
  );
  const partial = new Set(equipotentials.filter(({ footed }) => endsInOutlet(footed)).map(({ id }) => id));
  const sides = wholeFlowLines(order)
    .map((ids) => ids.filter((id) => !partial.has(id)))
    .filter((ids) => ids.length > 0)
    .map((ids) => countSide(ids, counts));
  // While nothing is in order, the lines as they are traced propose the count.
  const known = sides.length > 0 ? sides : [countSide([...counts.keys()], counts)];
  return {
    counted: known.reduce((sum, side) => sum + side.counted, 0),
    complete: known.every((side) => side.complete),
    along: new Map([...counts].map(([id, { channels }]) => [id, channels])),
    findings: known.flatMap((side) => side.findings),
  };
}

function countSide(ids: readonly string[], counts: ReadonlyMap<string, LineChannels>) {
  const counted = commonest(ids.map((id) => counts.get(id)!.channels));
  const agreeing = ids.filter((id) => counts.get(id)!.channels === counted);
  const others = ids.filter((id) => !agreeing.includes(id));
  return {
    counted,
    complete: agreeing.every((id) => counts.get(id)!.complete),
    findings: others.length === 0 ? [] : [disagreement(counted, others)],
  };
}

/** A line that ends on a face of free outflow, or on a boundary that the flow passes, is not across the whole flow. */
function endsInOutlet({ start, end }: FootedLine): boolean {
  return [start, end].some((foot) => foot?.carrier.held !== undefined);
}

/**
 * The equipotentials across all that the headwater gives to one side: in the order of the flow, until the flow parts,
 * joins another or passes an outlet. One list for each side.
 */
export function wholeFlowLines({ paths, passed }: Pick<FlowOrder, 'paths' | 'passed'>): string[][] {
  const [main] = paths;
  if (main === undefined) return [];
  const firsts = [
    ...new Set(
      paths.filter(({ source }) => source === main.source).flatMap(({ lines }) => lines.slice(0, 1)),
    ),
  ];
  return firsts.map((first) => {
    const own = paths.filter(({ lines }) => lines[0] === first);
    const others = paths.filter(({ lines }) => lines[0] !== first);
    const whole: string[] = [];
    for (const id of own[0]!.lines) {
      const isCommon = own.every(({ lines }) => lines.includes(id));
      if (!isCommon || others.some(({ lines }) => lines.includes(id))) break;
      whole.push(id);
      if (passed.some(({ after }) => after === id)) break;
    }
    return whole;
  });
}

function channelsAlong(footed: FootedLine, flowLines: readonly NetLine[], slack: number): LineChannels {
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
      if (distanceToPolyline(flowLine.shape, end[0], end[1]) <= near) add(s);
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

function disagreement(counted: number, others: readonly string[]): Finding {
  const text = `Along ${others.length} of the equipotentials the channels do not come to ${counted}. Check that every flow line runs from the headwater to the outlet.`;
  return makeFinding('question', 'channelsDisagree', text, {
    cell: 'channels',
    entityIds: others,
  });
}
