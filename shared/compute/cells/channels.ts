import type { NetCell } from '#shared/compute/cells/cells.ts';
import { type CellFacts, cellFlow } from '#shared/compute/cells/common-ratio.ts';
import { groupedBy } from '#shared/compute/cells/grouped.ts';
import type { Rail } from '#shared/compute/cells/rails.ts';

/** The cells between two rails from the headwater to the outlet. */
export type CellChannel = {
  /** Ids of its flow lines; null where a traced boundary bounds it, which may be made of several lines. */
  readonly left: string | null;
  readonly right: string | null;
  /** True when a boundary, or nothing but the outermost traced flow line, lies on one of its sides. */
  readonly isOutermost: boolean;
  readonly cells: readonly NetCell[];
  /**
   * Flow along it for each drop and unit permeability: its drops over its resistance, ΣΔNd / Σ(L/B·kc/k), as cells lie
   * one behind the other; null when none of its cells is judged.
   */
  readonly flow: number | null;
};

/**
 * The channels of a net from left to right along the flow. Cells of one channel have the same flow lines at their
 * sides; a boundary counts as one side all along, whatever lines it is traced in.
 */
export function channelsOf(cells: readonly NetCell[], facts: CellFacts): CellChannel[] {
  const groups = groupedBy(cells, ({ left, right }) => `${sideOf(left)} ${sideOf(right)}`);
  const channels = groups.map((members): CellChannel => {
    const { left, right } = members[0]!;
    return {
      left: flowLineOf(left),
      right: flowLineOf(right),
      isOutermost: members.some((cell) => cell.left.edge !== null || cell.right.edge !== null),
      cells: members,
      flow: flowAlong(members, facts),
    };
  });
  return inOrder(channels);
}

function flowLineOf(rail: Rail): string | null {
  return rail.kind === 'flowLine' ? rail.id : null;
}

function sideOf(rail: Rail): string {
  return flowLineOf(rail) ?? rail.edge ?? rail.id;
}

function flowAlong(cells: readonly NetCell[], facts: CellFacts): number | null {
  let drops = 0;
  let resistance = 0;
  for (const cell of cells) {
    const flow = cellFlow(cell, facts);
    if (flow === null) continue;
    const between = facts.dropsBetween(cell.before, cell.after);
    drops += between;
    resistance += between / flow;
  }
  return resistance > 0 ? drops / resistance : null;
}

/** From the left: each channel after the one whose right side is its left. */
function inOrder(channels: readonly CellChannel[]): CellChannel[] {
  const rest = new Set(channels);
  const sorted: CellChannel[] = [];
  while (rest.size > 0) {
    const isLed = (channel: CellChannel) =>
      channel.left !== null && [...rest].some((other) => other !== channel && other.right === channel.left);
    let next = [...rest].find((channel) => !isLed(channel)) ?? [...rest][0];
    while (next !== undefined) {
      rest.delete(next);
      sorted.push(next);
      const { right } = next;
      next = right === null ? undefined : [...rest].find((channel) => channel.left === right);
    }
  }
  return sorted;
}
