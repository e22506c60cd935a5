import type { NetCell } from '#shared/compute/cells/cells.ts';
import type { CellChannel } from '#shared/compute/cells/channels.ts';
import { type CellFacts, middleValue, soilOfCell, tremorOf } from '#shared/compute/cells/common-ratio.ts';
import type { NetMeeting } from '#shared/compute/net-check/crossings.ts';
import { cellEffect, meetingEffect } from '#shared/compute/net-check/effects.ts';
import {
  ANGLE_KNOWN_DEG,
  ANGLE_SURE,
  ANGLE_TOLD,
  CELL_SURE,
  CELL_TOLD,
  CHANNEL_TOLD,
} from '#shared/compute/net-check/thresholds.ts';
import type { CheckedCell, CheckedChannel, NetJudgement } from '#shared/contract/reading-net-check.ts';

/** How a channel compares with the others: its flow over the middle one of the whole channels. */
export type ChannelShare = Pick<CheckedChannel, 'share' | 'judgement'>;

/**
 * Flow of each channel beside the middle one of the inner channels, which are whole channels by their making (of all,
 * where there are fewer than three). An outermost channel that carries clearly less is a part channel, which is no
 * fault; any other that differs by more than a fifth is poor. `expected`: flow of a channel of square or rectangular
 * cells as entered, to choose between two middle ones.
 */
export function shareChannels(channels: readonly CellChannel[], expected: number): ChannelShare[] {
  const flowsOf = (members: readonly CellChannel[]) =>
    members.map(({ flow }) => flow).filter((flow) => flow !== null);
  const inner = flowsOf(channels.filter((channel) => !channel.isOutermost));
  const middle = middleValue(inner.length > 0 ? inner : flowsOf(channels), expected);
  return channels.map(({ flow, isOutermost }): ChannelShare => {
    if (flow === null || middle === null) return { share: null, judgement: 'notJudged' };
    const share = flow / middle;
    if (isOutermost && share < 1 - CHANNEL_TOLD) return { share, judgement: 'partChannel' };
    return { share, judgement: Math.abs(share - 1) > CHANNEL_TOLD ? 'poor' : 'good' };
  });
}

export type JudgedCell = {
  readonly judgement: NetJudgement;
  readonly reason: CheckedCell['reason'];
  /** B/L that it should have; null when it is not judged. */
  readonly expected: number | null;
  readonly effectDrops: number | null;
};

/**
 * Judges one cell by the B/L that its net has in common: expected = ρ·(kc/k)·part/ΔNd, ρ = `judgedBy`, with the part of
 * a channel for a part channel. Poor when, for certain, its effect is more than a fifth of the head that it is drawn for.
 */
export function judgeCell(
  cell: NetCell,
  judgedBy: number,
  part: number,
  facts: CellFacts,
  accuracyPx: number,
): JudgedCell {
  if (cell.notJudged !== null) return unjudged(cell.notJudged);
  const k = soilOfCell(cell, facts);
  if (k === 'unknown') return unjudged('unknownSoil');
  if (k === 'several') return unjudged('severalSoils');
  const drops = facts.dropsBetween(cell.before, cell.after);
  const expected = (judgedBy * part) / (k * drops);
  if (!Number.isFinite(expected) || !(expected > 0)) return unjudged('unknownSoil');
  const effectDrops = cellEffect(cell, expected, drops);
  const tremor = (CELL_SURE * drops * expected * tremorOf(cell, accuracyPx)) / cell.ratio;
  const isPoor = effectDrops - tremor > CELL_TOLD * drops;
  return { judgement: isPoor ? 'poor' : 'good', reason: null, expected, effectDrops };
}

export function unjudged(reason: NonNullable<CheckedCell['reason']>): JudgedCell {
  return { judgement: 'notJudged', reason, expected: null, effectDrops: null };
}

/** Judges one angle: poor when it moves the head half a cell away by more than a tenth of a drop for certain. */
export function judgeMeeting(meeting: NetMeeting): { judgement: NetJudgement; effectDrops: number } {
  const off = 90 - meeting.angleDeg;
  const effectDrops = meetingEffect(meeting, off);
  if (2 * meeting.tremorDeg > ANGLE_KNOWN_DEG) return { judgement: 'notJudged', effectDrops };
  const certain = off - ANGLE_SURE * meeting.tremorDeg;
  const isPoor = certain > 0 && meetingEffect(meeting, certain) > ANGLE_TOLD;
  return { judgement: isPoor ? 'poor' : 'good', effectDrops };
}
