import type { StaticCanvas } from 'fabric';
import { diffScene, type SceneItem, type SceneSink } from './scene.ts';
import { SheetMark } from './sheet-mark.ts';
import { TraceLine } from './trace-line.ts';

type SheetObject = TraceLine | SheetMark;

/**
 * Keeps fabric's objects in step with scenes. The canvas holds the base scene and above it the overlay, which changes
 * with every movement of the pointer and so is compared on its own.
 */
export function createFabricScenes(canvas: StaticCanvas) {
  const base = createBand(canvas, () => 0);
  const overlay = createBand(canvas, () => base.size());
  return { showBase: base.show, showOverlay: overlay.show };
}

function createBand(canvas: StaticCanvas, firstIndex: () => number) {
  const objects = new Map<string, SheetObject>();
  let shown: readonly SceneItem[] = [];
  const sink: SceneSink = {
    add(item, index) {
      const object = item.shape === 'line' ? new TraceLine(item) : new SheetMark(item);
      objects.set(item.id, object);
      canvas.insertAt(firstIndex() + index, object);
    },
    change(item) {
      const object = objects.get(item.id);
      if (object instanceof TraceLine && item.shape === 'line') object.show(item);
      else if (object instanceof SheetMark && item.shape !== 'line') object.show(item);
    },
    remove(id) {
      const object = objects.get(id);
      if (object === undefined) return;
      objects.delete(id);
      canvas.remove(object);
    },
  };
  return {
    size: () => objects.size,
    show(items: readonly SceneItem[]): void {
      diffScene(shown, items, sink);
      shown = items;
    },
  };
}
