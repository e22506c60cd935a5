import { fixedText, plainText } from '#client/lib/figures.ts';
import { soilText } from '#client/text/desk-forms.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import type { PlaneMap } from '#shared/compute/plane-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import {
  type DocumentEntity,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
  type TracedLine,
} from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { ClickedPlaces } from '../model/clicked-places.ts';
import type { HideableKind } from '../model/desk-state.ts';
import type { GuidesByOwner } from '../model/guides.ts';
import type { Selection } from '../model/selection.ts';
import type { LineWeight } from '../model/view-aids.ts';
import type { SheetFrame } from '../model/viewport.ts';
import { guideItems } from './guide-items.ts';
import { handledVertices } from './handle-spacing.ts';
import { COLOURS, lookOf, tracedLook, unfinishedLook, weighted } from './line-look.ts';
import { LABEL_PREFIX, type PlacedScene, placeWords, type WordPlaces } from './place-words.ts';
import { profileItems } from './profile-items.ts';
import type { MarkShape, SceneItem, SceneLine, SceneMark } from './scene.ts';
import { itemsThrough } from './seen-through.ts';

/** A note as the sheet shows it. */
export type NoteBalloon = {
  readonly id: string;
  readonly number: number;
  readonly at: SheetPoint;
  readonly chosen: boolean;
  /** The line that it is about; left out where it is about none. */
  readonly lineId?: string;
};

export type SceneInput = {
  readonly document: FlowNetDocument;
  /** Entities as they look while they are dragged. */
  readonly preview: Readonly<Record<string, DocumentEntity>>;
  readonly reading: NetReading | null;
  readonly selection: Selection;
  readonly draftId: string | null;
  readonly hiddenKinds: readonly HideableKind[];
  readonly notes: readonly NoteBalloon[];
  /** What explains or compares, over and under the net. */
  readonly guides: GuidesByOwner;
  readonly map: SectionMap | null;
  readonly readOnly: boolean;
  readonly zoom: number;
  readonly lineWeight: LineWeight;
  /** Where words were, to stay there while something is dragged; left out, they are placed anew. */
  readonly keptWords?: WordPlaces | null;
  /** Sheet pixels to pixels of the picture, as through which the sheet is seen; null = as it is drawn. */
  readonly seenAs: PlaneMap | null;
  /** The section's part of the sheet, outlined when the sheet holds more; null = the whole sheet. */
  readonly frame: SheetFrame | null;
  /** Vertices of a line that were clicked; left out where nothing is drawn. */
  readonly clickedOn?: ClickedPlaces['among'];
};

type Shown = { readonly id: string; readonly value: DocumentEntity };
/** Ids of balloons in the scene are those of their notes with this before them. */
const NOTE_PREFIX = 'note ';
const NO_OFFSET = [0, 0] as const;

/** Everything the sheet shows over the scan, from the bottom up: lines, labels, points, handles, notes. */
export function buildScene(input: SceneInput): SceneItem[] {
  return buildSheetScene(input).items;
}

/** As `buildScene`, with the labels for which there is no room: each is shown when its line is pointed at. */
export function buildSheetScene(input: SceneInput): PlacedScene {
  const shown = shownEntities(input);
  const lines = shown.flatMap((entity) => lineItem(entity, input));
  lines.sort((a, b) => Number(a.strong) - Number(b.strong));
  const guides = guideItems(input.guides);
  const items = [
    ...frameItem(input.frame),
    ...guides.under,
    ...shown.flatMap((entity) => profileItem(entity, input)),
    ...lines,
    ...guides.over,
    ...labelItems(lines, input),
    ...shown.flatMap((entity) => pointItem(entity, input)),
    ...handleItems(shown, input),
    ...doubtItems(input),
    ...noteItems(input),
  ];
  return placeWords(itemsThrough(items, input.seenAs), input.zoom, input.keptWords ?? null);
}

