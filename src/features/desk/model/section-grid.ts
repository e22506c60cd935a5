import { screenPx, sectionPt } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { toScreen, toSheet, type Viewport } from './viewport.ts';

type Place = readonly [x: number, y: number];

/** A line of equal offset or elevation, screen pixels, with the place of its label at the view's edge. */
export type GridLine = {
  readonly of: 'offset' | 'elevation';
  readonly value: number;
  readonly from: Place;
  readonly to: Place;
  readonly label: Place | null;
};
export type SectionGrid = {
  readonly lines: readonly GridLine[];
  /** Distance from line to line, section units, and the decimals that it needs. */
  readonly offsetStep: number;
  readonly elevationStep: number;
};

/** Lines stand at least so far apart on screen. */
const LEAST_APART_PX = 90;
/** More lines than this are no help: the map then flattens the section. */
const MOST_LINES = 80;
const LABEL_INSET_PX = 6;

/**
 * The lines of round offsets and elevations that cross a view, through the set-out map, so that they lie over the printed
 * ones where the set-out is right. Null where the view is empty.
 */
export function sectionGridOf(map: SectionMap, view: Viewport): SectionGrid | null {
  if (view.widthPx <= 0 || view.heightPx <= 0) return null;
  const corners = [
    [0, 0],
    [view.widthPx, 0],
    [0, view.heightPx],
    [view.widthPx, view.heightPx],
  ].map(([x, y]) => map.toSection(toSheet(view, screenPx(x!, y!))));
  const range = (axis: 0 | 1) => {
    const values = corners.map((corner) => corner[axis]);
    return [Math.min(...values), Math.max(...values)] as const;
  };
  const [offsets, elevations] = [range(0), range(1)];
  const middle = map.toSection(toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2)));
  const onScreen = (offset: number, elevation: number): Place =>
    toScreen(view, map.toSheet(sectionPt(offset, elevation)));
  const apart = (a: Place, b: Place) => Math.hypot(a[0] - b[0], a[1] - b[1]);
  const here = onScreen(middle[0], middle[1]);
  const perOffset = apart(here, onScreen(middle[0] + 1, middle[1]));
  const perElevation = apart(here, onScreen(middle[0], middle[1] + 1));
  const offsetStep = roundStep(LEAST_APART_PX / perOffset);
  const elevationStep = roundStep(LEAST_APART_PX / perElevation);
  const lines = [
    ...multiples(offsets, offsetStep).map((value): GridLine => {
      const [from, to] = [onScreen(value, elevations[0]), onScreen(value, elevations[1])];
      return {
        of: 'offset',
        value,
        from,
        to,
        label: atHeight(from, to, view.heightPx - LABEL_INSET_PX, view.widthPx),
      };
    }),
    ...multiples(elevations, elevationStep).map((value): GridLine => {
      const [from, to] = [onScreen(offsets[0], value), onScreen(offsets[1], value)];
      return { of: 'elevation', value, from, to, label: atSide(from, to, LABEL_INSET_PX, view.heightPx) };
    }),
  ];
  return { lines, offsetStep, elevationStep };
}

/** The least of 1, 2 and 5 times a power of ten that is no less. */
export function roundStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 5, 10].find((each) => each * power >= least * (1 - 1e-9)) ?? 10;
  return factor * power;
}

/** Decimals that the multiples of a round step need. */
export function decimalsOf(step: number): number {
  return Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
}

function multiples([from, to]: readonly [number, number], step: number): number[] {
  const [first, last] = [Math.ceil(from / step), Math.floor(to / step)];
  if (!(last - first < MOST_LINES)) return [];
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step);
}

/** Where a line passes a height of the view; null where it does not within its width. */
function atHeight(from: Place, to: Place, y: number, width: number): Place | null {
  const part = (y - from[1]) / (to[1] - from[1]);
  const x = from[0] + part * (to[0] - from[0]);
  return part >= 0 && part <= 1 && x >= 0 && x <= width ? [x, y] : null;
}

function atSide(from: Place, to: Place, x: number, height: number): Place | null {
  const part = (x - from[0]) / (to[0] - from[0]);
  const y = from[1] + part * (to[1] - from[1]);
  return part >= 0 && part <= 1 && y >= 0 && y <= height ? [x, y] : null;
}
