import { StaticCanvas } from 'fabric';
import type { Viewport } from '../model/viewport.ts';
import { createFabricScene } from './fabric-sink.ts';
import type { SceneItem } from './scene.ts';

export type ScenePainter = {
  /** Paints the scene as a view shows it into a context whose pixels are screen pixels from the view's corner. */
  paint(context: CanvasRenderingContext2D, view: Pick<Viewport, 'zoom' | 'origin'>): void;
  end(): void;
};

/** Paints a scene with the desk's own lines and marks, but into another canvas than the desk's and at any fineness. */
export function createScenePainter(
  items: readonly SceneItem[],
  size: { readonly widthPx: number; readonly heightPx: number },
): ScenePainter {
  // Never drawn itself: its objects only ask it which part of the sheet is seen, and how large.
  const canvas = new StaticCanvas(undefined, { renderOnAddRemove: false, enableRetinaScaling: false });
  canvas.width = size.widthPx;
  canvas.height = size.heightPx;
  createFabricScene(canvas)(items);
  return {
    paint(context, { zoom, origin }) {
      const [dx, dy] = [-origin[0] * zoom, -origin[1] * zoom];
      canvas.setViewportTransform([zoom, 0, 0, zoom, dx, dy]);
      context.save();
      context.transform(zoom, 0, 0, zoom, dx, dy);
      for (const object of canvas.getObjects()) object.render(context);
      context.restore();
    },
    end: () => void canvas.dispose(),
  };
}