/** Of a scene only what belongs to the entities that are being dragged. */
export function buildDragged(input: SceneInput): SceneItem[] {
  const { document, preview, reading } = input;
  const dragged = Object.fromEntries(
    Object.entries(document.entities).filter(([id]) => preview[id] !== undefined),
  );
  return buildScene({
    ...input,
    document: { ...document, entities: dragged },
    reading: reading && { ...reading, findings: [] },
    guides: {},
    notes: [],
    frame: null,
  });
}

function frameItem(frame: SheetFrame | null): SceneLine[] {
  if (frame === null) return [];
  const [left, top, width, height] = frame;
  const corners: SheetPoint[] = [
    [left, top],
    [left + width, top],
    [left + width, top + height],
    [left, top + height],
    [left, top],
  ];
  const look = { colour: COLOURS.ink, widthPx: 1, dashPx: [2, 5], end: 'none', hatchPx: 0 } as const;
  return [{ id: 'frame', shape: 'line', points: corners, look, strong: false }];
}

function shownEntities(input: SceneInput): Shown[] {
  return Object.values(input.document.entities)
    .map(({ id, value }) => ({ id, value: input.preview[id] ?? value }))
    .filter(
      ({ value }) =>
        !input.hiddenKinds.includes(value.kind === 'line' ? value.line : (value.kind as HideableKind)),
    );
}

function isChosen(id: string, input: SceneInput): boolean {
  return input.selection.ids.includes(id) || input.draftId === id;
}

function lineItem({ id, value }: Shown, input: SceneInput): SceneLine[] {
  if (value.kind !== 'line' || value.points.length === 0) return [];
  const drawn = value.finished || input.draftId === id;
  const own = drawn ? tracedLook(value.line, value.origin) : unfinishedLook(value.line);
  const look = weighted(own, input.lineWeight);
  return [{ id, shape: 'line', points: value.points, look, strong: isChosen(id, input) }];
}

function profileItem({ id, value }: Shown, input: SceneInput): SceneItem[] {
  if (value.kind !== 'profile') return [];
  const { document, reading, map } = input;
  const chosen = isChosen(id, input);
  const named = chosen || entitiesOf(document, 'profile').length === 1;
  return profileItems(id, value, { document, reading, map, chosen, named });
}

function mark(
  id: string,
  shape: MarkShape,
  at: SheetPoint,
  colour: string,
  rest: Partial<Pick<SceneMark, 'text' | 'strong'>> = {},
): SceneMark {
  return { id, shape, at, colour, text: '', strong: false, offsetPx: NO_OFFSET, ...rest };
}

/** Heads at the lower ends of the equipotentials. */
function labelItems(lines: readonly SceneLine[], input: SceneInput): SceneMark[] {
  const read = new Map(input.reading?.lines.map((line) => [line.id, line]));
  return lines.flatMap((line) => {
    const text = headText(input.document.entities[line.id]?.value, read.get(line.id));
    if (text === null) return [];
    const { strong } = line;
    return [
      mark(`${LABEL_PREFIX}${line.id}`, 'label', lowerEnd(line.points), COLOURS.equipotential, {
        text,
        strong,
      }),
    ];
  });
}

function lowerEnd(points: readonly SheetPoint[]): SheetPoint {
  const first = points[0]!;
  const last = points.at(-1)!;
  return last[1] > first[1] ? last : first;
}

/** The head a line carries; before heads are known the drops lost at it; nothing for other kinds of line. */
function headText(
  value: DocumentEntity | undefined,
  read: NetReading['lines'][number] | undefined,
): string | null {
  if (value?.kind !== 'line' || value.line !== 'equipotential' || read === undefined) return null;
  if (read.head !== null) return withoutTrailingZeros(fixedText(read.head, 2));
  return read.drops === null ? null : plainText(read.drops, 3);
}

function withoutTrailingZeros(text: string): string {
  return text.replace(/[.,]?0+$/, '');
}

