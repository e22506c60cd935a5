import { enteredText, fixedText, plainText } from '#client/lib/figures.ts';
import { pictureText as text } from '#client/text/picture.ts';
import { sectionViewText } from '#client/text/section-view.ts';
import { screenPx, sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskState } from '../model/desk-state.ts';
import { type LegendEntry, legendEntries } from '../model/picture-legend.ts';
import {
  BAR_MOST_MM,
  drawingRoom,
  fittingScale,
  layPage,
  type Measure,
  type PageContent,
  type Paper,
  type PictureBar,
  type PictureCell,
} from '../model/picture-page.ts';
import {
  mmPerUnitAt,
  type PictureScale,
  pictureScaleAt,
  roundLength,
  roundScales,
  scaleNumber,
  scalesDiffer,
} from '../model/picture-scale.ts';
import { sectionViews } from '../model/section-views.ts';
import { NO_SELECTION } from '../model/selection.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import { frameThrough, rasterMap, type SheetFrame, toSheet, type Viewport } from '../model/viewport.ts';
import { buildScene, type NoteBalloon } from '../render/build-scene.ts';
import { distinctEntries, legendScene } from '../render/legend-scene.ts';
import type { PictureJob } from '../render/picture-painter.ts';
import { PX_PER_MM } from '../render/picture-words.ts';

/** What the page knows of the net besides its document: cells of the title block, and a name for the file. */
export type PictureFacts = { readonly cells: readonly PictureCell[]; readonly fileName: string };

export type PictureSubject = {
  readonly state: Pick<DeskState, 'document' | 'reading' | 'hiddenKinds' | 'guides' | 'aids'>;
  readonly notes: readonly NoteBalloon[];
  /** What the sheet is shown by. */
  readonly raster: SheetRaster;
  /** The section's part of the sheet; null = the whole sheet. */
  readonly frame: SheetFrame | null;
  /** What is in view now, and through which map. */
  readonly view: Viewport;
  readonly facts: PictureFacts;
};

export type PictureChoices = {
  readonly part: 'section' | 'view';
  readonly paper: Paper;
  readonly dpi: number;
  /** n of 1:n along the level; null = as large as fits. */
  readonly scale: number | null;
};

export type PicturePlan = {
  readonly job: PictureJob;
  /** n of the scale at which it just fits, and the round ones that fit; none before the section is set out. */
  readonly fits: number | null;
  readonly scales: readonly number[];
};

const LEAST_ROOM_MM = 25;

/** Lays the picture out; null where the title block leaves no room for the drawing. */
export function planPicture(
  subject: PictureSubject,
  { part, paper, dpi, scale: wanted }: PictureChoices,
  measure: Measure,
): PicturePlan | null {
  const { document } = subject.state;
  const system = document.unitSystem;
  const shown = shownFrame(subject, part);
  const scale = scaleOf(subject, shown);
  const entries = legendOf(subject);
  const content = (drawnScale: string): PageContent => ({
    cells: cellsWith(subject, drawnScale),
    legend: entries.map(nameOf),
    caution: text.caution,
  });
  const barCount = scale === null ? 0 : scalesDiffer(scale) ? 2 : 1;
  const room = drawingRoom(paper, content(longestScale(scale, paper)), barCount, measure);
  if (room[1] < LEAST_ROOM_MM) return null;
  const most = fittingScale(shown, room);
  const fits = scale === null ? null : scaleNumber(most * scale.level, system);
  const scales = fits === null ? [] : roundScales(fits, system);
  const asked = scale !== null && wanted !== null ? mmPerUnitAt(wanted, system) / scale.level : most;
  const mmPerPx = Math.min(asked, most);
  const page = layPage(
    paper,
    shown,
    mmPerPx,
    content(drawnScaleText(scale, mmPerPx, system, paper)),
    scale === null ? [] : barsOf(scale, mmPerPx, system),
    measure,
  );
  const zoom = mmPerPx * PX_PER_MM;
  const { seenAs } = subject.view;
  const view: Viewport = {
    zoom,
    origin: sheetPx(shown[0], shown[1]),
    widthPx: shown[2] * zoom,
    heightPx: shown[3] * zoom,
    ...(seenAs === undefined ? {} : { seenAs }),
  };
  const { aids } = subject.state;
  const boxes = page.legend.map(({ sample, index }) => ({ entry: entries[index]!, box: inPx(sample) }));
  const job: PictureJob = {
    raster: subject.raster,
    page,
    ratio: dpi / 96,
    view,
    look: { faded: aids.fadePct / 100, inverted: aids.inverted },
    scene: sceneOf(subject, zoom),
    legend: legendScene(boxes, aids.lineWeight),
  };
  return { job, fits, scales };
}

