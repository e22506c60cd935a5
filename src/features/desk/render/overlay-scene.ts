import type { LineKind } from '#shared/contract/document.ts';
import type { ToolOverlay } from '../model/tool-overlay.ts';
import { COLOURS, lookOf } from './line-look.ts';
import type { SceneItem } from './scene.ts';

/** What the tool in hand shows under the pointer: the band to the next point and what it snaps to. */
export function overlayScene(overlay: ToolOverlay, kind: LineKind | null): SceneItem[] {
  const items: SceneItem[] = [];
  const colour = kind === null ? COLOURS.ink : lookOf(kind).colour;
  if (overlay.rubber !== null) {
    const [from, to] = overlay.rubber;
    const look = { colour, widthPx: 1.6, dashPx: [4, 3], end: 'none', hatchPx: 0 } as const;
    items.push({
      id: 'rubber',
      shape: 'line',
      points: [
        [from[0], from[1]],
        [to[0], to[1]],
      ],
      look,
      strong: false,
    });
    items.push({ ...markAt('next', 'cross', to[0], to[1]), colour: COLOURS.ink });
  }
  if (overlay.snap !== null) {
    const { at, kind: snapped } = overlay.snap;
    items.push({ ...markAt('snap', snapped === 'line' ? 'snapLine' : 'snapEnd', at[0], at[1]), colour });
  }
  return items;
}

function markAt(id: string, shape: 'cross' | 'snapEnd' | 'snapLine', x: number, y: number) {
  return { id, shape, at: [x, y] as [number, number], text: '', strong: false, offsetPx: [0, 0] as const };
}
