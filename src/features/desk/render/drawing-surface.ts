import type { ScreenPart } from './screen-part.ts';

type Size = Pick<ScreenPart, 'width' | 'height'>;

/** Paints a canvas of the page anew as a whole. In the context that `paint` is given a unit is a screen pixel. */
export function drawAnew(
  canvas: HTMLCanvasElement,
  { width, height }: Size,
  paint: (context: CanvasRenderingContext2D) => void,
): void {
  const ratio = globalThis.devicePixelRatio || 1;
  const device = { width: Math.round(width * ratio), height: Math.round(height * ratio) };
  // Told a size, even the one it has, a canvas begins anew: with software rendering fresh memory takes as long as a net.
  if (canvas.width !== device.width || canvas.height !== device.height) {
    Object.assign(canvas, device);
    Object.assign(canvas.style, { width: `${width}px`, height: `${height}px` });
  }
  const context = canvas.getContext('2d');
  if (context === null) return;
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  context.clearRect(0, 0, width, height);
  paint(context);
}