/** What is shown, `[left, top, width, height]` in pixels of the picture that the sheet's map makes. */
function shownFrame({ view, frame, raster }: PictureSubject, part: PictureChoices['part']): SheetFrame {
  const { origin, zoom } = view;
  if (part === 'view') return [origin[0], origin[1], view.widthPx / zoom, view.heightPx / zoom];
  if (frame !== null) return frameThrough(view.seenAs, frame);
  return frameThrough(rasterMap(view, raster) ?? undefined, [0, 0, raster.widthPx, raster.heightPx]);
}

/** The scale in the middle of what is shown; null before the section is set out. */
function scaleOf({ state, view }: PictureSubject, shown: SheetFrame): PictureScale | null {
  const { map } = readSetOut(state.document);
  if (map === null) return null;
  const about = { ...view, zoom: 1, origin: sheetPx(shown[0], shown[1]) };
  const middle = toSheet(about, screenPx(shown[2] / 2, shown[3] / 2));
  return pictureScaleAt(map, view.seenAs ?? null, middle);
}

function sceneOf({ state, notes, view }: PictureSubject, zoom: number) {
  return buildScene({
    document: state.document,
    preview: {},
    reading: state.reading,
    selection: NO_SELECTION,
    draftId: null,
    hiddenKinds: state.hiddenKinds,
    notes: notes.map((note) => ({ ...note, chosen: false })),
    guides: state.guides,
    map: readSetOut(state.document).map,
    readOnly: true,
    zoom,
    lineWeight: state.aids.lineWeight,
    seenAs: view.seenAs ?? null,
    frame: null,
  });
}

function legendOf({ state, notes }: PictureSubject): LegendEntry[] {
  const heads = state.reading?.lines.some((line) => line.head !== null) ?? false;
  return distinctEntries(legendEntries(state.document, state.hiddenKinds, { notes: notes.length, heads }));
}

const nameOf = (entry: LegendEntry) =>
  entry.shows === 'line' ? text.legend.line(entry) : text.legend[entry.shows];

function inPx({ x, y, width, height }: { x: number; y: number; width: number; height: number }) {
  return {
    x: x * PX_PER_MM,
    y: y * PX_PER_MM,
    width: width * PX_PER_MM,
    height: height * PX_PER_MM,
  };
}

function barsOf(scale: PictureScale, mmPerPx: number, system: 'SI' | 'US'): PictureBar[] {
  const unit = unitNames(system).length;
  const bar = (pxPerUnit: number, name: (figure: string, unit: string) => string): PictureBar => {
    const mmPerUnit = pxPerUnit * mmPerPx;
    const units = roundLength(BAR_MOST_MM / mmPerUnit);
    return { units, mmPerUnit, label: name(enteredText(units), unit), half: enteredText(units / 2) };
  };
  if (!scalesDiffer(scale)) return [bar(scale.level, text.bar)];
  return [bar(scale.level, text.barAlong), bar(scale.up, text.barUp)];
}

/** "487" or "500", to as many figures as a scale is named with. */
export function scaleFigure(n: number): string {
  return n >= 100 ? fixedText(n, 0) : plainText(n, 3);
}

function drawnScaleText(
  scale: PictureScale | null,
  mmPerPx: number,
  system: 'SI' | 'US',
  paper: Paper,
): string {
  if (scale === null) return text.notToScale;
  const n = (pxPerUnit: number) => scaleFigure(scaleNumber(mmPerPx * pxPerUnit, system));
  return scalesDiffer(scale)
    ? text.twoScalesOn(n(scale.level), n(scale.up), paper)
    : text.scaleOn(n(scale.level), paper);
}

/** As long as the scale's words can get, so that its cell takes no more room once they are known. */
function longestScale(scale: PictureScale | null, paper: Paper): string {
  if (scale === null) return text.notToScale;
  return scalesDiffer(scale) ? text.twoScalesOn('88888', '88888', paper) : text.scaleOn('88888', paper);
}

function cellsWith({ facts, state, view }: PictureSubject, drawnScale: string): PictureCell[] {
  const { unitSystem, datum } = state.document;
  const { length, pressure } = unitNames(unitSystem);
  const own: PictureCell[] = [
    { label: text.cells.datum, value: [text.datumAndUnits(datum, length, pressure)] },
    { label: text.cells.scale, value: [drawnScale] },
  ];
  const seen = [...sectionViews(state.reading?.frame ?? null)].find(
    ([, map]) => map !== null && JSON.stringify(map) === JSON.stringify(view.seenAs),
  );
  if (seen) own.push({ label: sectionViewText.title, value: [sectionViewText.views[seen[0]]] });
  const [section, ...rest] = facts.cells;
  return section === undefined ? own : [section, ...own, ...rest];
}
