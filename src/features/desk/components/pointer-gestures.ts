import { type ScreenPx, type SheetPx, screenPx } from '#shared/compute/frames.ts';
import type { ViewStore } from '../model/view-store.ts';
import { sheetZoom, toSheet } from '../model/viewport.ts';
import type { HostView, ToolHost } from '../tools/tool-host.ts';
import type { Balloon, Modifiers } from '../tools/tool-types.ts';

/** A press that stays within this is a click; a finger rolls more than a mouse. */
const STEADY_MOUSE_PX = 4;
const STEADY_TOUCH_PX = 10;
const REACH_MOUSE_PX = 8;
const REACH_TOUCH_PX = 20;
const DOUBLE_CLICK_MS = 400;
/** Zoom for one notch of a wheel is about 1.15, and finer for a trackpad's small steps. */
const WHEEL_ZOOM_PER_PX = 0.0014;
const PINCH_ZOOM_PER_PX = 0.01;
const PIXELS_PER_LINE = 16;

export type GestureTarget = {
  readonly element: HTMLElement;
  readonly views: ViewStore;
  readonly host: ToolHost;
  balloons(): readonly Balloon[];
  /** Tells where the pointer is, and that it has left (`null`). */
  onPointer(at: SheetPx | null, keys: Modifiers, view: HostView): void;
  onPanning(panning: boolean): void;
};

type Mode = 'none' | 'pressed' | 'tool' | 'pan';

