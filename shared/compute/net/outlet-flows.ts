import { type ChannelCount, wholeFlowLines } from '#shared/compute/net/channels.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { FlowOrder } from '#shared/compute/net/order.ts';

/**
 * Channels that arrive at an outlet, by what the equipotentials round it carry: those of the last line before it, or,
 * where the flow passes it, those of the lines before less those of the lines after it. Negative where it gives more
 * water than it takes. `stated`: channels of the whole flow as stated, a part channel included; null = as counted. Null
 * when no flow line is traced, and where another outlet shares the same ground, so that the lines do not tell whose the
 * water is.
 */
export function channelsInto(
  outlet: string,
  order: FlowOrder,
  channels: ChannelCount,
  heads: NetHeads,
  stated: number | null,
): number | null {
  const carried = channelsCarried(order, channels, stated);
  const passes = order.passed.filter(({ boundary }) => boundary === outlet);
  const lastLines = new Set(
    order.paths.filter((path) => path.outlet === outlet).map(({ lines }) => lines.at(-1)),
  );
  const firstLines = new Set(
    order.paths.filter((path) => path.source === outlet).map(({ lines }) => lines[0]),
  );
  const isShared = (line: string | null | undefined) =>
    order.passed.some(({ boundary, after }) => boundary !== outlet && after === line);
  if ([...lastLines].some(isShared) || passes.some(({ after }) => isShared(after))) return null;
  const flows = [
    ...[...lastLines].map((line) => carried(line)),
    ...[...firstLines].map((line) => negative(carried(line))),
    ...passes.map(({ lines, after }) => (after === null ? null : leftBetween(lines, carried, heads))),
  ];
  if (flows.length === 0) return null;
  return flows.reduce<number | null>((sum, flow) => (sum === null || flow === null ? null : sum + flow), 0);
}

type Carried = (line: string | undefined) => number | null;

/** Channels along a line; where the count is stated with a part channel, the lines across the whole flow carry that. */
function channelsCarried(order: FlowOrder, channels: ChannelCount, stated: number | null): Carried {
  const sides = wholeFlowLines(order);
  const fits = stated !== null && sides.length === 1 && Math.ceil(stated - 0.05) === channels.counted;
  return (line) => {
    if (line === undefined) return null;
    if (fits && sides[0]!.includes(line)) return stated;
    return channels.along.get(line) ?? null;
  };
}

/** What the lines of least drops carry into the ground between them less what the others carry out of it. */
function leftBetween(lines: readonly string[], carried: Carried, heads: NetHeads): number | null {
  const drops = lines.map((id) => heads.byId.get(id)?.drops ?? Number.NaN);
  const least = Math.min(...drops);
  let left = 0;
  for (const [i, line] of lines.entries()) {
    const flow = carried(line);
    if (flow === null || Number.isNaN(drops[i]!)) return null;
    left += drops[i] === least ? flow : -flow;
  }
  return left;
}

function negative(flow: number | null): number | null {
  return flow === null ? null : -flow;
}
