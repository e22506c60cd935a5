import type { DeskStore } from '../model/desk-state.ts';
import { nextDrawingWay } from '../model/drawing-way.ts';
import { toggleGrid } from '../model/setting-out-aids.ts';
import { lineChoiceOf, type ToolId } from '../model/tool-choice.ts';
import type { ViewStore } from '../model/view-store.ts';
import type { HostView, ToolHost } from '../tools/tool-host.ts';
import type { ToolEvent } from '../tools/tool-types.ts';
import { deskEditKey, sheetEditKey } from './edit-keys.ts';

export const TOOL_KEYS: Readonly<Record<string, ToolId>> = {
  k: 'knownPoint',
  e: 'equipotential',
  f: 'flowLine',
  p: 'phreaticLine',
  b: 'boundary',
  r: 'readingPoint',
  l: 'profile',
  n: 'note',
  m: 'ruler',
  v: 'select',
};
export const WATER_KEY = 'w';
/** Lines of equal offset and elevation over the sheet. */
export const GRID_KEY = 'g';
/** Goes on to the next way of drawing lines. */
export const WAY_KEY = 'd';
/** Opens and closes the list of what is on the sheet by kind. */
export const LINES_KEY = 'h';
/** Tells a screen reader what stands at the pointer. */
export const TELL_KEY = 'q';

const PAN_PX = 40;
const PAN_FAR = 10;
const ZOOM_STEP = 1.25;
const ARROWS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [PAN_PX, 0],
  ArrowRight: [-PAN_PX, 0],
  ArrowUp: [0, PAN_PX],
  ArrowDown: [0, -PAN_PX],
};
const TOOL_EVENTS: Readonly<
  Record<string, ToolEvent['type'] & ('finish' | 'takeBack' | 'cancel' | 'remove')>
> = {
  Enter: 'finish',
  Backspace: 'takeBack',
  Delete: 'remove',
  Escape: 'cancel',
};

export type KeyTarget = {
  readonly store: DeskStore;
  readonly views: ViewStore;
  readonly host: ToolHost;
  hostView(): HostView;
};

/** Keys while the sheet has the focus: the tool in hand, panning and zooming. True when the key was used. */
export function sheetKey(event: KeyboardEvent, target: KeyTarget): boolean {
  if (sheetEditKey(event, target)) return true;
  if (event.ctrlKey || event.metaKey || event.altKey) return false;
  const tool = TOOL_EVENTS[event.key];
  if (tool !== undefined) {
    target.host.handle({ type: tool }, target.hostView());
    return true;
  }
  const arrow = ARROWS[event.key];
  if (arrow !== undefined) {
    const times = event.shiftKey ? PAN_FAR : 1;
    target.views.pan(arrow[0] * times, arrow[1] * times);
    return true;
  }
  return zoomKey(event.key, target.views);
}

function zoomKey(key: string, views: ViewStore): boolean {
  if (key === '+' || key === '=') views.zoom(ZOOM_STEP);
  else if (key === '-' || key === '−') views.zoom(1 / ZOOM_STEP);
  else if (key === '0') views.fit();
  else return false;
  return true;
}

/** Keys anywhere on the desk but in a field: tools by their letters, undo and redo. True when the key was used. */
export function deskKey(event: KeyboardEvent, target: Pick<KeyTarget, 'store'>): boolean {
  const key = event.key.toLowerCase();
  if (event.ctrlKey || event.metaKey) {
    if (event.altKey || (key !== 'z' && key !== 'y')) return false;
    if (key === 'y' || event.shiftKey) target.store.redo();
    else target.store.undo();
    return true;
  }
  if (event.altKey || event.shiftKey) return false;
  if (key === WATER_KEY) {
    target.store.emitIntent({ type: 'openWaterLevels' });
    return true;
  }
  if (deskEditKey(event, target)) return true;
  if (key === LINES_KEY || key === TELL_KEY) {
    target.store.emitIntent({ type: key === LINES_KEY ? 'showLines' : 'tellPlace' });
    return true;
  }
  if (key === WAY_KEY && drawsLines(target.store)) {
    nextDrawingWay();
    return true;
  }
  if (key === GRID_KEY) {
    toggleGrid();
    return true;
  }
  const tool = TOOL_KEYS[key];
  if (tool === undefined) return false;
  target.store.setTool(tool);
  return true;
}

function drawsLines(store: DeskStore): boolean {
  const { tool, boundaryKind, readOnly } = store.getState();
  return !readOnly && lineChoiceOf(tool, boundaryKind) !== null;
}

/** True when a key belongs to a field, a dialog or a menu and not to the desk. */
export function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof Element)) return false;
  return (
    target.closest(
      'input, textarea, select, [contenteditable="true"], dialog, [role="menu"], [role="dialog"]',
    ) !== null
  );
}
