import { type Placeable, type Placed, placeApart, rectAbout } from '#shared/compute/geometry/place-apart.ts';
import { placesAlong } from '#shared/compute/geometry/places-along.ts';
import { createTakenSpace, type Rect, type TakenSpace } from '#shared/compute/geometry/taken-space.ts';
import type { LineKind, SheetPoint } from '#shared/contract/document.ts';
import type { FigurePoint, SectionFigure } from './section-figure.ts';

/** What a figure is drawn on, in its own units: points of paper, or pixels. */
export interface LabelSetting {
  /** Units to a pixel of the sheet. */
  readonly scale: number;
  /** Size of the letters. */
  readonly letters: number;
  widthOf(text: string): number;
}

/** A label in its place, in units of what it is drawn on from the upper left corner of the figure. */
export interface FigureLabel {
  readonly text: string;
  readonly of: LineKind | 'point' | 'knownPoint';
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  /** On which the letters stand, so that capitals and figures are in the middle of the box. */
  readonly baseLine: number;
}

/** Height of a capital or a figure in the product's font, as a part of the letters' size. */
const CAPITAL = 0.7;
/** Room about the letters, and from a mark to its label, as parts of the letters' size. */
const PADDING = 0.25;
const LINE_HEIGHT = 1.3;
const GAP = 0.45;
/** Lines whose heads might be taken for one another's. */
const OF_ONE_HEAD: ReadonlySet<LineKind> = new Set([
  'equipotential',
  'submergedFace',
  'outflowFace',
  'drain',
]);
/** Times as far from another such line as from the end of its own: slantwise that is √2 times the gap. */
const APART = 2.5;
/** Half of the room that the ring of a reading point or the cross of a known point takes. */
const MARK = 0.6;

/**
 * Where the names of points and the heads of lines stand in the figure so that none covers another or a point: at their
 * point or at the end of their line, or else along the line, even across another one. Beside its line a head is never as
 * near to another line of one head. A head for which there is no room is left out, as two that lie over each other would
 * be misread; points always have their names.
 */
export function placeFigureLabels(figure: SectionFigure, setting: LabelSetting): FigureLabel[] {
  const [left, top, width, height] = figure.crop;
  const { scale, letters } = setting;
  const on = ([x, y]: SheetPoint): [number, number] => [(x - left) * scale, (y - top) * scale];
  const known = figure.knownPoints.filter(
    ({ at: [x, y] }) => isWithin(x - left, width) && isWithin(y - top, height),
  );
  const marks = [...figure.points, ...known].map(({ at }) =>
    rectAbout(...on(at), 2 * MARK * letters, 2 * MARK * letters),
  );
  const taken = withinFigure(createTakenSpace(marks), {
    left: 0,
    top: 0,
    right: width * scale,
    bottom: height * scale,
  });
  const lines = figure.lines.map(({ id, kind, points }) => ({ id, kind, points: points.map(on) }));
  const along = placesAlong(() => lines, 1);
  const ofOneHead = placesAlong(() => lines.filter(({ kind }) => OF_ONE_HEAD.has(kind)), 1);
  const isMistakable = (id: string, [x, y]: readonly [number, number], { widthPx, heightPx }: Size) => {
    const room = 2 * APART * GAP * letters;
    return ofOneHead.coversAnother(id, [x, y], { widthPx: widthPx + room, heightPx: heightPx + room });
  };

  const sized = (text: string) => ({
    widthPx: setting.widthOf(text) + 2 * PADDING * letters,
    heightPx: LINE_HEIGHT * letters,
  });
  const named = (of: 'point' | 'knownPoint', points: readonly FigurePoint[]): Wanted[] =>
    points.map(({ name, at }, i) => {
      const size = sized(name);
      const offsets = beside(size, (MARK + GAP / 2) * letters);
      // Below, since heads of lines that end at a known point stand above.
      return {
        of,
        text: name,
        id: `${of} ${i}`,
        ...place(on(at)),
        ...size,
        offsets: of === 'point' ? offsets : offsets.toReversed(),
      };
    });
  const heads: Wanted[] = figure.lines.flatMap(({ id, kind, label, points: [first] }) => {
    if (first === undefined || label === '') return [];
    const [size, at] = [sized(label), on(first)];
    const offsets = beside(size, GAP * letters);
    const isClear = ([dx, dy]: readonly [number, number]) =>
      !isMistakable(id, [at[0] + dx, at[1] + dy], size);
    return [
      {
        of: kind,
        text: label,
        id,
        ...place(at),
        ...size,
        // A name, as of a boundary, is taken for no head.
        offsets: OF_ONE_HEAD.has(kind) ? offsets.filter(isClear) : offsets,
        elsewhere: function* () {
          yield* along.of(id, at, size);
          yield* along.over(id, at);
        },
        mayGo: true,
      },
    ];
  });
  return [named('point', figure.points), named('knownPoint', known), heads].flatMap((wanted) =>
    placedLabels(wanted, taken, (CAPITAL / 2) * letters),
  );
}

type Wanted = Placeable & Pick<FigureLabel, 'of' | 'text'>;
type Size = Pick<Placeable, 'widthPx' | 'heightPx'>;

const place = ([x, y]: readonly [number, number]) => ({ x, y });
const isWithin = (value: number, most: number) => value >= 0 && value <= most;

function placedLabels(wanted: readonly Wanted[], taken: TakenSpace, belowMiddle: number): FigureLabel[] {
  const places = placeApart(wanted, taken);
  return wanted.flatMap((label) => {
    const placed: Placed | null = places.get(label.id) ?? null;
    if (placed === null) return [];
    const { text, of, widthPx: width, heightPx: height } = label;
    const [x, y] = [placed.at[0] + placed.offset[0], placed.at[1] + placed.offset[1]];
    const [left, top] = [x - width / 2, y - height / 2];
    return [{ text, of, left, top, width, height, baseLine: y + belowMiddle }];
  });
}

/** Middles of boxes about a place, at its upper right first and below it last. */
function beside({ widthPx, heightPx }: Size, gap: number): Array<readonly [number, number]> {
  const [side, row] = [widthPx / 2 + gap, heightPx / 2 + gap];
  return [
    [side, -row],
    [-side, -row],
    [side, 0],
    [-side, 0],
    [0, -row],
    [0, row],
  ];
}

/** What would be cut off at the edge of the figure is no free place. */
function withinFigure(taken: TakenSpace, figure: Rect): TakenSpace {
  return {
    add: taken.add,
    isFree: (rect) =>
      rect.left >= figure.left &&
      rect.right <= figure.right &&
      rect.top >= figure.top &&
      rect.bottom <= figure.bottom &&
      taken.isFree(rect),
  };
}
