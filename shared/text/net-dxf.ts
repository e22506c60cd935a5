import { sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import {
  type EntityOf,
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type SheetPoint,
} from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { DECIMALS } from '#shared/text/unit-text.ts';

/** Layers of a drawing for CAD programs, by what lies on them. */
export const LINE_LAYERS: Record<LineKind, string> = {
  equipotential: 'Equipotentials',
  flowLine: 'Flow lines',
  phreaticLine: 'Phreatic line',
  impervious: 'Impervious boundary',
  soilBoundary: 'Soil boundaries',
  ground: 'Ground surface',
  submergedFace: 'Submerged faces',
  outflowFace: 'Outflow faces',
  drain: 'Drains',
};
export const OTHER_LAYERS = {
  unfinished: 'Lines not finished',
  knownPoints: 'Known points',
  readingPoints: 'Reading points',
  profiles: 'Profiles',
  soils: 'Soils',
} as const;

/** Offset and elevation in the document's length unit. */
export type DrawnPlace = readonly [offset: number, elevation: number];
export interface DrawnLine {
  layer: string;
  points: DrawnPlace[];
}
export interface DrawnText {
  layer: string;
  at: DrawnPlace;
  text: string;
}
export interface DrawnMark {
  layer: string;
  at: DrawnPlace;
}
/** What a CAD drawing of a net holds: open polylines, points and texts in section coordinates, at one scale. */
export interface NetDrawing {
  lines: DrawnLine[];
  marks: DrawnMark[];
  texts: DrawnText[];
}

/**
 * The traces and points of a net in section coordinates: offset and elevation in the document's length unit, the natural
 * section, in which an exaggeration of the drawing is taken out. Null while the section is not set out. Heads are those
 * of `reading`; a point without one has its name alone.
 */
export function netDrawing(document: FlowNetDocument, reading: NetReading): NetDrawing | null {
  const map = fittedMap(document);
  if (map === null) return null;
  const drawing: NetDrawing = { lines: [], marks: [], texts: [] };
  for (const { value } of entitiesOf(document, 'line')) addLine(drawing, value, map);
  for (const { value } of entitiesOf(document, 'profile')) addProfile(drawing, value, map);
  for (const { value } of entitiesOf(document, 'knownPoint'))
    addNamed(drawing, OTHER_LAYERS.knownPoints, onSection(map, value.at), value.name);
  for (const { value } of entitiesOf(document, 'soil'))
    for (const place of value.places)
      drawing.texts.push({ layer: OTHER_LAYERS.soils, at: onSection(map, place), text: value.name });
  addReadings(drawing, document, reading);
  return drawing;
}

const onSection = (map: SectionMap, at: SheetPoint): DrawnPlace => {
  const [offset, elevation] = map.toSection(sheetPx(...at));
  return [offset, elevation];
};

function addLine({ lines, texts }: NetDrawing, value: EntityOf<'line'>, map: SectionMap): void {
  if (value.points.length < 2) return;
  const layer = value.finished ? LINE_LAYERS[value.line] : OTHER_LAYERS.unfinished;
  const points = value.points.map((at) => onSection(map, at));
  lines.push({ layer, points });
  if (value.name !== '' && points[0]) texts.push({ layer, at: points[0], text: value.name });
}

function addProfile({ lines, marks, texts }: NetDrawing, value: EntityOf<'profile'>, map: SectionMap): void {
  const layer = OTHER_LAYERS.profiles;
  const points = placesOf(value, map);
  if (points.length > 1) lines.push({ layer, points });
  else marks.push(...points.map((at) => ({ layer, at })));
  if (value.name !== '' && points[0]) texts.push({ layer, at: points[0], text: value.name });
}

function placesOf({ place }: EntityOf<'profile'>, map: SectionMap): DrawnPlace[] {
  if (place.on === 'sheet') return place.points.map((at) => onSection(map, at));
  if (place.on === 'section') return place.points.map(([offset, elevation]) => [offset, elevation]);
  const [[left, low], [right, high]] = place.corners;
  return [
    [left, low],
    [right, low],
    [right, high],
    [left, high],
    [left, low],
  ];
}

function addNamed({ marks, texts }: NetDrawing, layer: string, at: DrawnPlace, text: string): void {
  marks.push({ layer, at });
  if (text !== '') texts.push({ layer, at, text });
}

function addReadings(drawing: NetDrawing, { unitSystem }: FlowNetDocument, reading: NetReading): void {
  for (const { name, offset, elevation, totalHead } of reading.points) {
    if (offset === null || elevation === null) continue;
    const head = totalHead === null ? '' : `h = ${totalHead.toFixed(DECIMALS[unitSystem].head)}`;
    const text = [name, head].filter(Boolean).join('  ');
    addNamed(drawing, OTHER_LAYERS.readingPoints, [offset, elevation], text);
  }
}
