import { StaticCanvas } from 'fabric';
import type { Viewport } from '../model/viewport.ts';
import { diffScene, type SceneItem, type SceneSink } from './scene.ts';
import type { ScreenPart } from './screen-part.ts';
import { SheetArea } from './sheet-area.ts';
import { SheetMark } from './sheet-mark.ts';
import { TraceLine } from './trace-line.ts';

type SheetObject = TraceLine | SheetMark | SheetArea;

export type FabricScene = {
  /** Takes a scene on; true when it differs from the one before. */
  show(items: readonly SceneItem[]): boolean;
  isEmpty(): boolean;
  /** Paints a part of a view into a context whose pixels are screen pixels from the part's corner. */
  paint(context: CanvasRenderingContext2D, view: Pick<Viewport, 'zoom' | 'origin'>, part: ScreenPart): void;
  end(): void;
};

/** A scene as objects of fabric's, kept in step with what it is told. They paint into any context and at any fineness. */
export function createFabricScene(): FabricScene {
  // Never drawn itself: its objects only ask it which part of the sheet is seen, and how large.
  const canvas = new StaticCanvas(undefined, { renderOnAddRemove: false, enableRetinaScaling: false });
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
  return {
    show(items) {
      changed = false;
      diffScene(shown, items, sink);
      shown = items;
      return changed;
    },
    isEmpty: () => canvas.isEmpty(),
    paint(context, { zoom, origin }, part) {
      const [dx, dy] = [-origin[0] * zoom - part.x, -origin[1] * zoom - part.y];
      canvas.width = part.width;
      canvas.height = part.height;
      canvas.setViewportTransform([zoom, 0, 0, zoom, dx, dy]);
      context.save();
      context.transform(zoom, 0, 0, zoom, dx, dy);
      canvas.forEachObject((object) => object.render(context));
      context.restore();
    },
    end: () => void canvas.dispose(),
  };
}

function objectOf(item: SceneItem): SheetObject {
  if (item.shape === 'line') return new TraceLine(item);
  return item.shape === 'area' ? new SheetArea(item) : new SheetMark(item);
}
