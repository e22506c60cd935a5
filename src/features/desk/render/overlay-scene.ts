import type { LineKind, SheetPoint } from '#shared/contract/document.ts';
import type { Snap, SnapKind, ToolOverlay } from '../model/tool-overlay.ts';
import { COLOURS, lookOf } from './line-look.ts';
import type { MarkShape, SceneItem } from './scene.ts';
import { sketchItems } from './sketch-items.ts';

/** What the tool in hand shows under the pointer: the band to the next point and what it snaps to. */
export function overlayScene(overlay: ToolOverlay, kind: LineKind | null): SceneItem[] {
  const items: SceneItem[] = [];
  const colour = kind === null ? COLOURS.ink : lookOf(kind).colour;
  const points = overlay.path ?? overlay.rubber?.map(([x, y]): SheetPoint => [x, y]) ?? [];
  if (points.length > 1) {
    const look = { colour, widthPx: 1.6, dashPx: [4, 3], end: 'none', hatchPx: 0 } as const;
    items.push({ id: 'rubber', shape: 'line', points, look, strong: false });
  }
  if (overlay.rubber !== null) {
    const [, to] = overlay.rubber;
    items.push({ ...markAt('next', 'cross', to[0], to[1]), colour: COLOURS.ink });
  }
  if (overlay.snap !== null) items.push(...snapItems(overlay.snap, colour));
  if (overlay.drawnCrossing) {
    const [x, y] = overlay.drawnCrossing;
    items.push({ ...markAt('drawnCrossing', 'snapCrossing', x, y), colour: COLOURS.ink });
  }
  items.push(...sketchItems(overlay.sketches ?? []));
  return items;
}

/** Each kind of snap has a mark of its own, so that it is not told by its place or colour alone. */
const SNAP_SHAPES: Readonly<Record<SnapKind, MarkShape>> = {
  end: 'snapEnd',
  crossing: 'snapCrossing',
  vertex: 'snapVertex',
  rightAngle: 'snapRightAngle',
  boundary: 'snapBoundary',
  line: 'snapLine',
  extension: 'snapExtension',
};
const ONWARD_LOOK = { widthPx: 1, dashPx: [2, 4], end: 'none', hatchPx: 0 } as const;

function snapItems({ kind, at, from }: Snap, colour: string): SceneItem[] {
  const mark = { ...markAt('snap', SNAP_SHAPES[kind], at[0], at[1]), colour };
  if (from === null) return [mark];
  const points = [from, at].map(([x, y]): SheetPoint => [x, y]);
  return [{ id: 'onward', shape: 'line', points, look: { colour, ...ONWARD_LOOK }, strong: false }, mark];
}

function markAt(id: string, shape: MarkShape, x: number, y: number) {
  return { id, shape, at: [x, y] as [number, number], text: '', strong: false, offsetPx: [0, 0] as const };
}
