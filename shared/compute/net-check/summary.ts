import { counted, degrees } from '#shared/compute/net-check/words.ts';
import type {
  CheckedCell,
  CheckedChannel,
  CheckedMeeting,
  NetCheckReading,
} from '#shared/contract/reading-net-check.ts';

/** The check of a net in counts and in one line for the title block; `shape`: what its cells should be, see `shapeText`. */
export function summaryOf(
  cells: readonly CheckedCell[],
  meetings: readonly CheckedMeeting[],
  channels: readonly CheckedChannel[],
  shape: string,
  hasCommonSection: boolean,
): NetCheckReading['summary'] {
  const judged = <T extends { judgement: string }>(items: readonly T[]) =>
    items.filter(({ judgement }) => judgement !== 'notJudged').length;
  const poor = <T extends { judgement: string }>(items: readonly T[]) =>
    items.filter(({ judgement }) => judgement === 'poor');
  const parts = [
    ...cellsText(poor(cells).length, shape),
    ...anglesText(
      poor(meetings).filter(({ kind }) => kind === 'crossing'),
      'crossing',
      'crossings',
    ),
    ...anglesText(
      poor(meetings).filter(({ kind }) => kind !== 'crossing'),
      'boundary angle',
      'boundary angles',
    ),
    ...channelsText(poor(channels).length),
  ];
  return {
    cellsJudged: judged(cells),
    cellsPoor: poor(cells).length,
    anglesJudged: judged(meetings),
    anglesPoor: poor(meetings).length,
    channelsPoor: poor(channels).length,
    text: parts.length > 0 ? parts.join(', ') : nothingPoor(judged(cells), shape, hasCommonSection),
  };
}

function cellsText(count: number, shape: string): string[] {
  return count === 0 ? [] : [`${counted(count, 'cell', 'cells')} not ${shape}`];
}

function anglesText(poor: readonly CheckedMeeting[], one: string, many: string): string[] {
  if (poor.length === 0) return [];
  const sharpest = degrees(Math.min(...poor.map(({ angleDeg }) => angleDeg)));
  return [
    poor.length === 1 ? `1 ${one} at ${sharpest}` : `${poor.length} ${many} off square, down to ${sharpest}`,
  ];
}

function channelsText(count: number): string[] {
  return count === 0 ? [] : [`${counted(count, 'channel carries', 'channels carry')} another flow`];
}

function nothingPoor(cellsJudged: number, shape: string, hasCommonSection: boolean): string {
  if (!hasCommonSection) return 'Cells not judged: the soils share no transformed section';
  if (cellsJudged === 0) return 'No cells to judge: trace flow lines and boundaries';
  return `${counted(cellsJudged, 'cell', 'cells')} ${shape}, no angle off square`;
}