/** Turns pointers, wheel and pinch into panning, zooming and tool events. Gives a function that ends it. */
export function attachGestures(target: GestureTarget): () => void {
  const { element, views, host } = target;
  const fingers = new Map<number, ScreenPx>();
  let mode: Mode = 'none';
  let pressedAt: ScreenPx = screenPx(0, 0);
  let lastAt: ScreenPx = screenPx(0, 0);
  let lastClick = { at: screenPx(-99, -99), time: 0 };
  let spaceHeld = false;

  const placeOf = (event: { clientX: number; clientY: number }): ScreenPx => {
    const box = element.getBoundingClientRect();
    return screenPx(
      event.clientX - box.left - element.clientLeft,
      event.clientY - box.top - element.clientTop,
    );
  };
  const sheetAt = (at: ScreenPx) => toSheet(views.getState().view, at);
  const viewFor = (pointerType: string): HostView => ({
    zoom: sheetZoom(views.getState().view),
    reachPx: pointerType === 'touch' ? REACH_TOUCH_PX : REACH_MOUSE_PX,
    balloons: target.balloons(),
  });

  function setMode(next: Mode): void {
    if ((next === 'pan') !== (mode === 'pan')) target.onPanning(next === 'pan');
    mode = next;
  }

  function press(event: PointerEvent): void {
    if (event.target instanceof Node && event.target !== element && isControl(event.target)) return;
    element.focus({ preventScroll: true });
    element.setPointerCapture(event.pointerId);
    const at = placeOf(event);
    if (event.pointerType === 'touch') fingers.set(event.pointerId, at);
    if (fingers.size > 1) {
      beginPinch(event);
      return;
    }
    pressedAt = at;
    lastAt = at;
    if (event.button === 1 || (event.button === 0 && spaceHeld)) {
      event.preventDefault();
      setMode('pan');
    } else if (event.button === 0) {
      host.handle({ type: 'press', at: sheetAt(at), keys: keysOf(event) }, viewFor(event.pointerType));
      setMode(host.grabs() ? 'tool' : 'pressed');
    }
  }

  /** A second finger makes it a pinch: whatever the first one began is let go of. */
  function beginPinch(event: PointerEvent): void {
    if (mode === 'tool') host.handle({ type: 'abandonDrag' }, viewFor(event.pointerType));
    setMode('pan');
  }

  function move(event: PointerEvent): void {
    const at = placeOf(event);
    if (fingers.size > 1 && fingers.has(event.pointerId)) {
      pinch(event.pointerId, at);
      return;
    }
    const steady = event.pointerType === 'touch' ? STEADY_TOUCH_PX : STEADY_MOUSE_PX;
    if (mode === 'pressed' && distance(at, pressedAt) > steady) setMode('pan');
    if (mode === 'pan') views.pan(at[0] - lastAt[0], at[1] - lastAt[1]);
    if (mode === 'tool') {
      host.handle({ type: 'move', at: sheetAt(at), keys: keysOf(event) }, viewFor(event.pointerType));
    }
    if (fingers.has(event.pointerId)) fingers.set(event.pointerId, at);
    lastAt = at;
    // While the sheet is dragged the same place of it stays under the pointer.
    if (mode !== 'pan') target.onPointer(sheetAt(at), keysOf(event), viewFor(event.pointerType));
  }

  function pinch(pointerId: number, at: ScreenPx): void {
    const before = [...fingers.values()];
    fingers.set(pointerId, at);
    const after = [...fingers.values()];
    const [a, b] = [before[0]!, before[1]!];
    const [c, d] = [after[0]!, after[1]!];
    views.pan((c[0] + d[0] - a[0] - b[0]) / 2, (c[1] + d[1] - a[1] - b[1]) / 2);
    const factor = distance(c, d) / Math.max(1, distance(a, b));
    views.zoom(factor, screenPx((c[0] + d[0]) / 2, (c[1] + d[1]) / 2));
  }

  function release(event: PointerEvent): void {
    const at = placeOf(event);
    const wasPinch = fingers.size > 1;
    fingers.delete(event.pointerId);
    if (wasPinch) {
      // The finger that stays goes on panning from where it is; it does not click when lifted.
      lastAt = [...fingers.values()][0] ?? at;
      return;
    }
    const view = viewFor(event.pointerType);
    const keys = keysOf(event);
    const steady = event.pointerType === 'touch' ? STEADY_TOUCH_PX : STEADY_MOUSE_PX;
    const ended = mode;
    setMode('none');
    if (ended === 'tool') host.handle({ type: 'release', at: sheetAt(at), keys }, view);
    const still = distance(at, pressedAt) <= steady;
    if (ended === 'pressed' || (ended === 'tool' && still)) click(at, keys, view);
    target.onPointer(event.pointerType === 'touch' ? null : sheetAt(at), keys, view);
  }

  function click(at: ScreenPx, keys: Modifiers, view: HostView): void {
    const time = performance.now();
    const again = time - lastClick.time < DOUBLE_CLICK_MS && distance(at, lastClick.at) < STEADY_MOUSE_PX + 1;
    lastClick = again ? { at: screenPx(-99, -99), time: 0 } : { at, time };
    host.handle({ type: 'click', at: sheetAt(at), keys, count: again ? 2 : 1 }, view);
  }

  function cancel(event: PointerEvent): void {
    fingers.delete(event.pointerId);
    if (mode === 'tool') host.handle({ type: 'abandonDrag' }, viewFor(event.pointerType));
    setMode('none');
  }

  function leave(event: PointerEvent): void {
    if (mode === 'none') target.onPointer(null, keysOf(event), viewFor(event.pointerType));
  }

  function wheel(event: WheelEvent): void {
    event.preventDefault();
    const unit = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? PIXELS_PER_LINE : 1;
    const rate = event.ctrlKey ? PINCH_ZOOM_PER_PX : WHEEL_ZOOM_PER_PX;
    views.zoom(Math.exp(-event.deltaY * unit * rate), placeOf(event));
  }

  function space(event: KeyboardEvent): void {
    if (event.code !== 'Space' || event.target !== element) return;
    event.preventDefault();
    spaceHeld = event.type === 'keydown';
  }

  const forget = () => {
    spaceHeld = false;
  };
  element.addEventListener('pointerdown', press);
  element.addEventListener('pointermove', move);
  element.addEventListener('pointerup', release);
  element.addEventListener('pointercancel', cancel);
  element.addEventListener('pointerleave', leave);
  element.addEventListener('wheel', wheel, { passive: false });
  element.addEventListener('keydown', space);
  element.addEventListener('keyup', space);
  element.addEventListener('blur', forget);
  return () => {
    element.removeEventListener('pointerdown', press);
    element.removeEventListener('pointermove', move);
    element.removeEventListener('pointerup', release);
    element.removeEventListener('pointercancel', cancel);
    element.removeEventListener('pointerleave', leave);
    element.removeEventListener('wheel', wheel);
    element.removeEventListener('keydown', space);
    element.removeEventListener('keyup', space);
    element.removeEventListener('blur', forget);
  };
}

/** Buttons and panels that lie over the sheet keep their own pointers. */
function isControl(node: Node): boolean {
  const element = node instanceof Element ? node : node.parentElement;
  return element?.closest('[data-over-sheet]') !== null;
}

function keysOf(event: PointerEvent): Modifiers {
  return { shift: event.shiftKey, alt: event.altKey, ctrl: event.ctrlKey || event.metaKey };
}

function distance(a: ScreenPx, b: ScreenPx): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1]);
}
