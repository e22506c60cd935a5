import type { NetCell } from '#shared/compute/cells/cells.ts';
import { channelsOf } from '#shared/compute/cells/channels.ts';
import {
  type CellFacts,
  cellFlow,
  commonRatioOf,
  middleValue,
  tremorOf,
} from '#shared/compute/cells/common-ratio.ts';
import { cellsByStrip } from '#shared/compute/cells/grouped.ts';

/** A part drop or a part channel as the shape of its cells says; `part` 1 for a whole one. */
export type PartOfLast = {
  readonly part: number;
  /** ± at 95 % from the tracing accuracy and the spread of the cells. */
  readonly plusMinus: number;
  readonly cells: number;
};

export type PartDrop = PartOfLast & { readonly before: string; readonly outlet: string };
export type PartChannel = PartOfLast & { readonly left: string | null; readonly right: string | null };

/** Standard over middle deviation of normally spread values. */
const DEVIATION = 1.4826;

/**
 * The part of a drop that is left to each outlet, and the part of a channel that each outermost channel makes, from
 * the shape of the squares: a part drop's cells are shorter for their width than the others, part = ρ/(B/L); a part
 * channel's are narrower, part = (B/L)/ρ, with ρ the B/L that the other cells have in common (`entered` where they
 * measure about that). Each is the middle value of its judged cells. `facts.dropsBetween` must be 1 for the strips to
 * the outlets. `accuracyPx`: tracing accuracy, working pixels. Source: Casagrande (1937), Seepage through dams, on the
 * last drop of a net. Outlets and channels none of whose cells is judged are left out.
 */
export function partsOfLast(
  cells: readonly NetCell[],
  entered: number,
  facts: CellFacts,
  accuracyPx: number,
): { readonly drops: readonly PartDrop[]; readonly channels: readonly PartChannel[] } {
  const channels = channelsOf(cells, facts);
  const edge = new Set(channels.filter((channel) => channel.isOutermost).flatMap((channel) => channel.cells));
  const whole = cells.filter((cell) => !cell.isExit && (channels.length < 3 || !edge.has(cell)));
  const { judgedBy } = commonRatioOf(whole.length > 0 ? whole : cells, entered, facts);
  const partOf = (members: readonly NetCell[], part: (flow: number) => number) =>
    partFrom(
      members.flatMap((cell) => {
        const flow = cellFlow(cell, facts);
        return flow === null ? [] : [{ cell, part: part(flow) }];
      }),
      accuracyPx,
    );
  return {
    drops: cellsByStrip(cells.filter((cell) => cell.isExit)).flatMap((members) => {
      const inner = members.filter((cell) => channels.length < 3 || !edge.has(cell));
      const found = partOf(inner.length > 0 ? inner : members, (flow) => judgedBy / flow);
      return found === null ? [] : [{ ...found, before: members[0]!.before, outlet: members[0]!.after }];
    }),
    channels: channels
      .filter((channel) => channel.isOutermost)
      .flatMap(({ cells: members, left, right }) => {
        const inner = members.filter((cell) => !cell.isExit);
        const found = partOf(inner, (flow) => flow / judgedBy);
        return found === null ? [] : [{ ...found, left, right }];
      }),
  };
}

function partFrom(
  parts: ReadonlyArray<{ cell: NetCell; part: number }>,
  accuracyPx: number,
): PartOfLast | null {
  const values = parts.map(({ part }) => part);
  const part = middleValue(values, 1);
  if (part === null) return null;
  const deviations = values.map((value) => Math.abs(value - part)).sort((a, b) => a - b);
  const tremors = parts.map(({ cell }) => part * tremorOf(cell, accuracyPx));
  const standard =
    Math.max(DEVIATION * deviations[deviations.length >> 1]!, ...tremors) / Math.sqrt(parts.length);
  return { part, plusMinus: 2 * standard, cells: parts.length };
}
