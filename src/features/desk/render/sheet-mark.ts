import { FabricObject } from 'fabric';
import { COLOURS } from './line-look.ts';
import { MARK_PAINTERS } from './mark-shapes.ts';
import type { SceneMark } from './scene.ts';
import { MARK_REACH_PX } from './screen-part.ts';
import { framesMeet, seenBy } from './seen-by.ts';

/** A mark at a place of the sheet that keeps its size on screen. */
export class SheetMark extends FabricObject {
  declare item: SceneMark;

  constructor(item: SceneMark) {
    super({ objectCaching: false, selectable: false, evented: false });
    this.show(item);
  }

  show(item: SceneMark): void {
    this.item = item;
  }

  override render(context: CanvasRenderingContext2D): void {
    const zoom = this.canvas?.viewportTransform[0] ?? 1;
    const seen = seenBy(this.canvas, MARK_REACH_PX);
    const [x, y] = this.item.at;
    if (seen === null || !framesMeet([x, y, 0, 0], seen)) return;
    context.save();
    context.translate(x, y);
    context.scale(1 / zoom, 1 / zoom);
    context.strokeStyle = this.item.colour;
    context.fillStyle = COLOURS.film;
    context.textAlign = 'center';
    context.textBaseline = 'middle';
    MARK_PAINTERS[this.item.shape](context, this.item);
    context.restore();
  }
}
