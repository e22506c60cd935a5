import { type ScreenPx, type SheetPx, screenPx } from '#shared/compute/frames.ts';
import type { ViewStore } from '../model/view-store.ts';
import { sheetZoom, toSheet } from '../model/viewport.ts';
import type { HostView, ToolHost } from '../tools/tool-host.ts';
import type { Balloon, Modifiers } from '../tools/tool-types.ts';
import { fineTravel } from './fine-travel.ts';
import { createPalmGuard } from './palm-guard.ts';
import { apart, pinchStep } from './pinch.ts';
import { attachWheel } from './wheel-and-space.ts';

/** A press that stays within this is a click; a finger rolls and a pen slips more than a mouse. */
const STEADY_PX: Readonly<Record<string, number>> = { touch: 10, pen: 6, mouse: 4 };
const REACH_PX: Readonly<Record<string, number>> = { touch: 20, pen: 10, mouse: 8 };
/** While a finger places through the magnified view it reaches no farther than what is seen there to be meant. */
const REACH_HELD_PX = 5;
const DOUBLE_CLICK_MS = 400;
const DOUBLE_CLICK_PX: Readonly<Record<string, number>> = { touch: 16, pen: 8, mouse: 5 };
/** A finger that rests for so long holds what it is to place or to move. */
const HOLD_MS = 320;

export type GestureTarget = {
  readonly element: HTMLElement;
  readonly views: ViewStore;
  readonly host: ToolHost;
  balloons(): readonly Balloon[];
  /** True while the tool in hand sets something where the sheet is pressed. */
  places(): boolean;
  /** True while a press points at something rather than setting a place: a finger that rests then reaches as far as a tap. */
  pointsAt(): boolean;
  /** Tells where the pointer is, and that it has left (`null`). */
  onPointer(at: SheetPx | null, keys: Modifiers, view: HostView): void;
  onPanning(panning: boolean): void;
  /** Tells where the finger is that holds something to be placed, and that it has let go (`null`). */
  onFinger(at: ScreenPx | null): void;
};

/** `placing`: what is pressed follows the pointer and is set where it is let go; `tool`: the tool keeps the pointer. */
type Mode = 'none' | 'pressed' | 'placing' | 'tool' | 'pan';
const NEVER = { at: screenPx(-99, -99), time: Number.NEGATIVE_INFINITY };

/**
 * Turns pointers, wheel and pinch into panning, zooming and tool events. A mouse presses at once. One finger pans, a
 * tap places, and a finger that rests takes hold: it then moves what it holds, finely while it is slow. A pen places
 * and draws where it is let go, and while it is near, touches are the palm. Gives a function that ends it.
 */
