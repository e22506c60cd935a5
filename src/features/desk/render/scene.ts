import type { SheetPoint } from '#shared/contract/document.ts';
import type { AreaLook } from './guide-look.ts';
import type { LineLook } from './line-look.ts';

/** A line of the picture, in sheet pixels. */
export type SceneLine = {
  readonly id: string;
  readonly shape: 'line';
  readonly points: readonly SheetPoint[];
  readonly look: LineLook;
  /** Chosen lines are drawn stronger. */
  readonly strong: boolean;
};

export type MarkShape =
  | 'knownPoint'
  | 'readingPoint'
  | 'label'
  | 'callout'
  | 'balloon'
  | 'handle'
  | 'chosenHandle'
  | 'snapEnd'
  | 'snapLine'
  | 'snapVertex'
  | 'snapCrossing'
  | 'snapRightAngle'
  | 'snapBoundary'
  | 'snapExtension'
  | 'cross'
  | 'doubt';

/** Something of constant size on screen at a place of the sheet. */
export type SceneMark = {
  readonly id: string;
  readonly shape: MarkShape;
  readonly at: SheetPoint;
  readonly text: string;
  readonly colour: string;
  readonly strong: boolean;
  /** From its place to the middle of its text or box, screen pixels. */
  readonly offsetPx: readonly [number, number];
};

/** Tinted ground: closed outlines in sheet pixels. */
export type SceneArea = {
  readonly id: string;
  readonly shape: 'area';
  readonly outlines: readonly (readonly SheetPoint[])[];
  readonly look: AreaLook;
  readonly strong: false;
};

export type SceneItem = SceneLine | SceneMark | SceneArea;

/** Receives the difference between two scenes. */
export type SceneSink = {
  add(item: SceneItem, index: number): void;
  change(item: SceneItem): void;
  remove(id: string): void;
};

/** True when two items of the same id look the same. */
export function sameItem(a: SceneItem, b: SceneItem): boolean {
  if (a === b) return true;
  if (a.shape !== b.shape || a.strong !== b.strong) return false;
  if (a.shape === 'line' || b.shape === 'line') {
    return a.shape === 'line' && b.shape === 'line' && a.points === b.points && sameLook(a.look, b.look);
  }
  if (a.shape === 'area' || b.shape === 'area') {
    const same = a.shape === 'area' && b.shape === 'area' && a.outlines === b.outlines;
    return same && a.look.colour === b.look.colour && a.look.alpha === b.look.alpha;
  }
  return (
    a.at[0] === b.at[0] &&
    a.at[1] === b.at[1] &&
    a.text === b.text &&
    a.colour === b.colour &&
    a.offsetPx[0] === b.offsetPx[0] &&
    a.offsetPx[1] === b.offsetPx[1]
  );
}

function sameLook(a: LineLook, b: LineLook): boolean {
  return (
    a === b ||
    (a.colour === b.colour &&
      a.widthPx === b.widthPx &&
      a.end === b.end &&
      a.dashPx.join() === b.dashPx.join())
  );
}

/**
 * Tells a sink how to get from one scene to the next. Items are painted in the order of the list; an item that keeps
 * its place among the others is changed, one that moves up or down is taken out and put in again.
 */
export function diffScene(before: readonly SceneItem[], after: readonly SceneItem[], sink: SceneSink): void {
  const next = new Map(after.map((item) => [item.id, item]));
  const kept = before.filter((item) => next.has(item.id));
  for (const item of before) if (!next.has(item.id)) sink.remove(item.id);
  let place = 0;
  const here = kept.map((item) => item.id);
  const held = new Map(kept.map((item) => [item.id, item]));
  for (const item of after) {
    const old = held.get(item.id);
    if (old !== undefined && here[place] === item.id) {
      if (!sameItem(old, item) || old.shape !== item.shape) sink.change(item);
    } else {
      if (old !== undefined) {
        here.splice(here.indexOf(item.id), 1);
        sink.remove(item.id);
      }
      here.splice(place, 0, item.id);
      sink.add(item, place);
    }
    place += 1;
  }
}
