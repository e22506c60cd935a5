import {
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type SheetPoint,
  singleOf,
} from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';

export interface FigureLine {
  id: string;
  kind: LineKind;
  points: readonly SheetPoint[];
  /** Head or name, set at the line's first point. */
  label: string;
}
export interface FigurePoint {
  name: string;
  at: SheetPoint;
}
/** A length of the section as it is drawn on the sheet. */
export interface ScaleBar {
  lengthPx: number;
  label: string;
}
/** The section with its traces, in base-raster pixels of the sheet, y down. */
export interface SectionFigure {
  /** `[left, top, width, height]` of the part of the sheet that is shown. */
  crop: readonly [number, number, number, number];
  lines: readonly FigureLine[];
  profiles: ReadonlyArray<readonly SheetPoint[]>;
  points: readonly FigurePoint[];
  knownPoints: readonly FigurePoint[];
  /** Along the level, and upwards where the drawing has two scales. None before the section is set out, nor on a photograph. */
  scaleBars: readonly ScaleBar[];
  /** Which way the water flows on the sheet; null when the net does not tell. */
  flow: 'left' | 'right' | null;
}

/** Margin around the traces, a share of their longer extent. */
const MARGIN = 0.05;

/** The figure of the section; null while nothing is traced. */
export function sectionFigure(document: FlowNetDocument, reading: NetReading): SectionFigure | null {
  const lines = figureLines(document, reading);
  const points = reading.points.flatMap(({ name, sheetAt }) =>
    sheetAt === null ? [] : [{ name, at: sheetAt as SheetPoint }],
  );
  const known = entitiesOf(document, 'knownPoint').map(({ value }) => ({ name: value.name, at: value.at }));
  const profiles = reading.profiles.map(({ samples }) =>
    samples.filter((sample) => sample.distance !== null).map(({ at }) => at),
  );
  const places = [
    ...lines.flatMap((line) => line.points),
    ...points.map((each) => each.at),
    ...profiles.flat(),
  ];
  const crop = cropAround(places, document.sheet);
  if (crop === null) return null;
  return {
    crop,
    lines,
    profiles,
    points,
    knownPoints: known,
    scaleBars: scaleBars(document, reading, crop[2]),
    flow: flowSide(document, reading),
  };
}

function figureLines(document: FlowNetDocument, reading: NetReading): FigureLine[] {
  const heads = new Map(reading.lines.map((line) => [line.id, line.head]));
  const decimals = DECIMALS[document.unitSystem].head;
  return entitiesOf(document, 'line')
    .filter(({ value }) => value.finished && value.points.length > 1)
    .map(({ id, value }) => {
      const head = heads.get(id) ?? null;
      const label = head === null ? value.name : fixedText(head, decimals);
      return { id, kind: value.line, points: value.points, label };
    });
}

/** The part of the sheet around places, within the sheet; null without extent. */
function cropAround(
  places: readonly SheetPoint[],
  { widthPx, heightPx }: FlowNetDocument['sheet'],
): SectionFigure['crop'] | null {
  if (places.length === 0) return null;
  const ends = (i: 0 | 1, most: number) => {
    const values = places.map((place) => place[i]);
    const low = values.reduce((a, b) => Math.min(a, b));
    const high = values.reduce((a, b) => Math.max(a, b));
    return { low, high, most };
  };
  const [x, y] = [ends(0, widthPx), ends(1, heightPx)];
  const margin = MARGIN * Math.max(x.high - x.low, y.high - y.low);
  const [left, right] = within(x, margin);
  const [top, bottom] = within(y, margin);
  return right - left < 1 || bottom - top < 1 ? null : [left, top, right - left, bottom - top];
}

function within({ low, high, most }: { low: number; high: number; most: number }, margin: number) {
  return [Math.max(0, Math.floor(low - margin)), Math.min(most, Math.ceil(high + margin))] as const;
}

function scaleBars(document: FlowNetDocument, { setOut }: NetReading, widthPx: number): ScaleBar[] {
  const { unitsPerPx, unitsPerPxUp } = setOut;
  // On a photograph taken aslant no length is the same in two places.
  const hasScale = singleOf(document, 'setOut')?.value.scales !== 'perspective';
  if (unitsPerPx === null || !hasScale) return [];
  const { length } = unitNames(document.unitSystem);
  const bar = (scale: number, words: string): ScaleBar => {
    const units = roundLength((widthPx / 5) * scale);
    return { lengthPx: units / scale, label: `${units} ${length}${words}` };
  };
  const up = unitsPerPxUp ?? unitsPerPx;
  // Of one scale within what a fit tells; two bars would only repeat each other.
  if (Math.abs(up / unitsPerPx - 1) < 1e-9) return [bar(unitsPerPx, '')];
  return [bar(unitsPerPx, ' along the level'), bar(up, ' upwards')];
}

/** The greatest of 1, 2 and 5 times a power of ten that is not above a length. */
function roundLength(length: number): number {
  const power = 10 ** Math.floor(Math.log10(length));
  const step = [5, 2, 1].find((each) => each * power <= length) ?? 1;
  return Number((step * power).toPrecision(3));
}

function flowSide(document: FlowNetDocument, reading: NetReading): SectionFigure['flow'] {
  const upstream = singleOf(document, 'setOut')?.value.upstream ?? null;
  if (upstream !== null) return upstream === 'left' ? 'right' : 'left';
  const middles = new Map(entitiesOf(document, 'line').map(({ id, value }) => [id, middleX(value.points)]));
  const ordered = reading.lines
    .flatMap(({ id, drops }) => (drops === null ? [] : [{ drops, x: middles.get(id) ?? null }]))
    .sort((a, b) => a.drops - b.drops);
  const [first, last] = [ordered[0]?.x ?? null, ordered.at(-1)?.x ?? null];
  if (first === null || last === null || first === last) return null;
  return last > first ? 'right' : 'left';
}

const middleX = (points: readonly SheetPoint[]) =>
  points.length === 0 ? null : points.reduce((sum, point) => sum + point[0], 0) / points.length;
