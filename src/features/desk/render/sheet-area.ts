import { FabricObject } from 'fabric';
import type { SheetFrame } from '../model/viewport.ts';
import { HALO } from './line-look.ts';
import type { SceneArea } from './scene.ts';
import { framesMeet, seenBy } from './seen-by.ts';

const EDGE_PX = 1.2;

/** Ground of the sheet tinted in one tone; what lies beneath stays legible. */
export class SheetArea extends FabricObject {
  declare item: SceneArea;
  declare frame: SheetFrame;

  constructor(item: SceneArea) {
    super({ objectCaching: false, selectable: false, evented: false });
    this.show(item);
  }

  show(item: SceneArea): void {
    this.item = item;
    let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
    for (const [x, y] of item.outlines.flat()) {
      left = Math.min(left, x);
      right = Math.max(right, x);
      top = Math.min(top, y);
      bottom = Math.max(bottom, y);
    }
    this.frame = [left, top, right - left, bottom - top];
  }

  override render(context: CanvasRenderingContext2D): void {
    const zoom = this.canvas?.viewportTransform[0] ?? 1;
    const seen = seenBy(this.canvas, EDGE_PX);
    if (seen === null || !framesMeet(this.frame, seen)) return;
    const { colour, alpha, edged } = this.item.look;
    context.save();
    context.beginPath();
    for (const outline of this.item.outlines) {
      outline.forEach(([x, y], i) => {
        if (i === 0) context.moveTo(x, y);
        else context.lineTo(x, y);
      });
      context.closePath();
    }
    context.globalAlpha = alpha;
    context.fillStyle = colour;
    context.fill();
    if (edged) {
      context.globalAlpha = HALO.alpha;
      context.strokeStyle = HALO.colour;
      context.lineWidth = (EDGE_PX + HALO.widthPx) / zoom;
      context.stroke();
      context.globalAlpha = 1;
      context.strokeStyle = colour;
      context.lineWidth = EDGE_PX / zoom;
      context.stroke();
    }
    context.restore();
  }
}
