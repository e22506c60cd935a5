import type { ScreenPx } from '#shared/compute/frames.ts';
import type { ViewStore } from '../model/view-store.ts';

/** Zoom for one notch of a wheel is about 1.15, and finer for a trackpad's small steps. */
const WHEEL_ZOOM_PER_PX = 0.0014;
const PINCH_ZOOM_PER_PX = 0.01;
const PIXELS_PER_LINE = 16;
/** `WheelEvent.DOM_DELTA_LINE`. */
const BY_LINES = 1;

/** The wheel zooms about its place, and the space bar held down makes every press pan. */
export function attachWheel(
  element: HTMLElement,
  views: ViewStore,
  placeOf: (event: WheelEvent) => ScreenPx,
): { isSpaceHeld(): boolean; end(): void } {
  let spaceHeld = false;

  function wheel(event: WheelEvent): void {
    event.preventDefault();
    const unit = event.deltaMode === BY_LINES ? PIXELS_PER_LINE : 1;
    const rate = event.ctrlKey ? PINCH_ZOOM_PER_PX : WHEEL_ZOOM_PER_PX;
    views.zoom(Math.exp(-event.deltaY * unit * rate), placeOf(event));
  }

  function space(event: KeyboardEvent): void {
    if (event.code !== 'Space' || event.target !== element) return;
    spaceHeld = event.type === 'keydown';
  }

  const forget = () => {
    spaceHeld = false;
  };
  element.addEventListener('wheel', wheel, { passive: false });
  element.addEventListener('keydown', space);
  element.addEventListener('keyup', space);
  element.addEventListener('blur', forget);
  return {
    isSpaceHeld: () => spaceHeld,
    end() {
      element.removeEventListener('wheel', wheel);
      element.removeEventListener('keydown', space);
      element.removeEventListener('keyup', space);
      element.removeEventListener('blur', forget);
    },
  };
}
