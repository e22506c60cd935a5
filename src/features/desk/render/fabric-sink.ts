import type { StaticCanvas } from 'fabric';
import { diffScene, type SceneItem, type SceneSink } from './scene.ts';
import { SheetArea } from './sheet-area.ts';
import { SheetMark } from './sheet-mark.ts';
import { TraceLine } from './trace-line.ts';

type SheetObject = TraceLine | SheetMark | SheetArea;

/** Keeps fabric's objects in step with scenes; tells of each scene whether it differs from the one before. */
export function createFabricScene(canvas: StaticCanvas): (items: readonly SceneItem[]) => boolean {
  const objects = new Map<string, SheetObject>();
  let shown: readonly SceneItem[] = [];
  let changed = false;
  const sink: SceneSink = {
    add(item, index) {
      changed = true;
      const object = objectOf(item);
      objects.set(item.id, object);
      canvas.insertAt(index, object);
    },
    change(item) {
      changed = true;
      const object = objects.get(item.id);
      if (object instanceof TraceLine && item.shape === 'line') object.show(item);
      else if (object instanceof SheetArea && item.shape === 'area') object.show(item);
      else if (object instanceof SheetMark && item.shape !== 'line' && item.shape !== 'area')
        object.show(item);
    },
    remove(id) {
      changed = true;
      const object = objects.get(id);
      if (object === undefined) return;
      objects.delete(id);
      canvas.remove(object);
    },
  };
  return (items) => {
    changed = false;
    diffScene(shown, items, sink);
    shown = items;
    return changed;
  };
}

function objectOf(item: SceneItem): SheetObject {
  if (item.shape === 'line') return new TraceLine(item);
  return item.shape === 'area' ? new SheetArea(item) : new SheetMark(item);
}
