import type { OpenItem } from '#shared/contract/before-sending.ts';
import { type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { Finding, NetReading, PointReading } from '#shared/contract/reading.ts';

/**
 * A ± at 95 % of the total head beyond this part of a drop leaves open between which two lines the head lies. A measure
 * of ours, not of a standard.
 */
const WIDE_PART_OF_DROP = 0.5;

/**
 * What is still open on a net that can be read, before it is sent for checking: datum, scale, inputs and their sources,
 * what the net check and the reading question, points without a sure figure, and notes. Notes of the reading
 * (weight `note`) are no faults and stay out, as what withholds every figure does: such a net is not sent at all.
 *
 * @param openNotes numbers of the notes that are not closed
 */
export function beforeSending(
  document: FlowNetDocument,
  reading: NetReading,
  openNotes: readonly number[],
): OpenItem[] {
  return distinctKeys([
    ...datumItems(document),
    ...scaleItems(reading),
    ...inputItems(document),
    ...questionItems(reading.findings),
    ...pointItems(reading),
    ...noteItems(openNotes),
  ]);
}

const item = (about: OpenItem['about'], key: string, text: string): OpenItem => ({ key, about, text });

const datumItems = ({ datum }: FlowNetDocument): OpenItem[] =>
  datum.trim() === ''
    ? [
        item(
          'datum',
          'noDatum',
          'The vertical datum has no name, so nobody can say what the levels refer to.',
        ),
      ]
    : [];

const scaleItems = ({ setOut }: NetReading): OpenItem[] =>
  setOut.state === 'fitted' && setOut.residual === null
    ? [
        item(
          'scale',
          'scaleUnchecked',
          'The scale comes from no more known points than it needs, so nothing checks it. A further known point would.',
        ),
      ]
    : [];

function inputItems(document: FlowNetDocument): OpenItem[] {
  const levels = singleOf(document, 'waterLevels')?.value;
  const soil = singleOf(document, 'permeability')?.value;
  const items: OpenItem[] = [];
  if (levels?.source.trim() === '')
    items.push(item('inputs', 'levelsWithoutSource', 'The water levels have no source.'));
  if (soil?.k === null)
    items.push(item('inputs', 'noPermeability', 'No permeability is entered, so no seepage is given.'));
  else if (soil?.source.trim() === '')
    items.push(item('inputs', 'permeabilityWithoutSource', 'The permeability has no source.'));
  return items;
}

const ABOUT_CELL: Partial<Record<NonNullable<Finding['cell']>, OpenItem['about']>> = {
  scale: 'scale',
  residual: 'scale',
  headwater: 'inputs',
  permeability: 'inputs',
};

const questionItems = (findings: readonly Finding[]): OpenItem[] =>
  findings
    .filter(({ weight }) => weight === 'question')
    .map((found) => item(found.cell ? (ABOUT_CELL[found.cell] ?? 'net') : 'net', keyOf(found), found.text));

/** The code with what it is about: a net may have many lines, so the key names the first few and how many follow. */
function keyOf({ code, entityIds }: Finding): string {
  const named = entityIds.slice(0, 3);
  const more = entityIds.length - named.length;
  return [code, ...named, ...(more > 0 ? [`+${more}`] : [])].join(' ');
}

function pointItems({ points, quantities }: NetReading): OpenItem[] {
  if (points.length === 0)
    return [item('points', 'noReadingPoints', 'No reading point is placed, so the schedule is empty.')];
  return points.flatMap((point) => itemsOfPoint(point, quantities.headPerDrop));
}

function itemsOfPoint(point: PointReading, headPerDrop: number | null): OpenItem[] {
  const name = point.name.trim() === '' ? 'A point without a name' : point.name;
  const say = (code: string, text: string) => item('points', `${code} ${point.id}`, `${name}: ${text}`);
  const items = point.findings
    .filter(({ weight }) => weight !== 'note')
    .map(({ code, text }) => say(code, text));
  if (point.status === 'withheld') items.unshift(say('pointWithoutFigure', point.reason?.text ?? 'not read'));
  else if (isWide(point, headPerDrop))
    items.push(say('pointInDoubt', 'the ± of its total head is more than half a drop.'));
  return items;
}

const isWide = ({ totalHeadPlusMinus }: PointReading, headPerDrop: number | null) =>
  totalHeadPlusMinus !== null &&
  headPerDrop !== null &&
  totalHeadPlusMinus > WIDE_PART_OF_DROP * Math.abs(headPerDrop);

function noteItems(numbers: readonly number[]): OpenItem[] {
  if (numbers.length === 0) return [];
  const text =
    numbers.length === 1
      ? `Note ${numbers[0]} is not closed.`
      : `${numbers.length} notes are not closed: ${numbers.join(', ')}.`;
  // A further note is a further matter: a reason given for fewer does not hold for it.
  return [item('notes', `openNotes ${numbers.join(' ')}`, text)];
}

/** Two items of one key would share a reason; the second and later ones are counted. */
function distinctKeys(items: readonly OpenItem[]): OpenItem[] {
  const seen = new Map<string, number>();
  return items.map((each) => {
    const count = (seen.get(each.key) ?? 0) + 1;
    seen.set(each.key, count);
    return count === 1 ? each : { ...each, key: `${each.key} #${count}` };
  });
}
