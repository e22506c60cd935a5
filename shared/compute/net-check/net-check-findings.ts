import { makeFinding } from '#shared/compute/findings.ts';
import { counted, degrees, ratioText, shapeText } from '#shared/compute/net-check/words.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { NetCheckReading, NetFault } from '#shared/contract/reading-net-check.ts';

/**
 * What the check of a net gives cause to look at: one finding for the cells, one for the angles, one for the channels, at
 * the place with the greatest effect, and one where the cells measure another B/L than was entered. Places are on the
 * sheet.
 */
export function questionNetCheck(check: NetCheckReading, system: UnitSystem): Finding[] {
  return [
    ...cellsFinding(check, system),
    ...anglesFinding(check, system),
    ...channelsFinding(check),
    ...ratioFinding(check),
  ];
}

function cellsFinding(check: NetCheckReading, system: UnitSystem): Finding[] {
  const poor = check.cells.filter(({ judgement }) => judgement === 'poor');
  const worst = check.faults.find((fault) => fault.of === 'cells');
  if (worst === undefined) return [];
  const { ratio, expected } = check.cells[worst.index]!;
  const subject = `${counted(poor.length, 'cell is', 'cells are')} not ${shapeText(check.judgedRatio, check.hasChannels)}`;
  return [
    makeFinding(
      'question',
      'cellsNotSquare',
      `${subject}; the worst has B/L ${ratioText(ratio)} instead of ${ratioText(expected ?? check.judgedRatio)}. ${effectText(worst, system)} Check the lines round it.`,
      {
        cell: 'netCheck',
        entityIds: idsOf(poor.flatMap(({ before, after }) => [before, after])),
        at: worst.at,
      },
    ),
  ];
}

function anglesFinding(check: NetCheckReading, system: UnitSystem): Finding[] {
  const poor = check.meetings.filter(({ judgement }) => judgement === 'poor');
  const worst = check.faults.find((fault) => fault.of === 'meetings');
  if (worst === undefined) return [];
  const { angleDeg } = check.meetings[worst.index]!;
  const text =
    poor.length === 1
      ? `Lines meet at ${degrees(angleDeg)} instead of 90°.`
      : `Lines meet at other than 90° in ${poor.length} places; the one that matters most has ${degrees(angleDeg)}.`;
  return [
    makeFinding(
      'question',
      'anglesNotSquare',
      `${text} ${effectText(worst, system)} Check how the lines run there.`,
      { cell: 'netCheck', entityIds: idsOf(poor.flatMap(({ lines }) => lines)), at: worst.at },
    ),
  ];
}

function channelsFinding(check: NetCheckReading): Finding[] {
  const poor = check.channels.filter(({ judgement }) => judgement === 'poor');
  const [first] = [...poor].sort(
    (a, b) => Math.abs(Math.log(b.share ?? 1)) - Math.abs(Math.log(a.share ?? 1)),
  );
  if (first === undefined) return [];
  const index = check.channels.indexOf(first);
  const cells = check.cells.filter((cell) => cell.channel === index);
  return [
    makeFinding(
      'question',
      'channelFlowsDiffer',
      `By the shape of its cells a channel carries ${ratioText(first.share ?? 1)} times the flow of the others, where all should carry the same. Check the flow lines beside it.`,
      {
        cell: 'channels',
        entityIds: idsOf(poor.flatMap(({ left, right }) => [left, right])),
        at: cells[cells.length >> 1]?.at ?? null,
      },
    ),
  ];
}

function ratioFinding(check: NetCheckReading): Finding[] {
  const { enteredRatio, measuredRatio, judgedRatio, hasChannels } = check;
  if (!hasChannels || measuredRatio === null || judgedRatio === enteredRatio) return [];
  return [
    makeFinding(
      'question',
      'cellRatioDiffers',
      `The cells measure B/L ${ratioText(measuredRatio)}, ${ratioText(enteredRatio)} is entered; the seepage counts with the entered one. Check the ratio, the counts or the missing lines.`,
      { cell: 'channels' },
    ),
  ];
}

function effectText({ effect }: NetFault, system: UnitSystem): string {
  const drops = `${ratioText(effect.drops)} drop`;
  const pressure =
    effect.pressure === null ? '' : ` (${figure(effect.pressure)} ${system === 'SI' ? 'kPa' : 'lb/ft²'})`;
  return `By its shape alone the head beside it may be off by ${drops}${pressure}.`;
}

/** Two significant figures, as an estimate deserves. */
function figure(value: number): string {
  return String(Number(value.toPrecision(2)));
}

function idsOf(ids: ReadonlyArray<string | null>): string[] {
  return [...new Set(ids.filter((id) => id !== null))];
}
