import { degrees, meetingText, ratioText } from '#shared/compute/net-check/words.ts';
import type { CheckedCell, CheckedMeeting, NetFault } from '#shared/contract/reading-net-check.ts';

/**
 * The poor cells and angles in the order of their effect on the heads, greatest first: in drops, and where the heads per
 * drop differ in heads.
 */
export function faultsOf(
  cells: readonly CheckedCell[],
  meetings: readonly CheckedMeeting[],
  judgedBy: number,
): NetFault[] {
  const ofCells = cells.flatMap((cell, index): NetFault[] =>
    cell.judgement === 'poor' && cell.effect !== null
      ? [{ of: 'cells', index, at: cell.at, text: cellText(cell, judgedBy), effect: cell.effect }]
      : [],
  );
  const ofMeetings = meetings.flatMap((meeting, index): NetFault[] =>
    meeting.judgement === 'poor'
      ? [
          {
            of: 'meetings',
            index,
            at: meeting.at,
            text: `${meetingText(meeting.kind)} at ${degrees(meeting.angleDeg)}.`,
            effect: meeting.effect,
          },
        ]
      : [],
  );
  const size = ({ effect }: NetFault) => effect.head ?? effect.drops;
  return [...ofCells, ...ofMeetings].sort((a, b) => size(b) - size(a));
}

function cellText(cell: CheckedCell, judgedBy: number): string {
  return `A cell has B/L ${ratioText(cell.ratio)} instead of ${ratioText(cell.expected ?? judgedBy)}.`;
}
