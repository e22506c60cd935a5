import { plainText } from '#client/lib/figures.ts';
import { netCheckText as text } from '#client/text/net-check.ts';
import type { LineReading } from '#shared/contract/reading.ts';
import type { NetCheckReading, NetFault } from '#shared/contract/reading-net-check.ts';

/** Where a poor cell or angle lies, by the heads that the lines beside it carry on the sheet. */
export function faultPlace(
  { of, index }: Pick<NetFault, 'of' | 'index'>,
  check: NetCheckReading,
  lines: readonly LineReading[],
): string {
  if (of === 'cells') {
    const cell = check.cells[index];
    if (cell === undefined) return '';
    const between = text.between(lineName(cell.before, lines), lineName(cell.after, lines));
    return check.hasChannels ? `${between}, ${text.inChannel(cell.channel + 1)}` : between;
  }
  const meeting = check.meetings[index];
  return meeting === undefined ? '' : text.on(lineName(meeting.lines[0], lines));
}

function lineName(id: string, lines: readonly LineReading[]): string {
  const line = lines.find((each) => each.id === id);
  if (line === undefined) return text.aLine;
  if (line.head !== null) return plainText(line.head, 6);
  return line.drops === null ? text.aLine : text.drop(plainText(line.drops, 3));
}