function pointItem({ id, value }: Shown, input: SceneInput): SceneMark[] {
  const strong = isChosen(id, input);
  if (value.kind === 'knownPoint') {
    return [mark(id, 'knownPoint', value.at, COLOURS.ink, { text: value.name, strong })];
  }
  if (value.kind === 'soil') {
    const text = value.name || soilText.unnamed;
    return value.places.flatMap((at, i) => [
      mark(`soil ${id} ${i}`, 'cross', at, COLOURS.boundary, { strong }),
      mark(`soilName ${id} ${i}`, 'label', at, COLOURS.boundary, { text, strong }),
    ]);
  }
  if (value.kind !== 'readingPoint') return [];
  const { place } = value;
  if (place.on === 'sheet')
    return [mark(id, 'readingPoint', place.at, COLOURS.point, { text: value.name, strong })];
  const at = input.map?.toSheet(sectionPt(place.offset, place.elevation));
  if (at === undefined) return [];
  return [mark(id, 'readingPoint', [at[0], at[1]], COLOURS.point, { text: value.name, strong })];
}

/** Handles on the vertices of the one chosen line or profile and of the line under way. */
function handleItems(shown: readonly Shown[], input: SceneInput): SceneMark[] {
  if (input.readOnly) return [];
  const { selection } = input;
  const id =
    input.draftId ?? (selection.kind === 'line' && selection.ids.length === 1 ? selection.ids[0] : undefined);
  const line = shown.find((entity) => entity.id === id)?.value;
  if (selection.kind === 'profile') return shown.flatMap((entity) => profileHandles(entity, input));
  if (id === undefined || line?.kind !== 'line') return [];
  const chosen = input.draftId === null ? selection.vertex : null;
  const clicked = input.clickedOn?.(id, line.points) ?? new Map();
  return handledVertices(line.points, clicked, input.zoom, chosen).map((i) =>
    handleOf(id, line, line.points[i]!, i, chosen === i),
  );
}

function profileHandles({ id, value }: Shown, input: SceneInput): SceneMark[] {
  if (!isChosen(id, input) || value.kind !== 'profile' || value.place.on !== 'sheet') return [];
  return value.place.points.map((at, i) => mark(`vertex ${id} ${i}`, 'handle', at, COLOURS.point));
}

function handleOf(id: string, line: TracedLine, at: SheetPoint, index: number, chosen: boolean): SceneMark {
  return mark(`vertex ${id} ${index}`, chosen ? 'chosenHandle' : 'handle', at, lookOf(line.line).colour);
}

/** Places the reading finds wrong or doubtful: crossings, lines out of order. */
function doubtItems(input: SceneInput): SceneMark[] {
  const placed =
    input.reading?.findings.filter((found) => found.at !== null && found.weight !== 'note') ?? [];
  return placed.map((found, i) => mark(`doubt ${i} ${found.code}`, 'doubt', found.at!, COLOURS.attention));
}

function noteItems(input: SceneInput): SceneMark[] {
  if (input.hiddenKinds.includes('note')) return [];
  return input.notes.map((note) =>
    mark(`${NOTE_PREFIX}${note.id}`, 'balloon', note.at, COLOURS.ink, {
      text: String(note.number),
      strong: note.chosen,
    }),
  );
}

/**
 * Parts a scene into what rests and what is being worked on: what is chosen or under way with its handles. Only the
 * second changes from frame to frame while something is dragged.
 */
export function partScene(items: readonly SceneItem[]): { base: SceneItem[]; active: SceneItem[] } {
  const base: SceneItem[] = [];
  const active: SceneItem[] = [];
  for (const item of items) {
    const worked = item.strong || item.shape === 'handle' || item.shape === 'chosenHandle';
    (worked ? active : base).push(item);
  }
  return { base, active };
}

/** The note whose balloon an item of the scene is. */
export function noteIdOf(itemId: string): string {
  return itemId.slice(NOTE_PREFIX.length);
}
