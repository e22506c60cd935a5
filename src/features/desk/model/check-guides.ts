import { checkMarkText as text } from '#client/text/net-check.ts';
import type { BesideSolution } from '#shared/compute/beside/beside-solution.ts';
import type { PlacedDifference } from '#shared/compute/beside/difference-picture.ts';
import { STEPS } from '#shared/compute/beside/difference-steps.ts';
import type { PointWays } from '#shared/compute/net/point-ways.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { NetCheckReading, NetFault } from '#shared/contract/reading-net-check.ts';
import type { GuideArea, GuideLine, GuideMark, Guides, GuideTone } from './guides.ts';

const sheetPoints = (places: ReadonlyArray<readonly [number, number]>): SheetPoint[] =>
  places.map(([x, y]) => [x, y]);

/** A fault's name in the list and on the sheet. */
export function faultKey(fault: Pick<NetFault, 'of' | 'index'>): string {
  return `${fault.of} ${fault.index}`;
}

/** Where a net is poor: cells with their ratio, angles, and channels that carry another flow; one fault may be chosen. */
export function netCheckGuides(check: NetCheckReading, chosen: string | null): Guides {
  const areas: GuideArea[] = [];
  const marks: GuideMark[] = [];
  check.cells.forEach((cell, index) => {
    if (cell.judgement !== 'poor') return;
    const id = faultKey({ of: 'cells', index });
    const tone = id === chosen ? 'chosenCell' : 'poorCell';
    if (cell.outline.length > 2) areas.push({ id, tone, outlines: [sheetPoints(cell.outline)] });
    marks.push({ id, tone, at: cell.at, text: text.ratio(cell.ratio) });
  });
  check.meetings.forEach((meeting, index) => {
    if (meeting.judgement !== 'poor') return;
    const id = faultKey({ of: 'meetings', index });
    const tone = id === chosen ? 'chosenCell' : 'poorAngle';
    marks.push({ id, tone, at: meeting.at, text: text.angle(meeting.angleDeg) });
  });
  return { areas, lines: [], marks: [...marks, ...channelMarks(check)] };
}

/** A channel is named in its middle cell. */
function channelMarks(check: NetCheckReading): GuideMark[] {
  return check.channels.flatMap(({ judgement, share }, index): GuideMark[] => {
    const cells = check.cells.filter((cell) => cell.channel === index);
    const middle = cells[cells.length >> 1];
    if (judgement !== 'poor' || share === null || middle === undefined) return [];
    const tone = share > 1 ? 'channelMore' : 'channelLess';
    return [{ id: `channel ${index}`, tone, at: middle.at, text: text.channel(share) }];
  });
}

/** The strip a point lies in and the two ways by which it is read. */
export function explanationGuides({ strip, toBefore, toAfter, fraction }: PointWays): Guides {
  const line = (id: string, places: PointWays['toBefore']): GuideLine => ({
    id,
    tone: 'way',
    points: sheetPoints(places),
  });
  const mark = (id: string, places: PointWays['toBefore'], part: number): GuideMark[] => {
    const end = places.at(-1);
    const from = places.at(-2);
    if (end === undefined || from === undefined) return [];
    const at: SheetPoint = [(from[0] + end[0]) / 2, (from[1] + end[1]) / 2];
    return [{ id, tone: 'way', at, text: text.part(part) }];
  };
  return {
    areas: [{ id: 'strip', tone: 'strip', outlines: [sheetPoints(strip)] }],
    lines: [line('before', toBefore), line('after', toAfter)],
    marks: [...mark('before', toBefore, fraction), ...mark('after', toAfter, 1 - fraction)],
  };
}

/** The computed net as a pale guide, with the free surface found. */
export function computedNetGuides({ net }: BesideSolution): Guides {
  const lines = (kind: string, tone: GuideTone, groups: typeof net.equipotentials): GuideLine[] =>
    groups.flatMap((group, i) => group.lines.map((points, k) => ({ id: `${kind} ${i} ${k}`, tone, points })));
  return {
    areas: [],
    lines: [
      ...lines('equipotential', 'computedEquipotential', net.equipotentials),
      ...lines('flowLine', 'computedFlowLine', net.flowLines),
      ...lines('surface', 'computedSurface', [{ value: 0, lines: net.surface }]),
    ],
    marks: [],
  };
}

const ABOVE: readonly GuideTone[] = ['above1', 'above2', 'above3'];
const BELOW: readonly GuideTone[] = ['below1', 'below2', 'below3'];

/** Differences of head, tinted by size and sign, with the greatest of each sign in figures. */
export function differenceGuides({ picture }: BesideSolution, unit: string): Guides {
  const areas = (kind: string, tones: readonly GuideTone[], steps: typeof picture.above): GuideArea[] =>
    steps.flatMap((outlines, i) => {
      const tone = tones[i];
      return outlines.length > 0 && tone !== undefined ? [{ id: `${kind} ${i}`, tone, outlines }] : [];
    });
  const mark = (id: string, tone: GuideTone, found: PlacedDifference | null): GuideMark[] =>
    found === null || Math.abs(found.part) < STEPS[0]
      ? []
      : [{ id, tone, at: found.at, text: text.difference(found.head, unit) }];
  return {
    areas: [...areas('above', ABOVE, picture.above), ...areas('below', BELOW, picture.below)],
    lines: [],
    marks: [
      ...mark('greatest above', 'above3', picture.greatestAbove),
      ...mark('greatest below', 'below3', picture.greatestBelow),
    ],
  };
}
