import { type ScreenPx, type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { type CrosshairStore, firstPlace, panToSee, type Stride, stepped } from '../model/crosshair.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { lineChoiceOf } from '../model/tool-choice.ts';
import type { ViewStore } from '../model/view-store.ts';
import { toScreen } from '../model/viewport.ts';
import { finePlaceOf } from '../tools/fine-place.ts';
import type { HostView, ToolHost } from '../tools/tool-host.ts';
import type { Modifiers } from '../tools/tool-types.ts';

/** A mouse that is moved by so much takes over; less is a knock at the table. */
const KNOCK_PX = 6;

export type CrosshairTarget = {
  readonly element: HTMLElement;
  readonly store: DeskStore;
  readonly views: ViewStore;
  readonly host: ToolHost;
  readonly crosshair: CrosshairStore;
  hostView(): HostView;
  /** Told where the crosshair is, as of a pointer; null when it is put away. */
  onPointer(at: SheetPx | null, keys: Modifiers, view: HostView): void;
};

/** Works the tools through the crosshair as a mouse does through its pointer. */
export type CrosshairHand = {
  isShown(): boolean;
  /** Where it is seen; null while it is put away. */
  onScreen(): ScreenPx | null;
  putAway(): void;
  step(dx: number, dy: number, stride: Stride): void;
  /** Sets, chooses or takes hold; lets go of what is held. */
  click(held: Partial<Modifiers>): void;
  /** Lets go of what is held; false when nothing is. */
  letGo(): boolean;
  /** Leaves what is held where it was; false when nothing is. */
  abandon(): boolean;
  /** Puts a vertex into the chosen line; false when none is chosen. */
  insertVertex(): boolean;
  end(): void;
};

export function createCrosshairHand(target: CrosshairTarget): CrosshairHand {
  const { element, store, views, host, crosshair } = target;
  const view = () => views.getState().view;
  // What is moved by keys moves by each step, however small: no hand trembles.
  const hostView = (): HostView => ({ ...target.hostView(), steadyPx: 0 });
  const keysNow = (held: Partial<Modifiers> = {}): Modifiers => {
    const { exact } = crosshair.getState();
    return { shift: false, alt: false, ctrl: exact, ...held };
  };
  const isShown = () => crosshair.getState().at !== null;
  let heldFrom: SheetPx | null = null;
  let mouse: readonly [number, number] | null = null;

  function show(): void {
    const { pointerAt } = store.getState();
    const pointer = pointerAt === null ? null : sheetPx(...pointerAt);
    const at = firstPlace(view(), pointer, crosshair.getState().last);
    crosshair.setState({ at, last: at, exact: false });
  }

  function putAway(): void {
    if (isShown()) crosshair.setState({ at: null });
  }

  /** The view, what is held and what the tool shows follow the crosshair. */
  function follow(at: SheetPx | null): void {
    mouse = null;
    if (at === null) {
      abandon();
      target.onPointer(null, keysNow(), hostView());
      return;
    }
    const [dx, dy] = panToSee(view(), at);
    if (dx !== 0 || dy !== 0) views.pan(dx, dy);
    const moves = crosshair.getState().holds && at !== heldFrom;
    if (moves) host.handle({ type: 'move', at, keys: keysNow() }, hostView());
    target.onPointer(at, keysNow(), hostView());
  }

  function click(held: Partial<Modifiers>): void {
    const { at } = crosshair.getState();
    if (at === null || letGo()) return;
    const keys = keysNow(held);
    host.handle({ type: 'press', at, keys }, hostView());
    if (host.grabs()) takeHold(at, keys);
    else host.handle({ type: 'click', at, keys, count: 1 }, hostView());
  }

  /** A vertex or mark is held at its own place, so that a typed place is where it comes to stand. */
  function takeHold(at: SheetPx, keys: Modifiers): void {
    const { document, selection, tool, boundaryKind } = store.getState();
    const place =
      lineChoiceOf(tool, boundaryKind) === null ? finePlaceOf(document, selection)?.at : undefined;
    const reach = (hostView().reachPx + 3) / hostView().zoom;
    heldFrom = at;
    if (!keys.shift && place && Math.hypot(place[0] - at[0], place[1] - at[1]) <= reach) {
      host.handle({ type: 'abandonDrag' }, hostView());
      host.handle({ type: 'press', at: place, keys }, hostView());
      heldFrom = place;
    }
    crosshair.setState({ holds: host.grabs(), at: heldFrom, last: heldFrom });
  }

  function letGo(): boolean {
    const { at, holds } = crosshair.getState();
    if (!holds || at === null) return false;
    crosshair.setState({ holds: false });
    host.handle({ type: 'release', at, keys: keysNow() }, hostView());
    // As with a mouse: what was pressed and let go without moving was clicked.
    if (at === heldFrom) host.handle({ type: 'click', at, keys: keysNow(), count: 1 }, hostView());
    return true;
  }

  function abandon(): boolean {
    if (!crosshair.getState().holds) return false;
    crosshair.setState({ holds: false });
    host.handle({ type: 'abandonDrag' }, hostView());
    return true;
  }

  function insertVertex(): boolean {
    const { at } = crosshair.getState();
    const { tool, selection } = store.getState();
    if (at === null || tool !== 'select' || selection.kind !== 'line') return false;
    host.handle({ type: 'click', at, keys: keysNow(), count: 2 }, hostView());
    return true;
  }

  function moved({ clientX, clientY, pointerType }: PointerEvent): void {
    if (!isShown()) return;
    mouse ??= [clientX, clientY];
    const far = Math.hypot(clientX - mouse[0], clientY - mouse[1]) > KNOCK_PX;
    if (far || pointerType !== 'mouse') putAway();
  }

  const endings = [
    crosshair.subscribe((now, before) => now.at !== before.at && follow(now.at)),
    store.subscribe(({ tool }, before) => tool !== before.tool && abandon()),
    store.onIntent((intent) => {
      if (intent.type !== 'crosshair') return;
      // Where its place is typed the field takes the focus.
      if (intent.wants === 'toggle') element.focus({ preventScroll: true });
      if (intent.wants === 'toggle' && isShown()) putAway();
      else if (!isShown()) show();
    }),
  ];
  // Before the gestures hear of it, so that they find the pointer theirs.
  element.addEventListener('pointermove', moved, { capture: true });
  element.addEventListener('pointerdown', putAwayUnlessOver, { capture: true });

  function putAwayUnlessOver(event: PointerEvent): void {
    const over = event.target instanceof Element && event.target.closest('[data-over-sheet]') !== null;
    if (!over) putAway();
  }

  return {
    isShown,
    onScreen() {
      const { at } = crosshair.getState();
      return at === null ? null : toScreen(view(), at);
    },
    putAway,
    step(dx, dy, stride) {
      if (!isShown()) show();
      const { at } = crosshair.getState();
      if (at === null) return;
      const to = stepped(view(), at, dx, dy, stride);
      crosshair.setState({ at: to, last: to, exact: stride === 'tenth' });
    },
    click,
    letGo,
    abandon,
    insertVertex,
    end() {
      for (const end of endings) end();
      element.removeEventListener('pointermove', moved, { capture: true });
      element.removeEventListener('pointerdown', putAwayUnlessOver, { capture: true });
    },
  };
}