export function attachGestures(target: GestureTarget): () => void {
  const { element, views, host } = target;
  const fingers = new Map<number, ScreenPx>();
  const palms = createPalmGuard();
  let mode: Mode = 'none';
  let pressedAt: ScreenPx = screenPx(0, 0);
  let last = { at: screenPx(0, 0), time: 0 };
  /** The place a finger holds, which a slow finger moves by less than its own way; null while none does. */
  let held: ScreenPx | null = null;
  let holdTimer: ReturnType<typeof setTimeout> | undefined;
  let lastClick = NEVER;

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
    reachPx: held === null || target.pointsAt() ? (REACH_PX[pointerType] ?? 8) : REACH_HELD_PX,
    balloons: target.balloons(),
  });
  const steadyPx = (event: PointerEvent) => STEADY_PX[event.pointerType] ?? 4;

  function setMode(next: Mode): void {
    if ((next === 'pan') !== (mode === 'pan')) target.onPanning(next === 'pan');
    mode = next;
  }

  const tool = (type: 'press' | 'move' | 'release', at: ScreenPx, event: PointerEvent) =>
    host.handle({ type, at: sheetAt(at), keys: keysOf(event) }, viewFor(event.pointerType));

  function press(event: PointerEvent): void {
    if (isControl(event.target, element)) return;
    if (event.pointerType === 'pen') leaveToPen(event);
    else if (palms.isPalm(event)) return;
    element.focus({ preventScroll: true });
    element.setPointerCapture(event.pointerId);
    const at = placeOf(event);
    if (event.pointerType === 'touch') {
      palms.began(event.pointerId);
      fingers.set(event.pointerId, at);
    }
    if (fingers.size > 1) {
      beginPinch(event);
      return;
    }
    pressedAt = at;
    last = { at, time: event.timeStamp };
    if (event.button === 1 || (event.button === 0 && wheel.isSpaceHeld())) {
      event.preventDefault();
      setMode('pan');
    } else if (event.button === 0 && event.pointerType === 'touch') {
      setMode('pressed');
      holdTimer = setTimeout(() => takeHold(event, at), HOLD_MS);
    } else if (event.button === 0) {
      tool('press', at, event);
      const places = event.pointerType === 'pen' && target.places();
      setMode(host.grabs() ? 'tool' : places ? 'placing' : 'pressed');
    }
  }

  /** The finger has rested: it holds what the tool takes up there, or the place where something is to be set. */
  function takeHold(event: PointerEvent, at: ScreenPx): void {
    tool('press', at, event);
    if (!host.grabs() && !target.places()) return;
    held = at;
    setMode(host.grabs() ? 'tool' : 'placing');
    target.onFinger(at);
    target.onPointer(sheetAt(at), keysOf(event), viewFor(event.pointerType));
  }

  function letGoOfHold(): void {
    clearTimeout(holdTimer);
    if (held === null) return;
    held = null;
    target.onFinger(null);
  }

  /** What was begun comes to nothing: a second finger makes it a pinch, or a pen has come and it was the palm. */
  function abandon(event: PointerEvent): void {
    letGoOfHold();
    if (mode === 'tool') host.handle({ type: 'abandonDrag' }, viewFor(event.pointerType));
    target.onPointer(null, keysOf(event), viewFor(event.pointerType));
    setMode('none');
  }

  function beginPinch(event: PointerEvent): void {
    abandon(event);
    setMode('pan');
  }

  function leaveToPen(event: PointerEvent): void {
    const dropped = palms.penSeen(event.timeStamp);
    if (dropped.length === 0) return;
    for (const id of dropped) fingers.delete(id);
    abandon(event);
  }

  function move(event: PointerEvent): void {
    if (event.pointerType === 'pen') leaveToPen(event);
    else if (palms.isIgnored(event.pointerId)) return;
    const at = placeOf(event);
    if (fingers.size > 1 && fingers.has(event.pointerId)) {
      pinch(event.pointerId, at);
      return;
    }
    if (mode === 'pressed' && apart(at, pressedAt) > steadyPx(event)) {
      letGoOfHold();
      setMode('pan');
    }
    if (mode === 'pan') views.pan(at[0] - last.at[0], at[1] - last.at[1]);
    if (held !== null) {
      held = fineTravel(held, last.at, at, event.timeStamp - last.time);
      target.onFinger(at);
    }
    const place = held ?? at;
    if (mode === 'tool') tool('move', place, event);
    if (fingers.has(event.pointerId)) fingers.set(event.pointerId, at);
    last = { at, time: event.timeStamp };
    // While the sheet is dragged the same place of it stays under the pointer; a finger only rests before it holds.
    const follows = mode !== 'pan' && (event.pointerType !== 'touch' || held !== null);
    if (follows) target.onPointer(sheetAt(place), keysOf(event), viewFor(event.pointerType));
  }

  function pinch(pointerId: number, at: ScreenPx): void {
    const [a, b] = [...fingers.values()];
    fingers.set(pointerId, at);
    const [c, d] = [...fingers.values()];
    const step = pinchStep([a!, b!], [c!, d!]);
    views.pan(step.dxPx, step.dyPx);
    views.zoom(step.factor, step.about);
  }

  function release(event: PointerEvent): void {
    if (event.pointerType === 'pen') leaveToPen(event);
    const palm = palms.isIgnored(event.pointerId);
    palms.ended(event.pointerId);
    if (palm) return;
    const wasPinch = fingers.size > 1;
    fingers.delete(event.pointerId);
    if (wasPinch) {
      // The finger that stays goes on panning from where it is; it does not click when lifted.
      last = { at: [...fingers.values()][0] ?? placeOf(event), time: event.timeStamp };
      return;
    }
    set(event, held ?? placeOf(event));
  }

  /** The only pointer is lifted: what the tool held is let go of, or something is set or chosen there. */
  function set(event: PointerEvent, at: ScreenPx): void {
    const still = apart(at, pressedAt) <= steadyPx(event);
    const view = viewFor(event.pointerType);
    const ended = mode;
    setMode('none');
    if (ended === 'pressed' && event.pointerType === 'touch') {
      // A tap, which has not pressed the tool yet.
      tool('press', pressedAt, event);
      if (host.grabs()) tool('release', pressedAt, event);
    }
    if (ended === 'tool') tool('release', at, event);
    const clicks = ended === 'pressed' || ended === 'placing' || (ended === 'tool' && still);
    if (clicks) click(at, event, view);
    letGoOfHold();
    target.onPointer(event.pointerType === 'touch' ? null : sheetAt(at), keysOf(event), view);
  }

  function click(at: ScreenPx, event: PointerEvent, view: HostView): void {
    const time = event.timeStamp;
    const again =
      time - lastClick.time < DOUBLE_CLICK_MS &&
      apart(at, lastClick.at) < (DOUBLE_CLICK_PX[event.pointerType] ?? 5);
    lastClick = again ? NEVER : { at, time };
    host.handle({ type: 'click', at: sheetAt(at), keys: keysOf(event), count: again ? 2 : 1 }, view);
  }

  function cancel(event: PointerEvent): void {
    const palm = palms.isIgnored(event.pointerId);
    palms.ended(event.pointerId);
    fingers.delete(event.pointerId);
    if (!palm) abandon(event);
  }

  function leave(event: PointerEvent): void {
    if (mode === 'none') target.onPointer(null, keysOf(event), viewFor(event.pointerType));
  }

  /** A finger that rests would open the browser's menu over what it holds. */
  function menu(event: Event): void {
    if (fingers.size > 0) event.preventDefault();
  }

  const wheel = attachWheel(element, views, placeOf);
  const listeners = { pointerdown: press, pointermove: move, pointerup: release, pointercancel: cancel };
  for (const [type, listen] of Object.entries({ ...listeners, pointerleave: leave, contextmenu: menu }))
    element.addEventListener(type, listen as EventListener);
  return () => {
    clearTimeout(holdTimer);
    wheel.end();
    for (const [type, listen] of Object.entries({ ...listeners, pointerleave: leave, contextmenu: menu }))
      element.removeEventListener(type, listen as EventListener);
  };
}

/** Buttons and panels that lie over the sheet keep their own pointers. */
function isControl(pressed: EventTarget | null, sheet: HTMLElement): boolean {
  if (pressed === sheet || pressed === null) return false;
  const node = pressed as Node;
  const element = 'closest' in node ? (node as Element) : node.parentElement;
  return (element?.closest('[data-over-sheet], dialog') ?? null) !== null;
}

function keysOf(event: PointerEvent): Modifiers {
  return { shift: event.shiftKey, alt: event.altKey, ctrl: event.ctrlKey || event.metaKey };
}
