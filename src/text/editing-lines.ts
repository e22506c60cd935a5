import type { LineOp } from '#client/features/desk/model/pending-edit.ts';
import { deskToolText } from '#client/text/desk-tools.ts';
import type { DocumentEntity, TracedLine } from '#shared/contract/document.ts';
import { inLanguage } from './language.ts';

const counted = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;

/** "3 lines", "2 lines and 1 reading point": what is chosen, by kinds. */
function thingsWord(values: readonly DocumentEntity[]): string {
  const count = (kind: DocumentEntity['kind']) => values.filter((value) => value.kind === kind).length;
  const [lines, points, profiles] = [count('line'), count('readingPoint'), count('profile')];
  const parts = [
    lines > 0 ? counted(lines, 'line', 'lines') : '',
    points > 0 ? counted(points, 'reading point', 'reading points') : '',
    profiles > 0 ? counted(profiles, 'profile', 'profiles') : '',
  ].filter((part) => part !== '');
  return parts.length < 2 ? parts.join('') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`;
}

/** One thing by its name or kind, several by their number, as it stands in the name of a step. */
function thingsOrOne(values: readonly DocumentEntity[]): string {
  const [only, ...more] = values;
  if (only === undefined || more.length > 0) return thingsWord(values);
  if (only.kind === 'line') return article(deskToolText.lineWord(only));
  return 'name' in only && only.name !== '' ? only.name : thingsWord(values);
}

function article(words: string): string {
  return /^[aeiou]/.test(words) ? `an ${words}` : `a ${words}`;
}

type Line = Pick<TracedLine, 'line' | 'name'>;
const aLine = (line: Line) => article(deskToolText.lineWord(line));
const theLine = (line: Line) => `the ${deskToolText.lineWord(line)}`;

/** Names of the steps taken with chosen lines, as undo and the activity list show them. */
const enEditLabels = {
  split: (line: Line) => `split ${aLine(line)}`,
  join: (line: Line) => `joined two lines: ${deskToolText.lineWord(line)}`,
  trim: (line: Line) => `trimmed ${aLine(line)}`,
  extend: (line: Line) => `extended ${aLine(line)}`,
  reverse: (values: readonly DocumentEntity[]) => `turned ${thingsOrOne(values)} round`,
  smooth: (values: readonly DocumentEntity[]) => `smoothed ${thingsOrOne(values)}`,
  moved: (values: readonly DocumentEntity[]) => `moved ${thingsOrOne(values)}`,
  copied: (values: readonly DocumentEntity[]) => `copied ${thingsOrOne(values)}`,
  removed: (values: readonly DocumentEntity[]) => `removed ${thingsOrOne(values)}`,
  kind: (count: number, kind: string) =>
    `changed ${counted(count, 'line', 'lines')} to: ${kind.toLowerCase()}`,
  movedVertex: (line: Line) => `moved a point of ${aLine(line)}`,
  removedVertex: (line: Line) => `removed a point of ${aLine(line)}`,
  insertedVertex: (line: Line) => `put a point into ${aLine(line)}`,
  typedVertex: (line: Line, number: number) => `typed point ${number} of ${aLine(line)}`,
} as const;
export const editLabels = inLanguage({ en: enEditLabels });

/** Why something cannot be done with chosen lines, and what to do instead. */
const enEditRefusals = {
  readOnly: 'This net can be looked at but not changed here.',
  drawing: 'A line is being drawn. Finish it with Enter first.',
  noneChosen: 'No line is chosen. Click one first.',
  oneAtATime: 'This goes with one line at a time. Click the line on its own first.',
  locked: 'What is chosen is locked. Unlock its kind first.',
  nothingChosen: 'Nothing is chosen. Click a line or a point first.',
  nothingCopied: 'Nothing has been copied yet.',
  noLineThere: 'There is no line there.',
  tooFewPoints: 'The line has one point only. Draw it on first.',
  splitOnLine: (line: Line) => `Click a place on ${theLine(line)}.`,
  splitAtEnd: 'That is the end of the line. Click a place between its ends.',
  trimNoMeeting: (line: Line, other: Line) =>
    `${capital(theLine(line))} and ${theLine(other)} do not meet away from its ends. Click a line that crosses it.`,
  trimMeetsNone: (line: Line) => `No other line crosses ${theLine(line)}, so there is nothing to cut it at.`,
  trimBetween:
    'That piece lies between two crossings. Split the line at one of them first, or click an end of it.',
  extendCrosses: (line: Line, other: Line) =>
    `${capital(theLine(line))} crosses ${theLine(other)} already. Trim it there, or drag the end.`,
  extendEndsOn: (line: Line, other: Line) => `${capital(theLine(line))} ends on ${theLine(other)} already.`,
  extendMisses: (other: Line) =>
    `Straight on, neither end meets ${theLine(other)}. Drag an end there, or draw the line on.`,
  extendMeetsNone: 'Straight on from there the line meets no other. Drag its end, or draw it on.',
  joinSelf: 'That is the line itself. Click the other one.',
  joinKinds: (line: Line, other: Line) =>
    `${capital(aLine(line))} and ${aLine(other)} are not joined. Change the kind of one of them first.`,
  joinWaters: 'The two faces carry the levels of different waters. Say the same of both first.',
  joinHeads: (first: string, second: string) =>
    `The two carry different heads, ${first} and ${second}. Clear or change one of them first.`,
  joinDrops: (first: string, second: string) =>
    `The two carry different counts of drops, ${first} and ${second}. Clear or change one of them first.`,
  joinHeadAndDrops:
    'One of the two carries a typed head, the other a typed count of drops. Clear one of them first.',
  joinTooFar: (gap: string, most: string) =>
    `Their nearest ends are ${gap} px apart, farther than the shorter line is long (${most} px). Extend or move one of them first.`,
  joinTooMany: (most: string) => `Joined they would have more than ${most} points. Leave them apart.`,
  nothingToSmooth:
    'There is no tremor to take off. Only densely traced lines have one; corners and ends always stay.',
  offTheSheet: 'That would move it too far off the sheet.',
  typedStays: 'A point typed by its coordinates stays where its figures say. Change them in the schedule.',
  typedStay: (count: number) =>
    `${counted(count, 'thing', 'things')} typed by coordinates stayed where ${count === 1 ? 'its' : 'their'} figures say.`,
  knownPointAlone: 'A known point sets out all nets of the section, so it is chosen on its own.',
  tooManyPoints: (most: string) => `A line has at most ${most} points.`,
} as const;
export const editRefusals = inLanguage({ en: enEditRefusals });

/** What happened to notes about a line that was changed. */
const enEditNotices = {
  noteOnCutOff: 'A note about the piece cut off stays where it is on the sheet.',
  noteOnJoined: 'The notes about the other line stay where they are on the sheet, but name no line any more.',
} as const;
export const editNotices = inLanguage({ en: enEditNotices });

const KEYS: Record<LineOp, string> = {
  split: 'S',
  join: 'J',
  trim: 'T',
  extend: 'X',
  reverse: 'I',
  smooth: 'O',
};

/** Words of the bars, forms and hints about what is chosen. */
const enEditingText = {
  thingsWord,
  chosen: (values: readonly DocumentEntity[]) => `${thingsWord(values)} chosen`,
  operations: 'Change the line',
  ops: {
    split: 'Split',
    join: 'Join',
    trim: 'Trim',
    extend: 'Extend',
    reverse: 'Turn round',
    smooth: 'Smooth',
  } satisfies Record<LineOp, string>,
  keys: KEYS,
  opHints: {
    split: 'Make two lines of it at a point or a place',
    join: 'Make one line of it and another at their nearest ends',
    trim: 'Cut an end off where another line crosses',
    extend: 'Draw an end straight on as far as another line',
    reverse: 'Let it run the other way: its hatching changes sides',
    smooth: 'Take the tremor of the hand off; ends and corners stay',
  } satisfies Record<LineOp, string>,
  asks: {
    split: 'Click the place where the line is split.',
    join: 'Click the line to join it to.',
    trim: 'Click the line to trim at; Shift keeps the shorter piece. Or click the end that is to go.',
    extend: 'Click the line to extend to, or near the end that is to go on.',
    chooseMore: 'Click lines and points to add them to what is chosen, or to leave them out.',
  },
  restToSee: 'A finger that rests shows first what it would do.',
  leave: 'Leave',
  leaveKey: 'Escape leaves it.',
  chooseMore: 'Choose more',
  duplicate: 'Duplicate',
  remove: 'Remove',
  lock: 'Lock their kinds',
  lockedLine: 'Lines of this kind are locked: unlock the kind in the list of lines to change one.',
  form: {
    hint: 'Drag one of them to move all, or use the arrow keys: 1 px, with Shift 10 px. Shift and click adds one or leaves it out; Shift and drag on bare sheet chooses what lies inside.',
    kind: 'Kind of all lines',
    kindsDiffer: 'of different kinds',
    move: 'Move or copy by',
    offset: (unit: string) => `Offset, ${unit}`,
    elevation: (unit: string) => `Elevation, ${unit}`,
    right: 'To the right, px',
    down: 'Down, px',
    moveNow: 'Move',
    copyNow: 'Make a copy',
    needed: 'Type by how much.',
    removeAll: (values: readonly DocumentEntity[]) => `Remove ${thingsWord(values)}`,
  },
  units: {
    label: 'In',
    names: { section: 'section coordinates', sheet: 'sheet pixels' },
  },
  vertices: {
    title: (count: number) => `Points of the line, ${count}`,
    number: 'No.',
    x: 'x, px',
    y: 'y, px',
    offset: (unit: string) => `Offset, ${unit}`,
    elevation: (unit: string) => `Elevation, ${unit}`,
    field: (name: string, number: number) => `${name}, point ${number}`,
    choose: (number: number) => `Choose point ${number} and show it`,
    insertAfter: (number: number) => `Insert after point ${number}`,
    removeNamed: (number: number) => `Remove point ${number}`,
    hint: 'Enter takes a figure, Escape brings the old one back. A number chooses its point.',
    tooFar: 'That place lies too far off the sheet.',
    pages: 'Pages of points',
    earlier: 'Earlier points',
    later: 'Later points',
    range: (first: number, last: number, of: number) => `${first} to ${last} of ${of}`,
  },
} as const;
export const editingText = inLanguage({ en: enEditingText });

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
