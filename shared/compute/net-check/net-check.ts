import type { NetCells } from '#shared/compute/cells/cells.ts';
import { type CellChannel, channelsOf } from '#shared/compute/cells/channels.ts';
import { type CellFacts, commonRatioOf } from '#shared/compute/cells/common-ratio.ts';
import { lengthOfPoints, outlineOf } from '#shared/compute/cells/quadrilateral.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { meetingsOf, type NetMeeting } from '#shared/compute/net-check/crossings.ts';
import { effectOf } from '#shared/compute/net-check/effects.ts';
import { faultsOf } from '#shared/compute/net-check/faults.ts';
import {
  type ChannelShare,
  judgeCell,
  judgeMeeting,
  shareChannels,
  unjudged,
} from '#shared/compute/net-check/judge.ts';
import { measuredFlowOf } from '#shared/compute/net-check/measured-flow.ts';
import { factsOf, headPerDropBetween } from '#shared/compute/net-check/net-facts.ts';
import { summaryOf } from '#shared/compute/net-check/summary.ts';
import { shapeText } from '#shared/compute/net-check/words.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { CheckedCell, CheckedMeeting, NetCheckReading } from '#shared/contract/reading-net-check.ts';

export type NetCheckInputs = {
  readonly model: NetModel;
  readonly cells: NetCells;
  readonly heads: NetHeads;
  /** B/L as entered, 1 for squares. */
  readonly enteredRatio: number;
  /** Tracing accuracy, working pixels. */
  readonly accuracyPx: number;
  /** Unit weight of water, kN/m³ or lb/ft³. */
  readonly gammaW: number;
  /** Seepage and channels as stated and counted, for the seepage by the measured cells. */
  readonly quantities: Pick<NetReading['quantities'], 'seepage' | 'channels'>;
  readonly relativeK: CellFacts['relativeK'];
  /** False where soils of unlike anisotropy share no section in which cells are squares: then nothing is judged. */
  readonly hasCommonSection: boolean;
  /** Working pixels to pixels of the sheet. */
  readonly toSheet: (place: Pair) => Pair;
};

/**
 * Checks the drawing of a net: each cell against the B/L that all have in common, each crossing and each angle at a
 * boundary against a right angle, the channels against one another; each with its first-order effect on the heads beside
 * it, and all of them summed up in a line. See `judge.ts` and `effects.ts` for the rules. A net can be good by all of
 * them and still belong to other boundaries than the dam has. Never throws; a net without cells has an empty check.
 */
export function netCheckOf(inputs: NetCheckInputs): NetCheckReading {
  const { model, cells: net, heads, enteredRatio, accuracyPx } = inputs;
  const facts = factsOf(net.cells, heads, enteredRatio, accuracyPx, inputs.relativeK);
  const channels = channelsOf(net.cells, facts);
  const hasChannels = model.lines.some(({ kind }) => kind === 'flowLine');
  const common = commonRatioOf(net.cells, enteredRatio, facts, hasChannels);
  const shares = shareChannels(channels, common.judgedBy);
  const cells = checkedCells(inputs, facts, common.judgedBy, channels, shares);
  const meetings = inputs.hasCommonSection
    ? meetingsOf(model, net, accuracyPx).map((meeting) => checkedMeeting(meeting, inputs, facts))
    : [];
  const checkedChannels = channels.map((channel, i) => ({
    left: channel.left,
    right: channel.right,
    isOutermost: channel.isOutermost,
    cells: channel.cells.length,
    flow: channel.flow,
    ...(inputs.hasCommonSection ? shares[i]! : { share: null, judgement: 'notJudged' as const }),
  }));
  return {
    enteredRatio,
    measuredRatio: common.measured,
    judgedRatio: common.judgedBy,
    hasChannels,
    cells,
    meetings,
    channels: checkedChannels,
    ...measuredFlowOf(inputs, channels),
    faults: faultsOf(cells, meetings, common.judgedBy),
    summary: summaryOf(
      cells,
      meetings,
      checkedChannels,
      shapeText(common.judgedBy, hasChannels),
      inputs.hasCommonSection,
    ),
  };
}

function checkedCells(
  inputs: NetCheckInputs,
  facts: CellFacts,
  judgedBy: number,
  channels: readonly CellChannel[],
  shares: readonly ChannelShare[],
): CheckedCell[] {
  const channelOf = new Map(channels.flatMap(({ cells }, i) => cells.map((cell) => [cell, i] as const)));
  return inputs.cells.cells.map((cell): CheckedCell => {
    const channel = channelOf.get(cell)!;
    const { share, judgement } = shares[channel]!;
    const part = judgement === 'partChannel' ? share! : 1;
    const judged = inputs.hasCommonSection
      ? judgeCell(cell, judgedBy, part, facts, inputs.accuracyPx)
      : unjudged('noCommonSection');
    const { effectDrops, ...rest } = judged;
    return {
      before: cell.before,
      after: cell.after,
      channel,
      outline:
        judged.judgement === 'poor' ? outlineOf(cell.sides).map((place) => onSheet(place, inputs)) : [],
      at: onSheet(cell.measures.middle, inputs),
      length: naturalLength(cell.measures.along, cell.measures.length, inputs.heads),
      width: naturalLength(cell.measures.across, cell.measures.width, inputs.heads),
      ratio: cell.ratio,
      midAngleDeg: cell.measures.midAngleDeg,
      isExit: cell.isExit,
      ...rest,
      effect:
        effectDrops === null
          ? null
          : effectOf(effectDrops, headPerDropBetween(cell, inputs.heads, facts), inputs.gammaW),
    };
  });
}

function checkedMeeting(meeting: NetMeeting, inputs: NetCheckInputs, facts: CellFacts): CheckedMeeting {
  const { judgement, effectDrops } = judgeMeeting(meeting);
  const headPerDrop = headPerDropBetween(meeting.cells[0]!, inputs.heads, facts);
  return {
    kind: meeting.kind,
    lines: [meeting.lines[0], meeting.lines[1]],
    at: onSheet(meeting.at, inputs),
    angleDeg: meeting.angleDeg,
    plusMinusDeg: 2 * meeting.tremorDeg,
    judgement,
    effect: effectOf(effectDrops, headPerDrop, inputs.gammaW),
  };
}

/** A mean length in the natural section: that of working pixels by the ratio of a mid-line there to itself here. */
function naturalLength(midLine: readonly Pair[], length: number, { map }: NetHeads): number {
  const natural = midLine.map(([x, y]) => map.toSection(sheetPx(x, y)));
  return (length * lengthOfPoints(natural)) / lengthOfPoints(midLine);
}

/** On the sheet, to a tenth of a pixel, which is more than any tracing is worth. */
function onSheet(place: Pair, { toSheet }: NetCheckInputs): [number, number] {
  const [x, y] = toSheet(place);
  return [Math.round(10 * x) / 10, Math.round(10 * y) / 10];
}
