import type { KeyId } from '#client/text/keys.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { nextDrawingWay } from '../model/drawing-way.ts';
import type { DeskIntent } from '../model/intents.ts';
import { toggleGrid } from '../model/setting-out-aids.ts';
import { lineChoiceOf, type ToolId } from '../model/tool-choice.ts';
import type { ViewStore } from '../model/view-store.ts';
import type { HostView, ToolHost } from '../tools/tool-host.ts';
import type { ToolEvent } from '../tools/tool-types.ts';
import type { CrosshairHand } from './crosshair-hand.ts';
import { CROSSHAIR_BINDINGS } from './crosshair-keys.ts';
import { DESK_EDIT_BINDINGS, SHEET_EDIT_BINDINGS } from './edit-keys.ts';
import { ARROW_STEPS, arrowsWith, type KeyBinding, type KeyPress, runKey } from './key-binding.ts';

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

const PAN_PX = 40;
const PAN_FAR = 10;
const ZOOM_STEP = 1.25;

type DeskTarget = { readonly store: DeskStore };
export type KeyTarget = DeskTarget & {
  readonly views: ViewStore;
  readonly host: ToolHost;
  readonly crosshair: CrosshairHand;
  hostView(): HostView;
};

/** While the sheet has the focus: the tool in hand, panning and zooming. */
const TOOL_BINDINGS: readonly KeyBinding<KeyTarget>[] = [
  toolEvent('finish', 'draw', 'finish', { key: 'Enter' }),
  toolEvent('takeBack', 'draw', 'takeBack', { key: 'Backspace' }),
  toolEvent('cancel', 'draw', 'cancel', { key: 'Escape' }),
  toolEvent('remove', 'chosen', 'remove', { key: 'Delete' }),
];

const VIEW_BINDINGS: readonly KeyBinding<KeyTarget>[] = [
  panning('pan', 1),
  panning('panFar', PAN_FAR),
  zooming('zoomIn', ZOOM_STEP, { key: '+' }, { key: '=' }),
  zooming('zoomOut', 1 / ZOOM_STEP, { key: '-' }, { key: '−' }),
  {
    id: 'fit',
    group: 'view',
    presses: [{ key: '0' }],
    run({ views }) {
      views.fit();
      return true;
    },
  },
  // The pointer asks whether it is held; here it is only kept from the browser.
  { id: 'holdSheet', group: 'view', presses: [{ key: ' ' }], run: () => true },
];

/** Anywhere on the desk but in a field: tools by their letters, undo and redo. */
const DESK_BINDINGS: readonly KeyBinding<DeskTarget>[] = [
  intent('listKeys', 'about', { type: 'listKeys' }, { key: '?' }),
  intent('linesTable', 'about', { type: 'openTable' }, { key: 'h', shift: true }),
  intent('listLines', 'about', { type: 'showLines' }, { key: 'h' }),
  intent('crosshair', 'crosshair', { type: 'crosshair', wants: 'toggle' }, { key: 'c' }),
  intent('typePlace', 'crosshair', { type: 'crosshair', wants: 'place' }, { key: 'c', shift: true }),
  intent('tellPlace', 'crosshair', { type: 'tellPlace' }, { key: 'q' }),
  intent('nextOpenNote', 'about', { type: 'nextOpenNote' }, { key: '.' }),
  intent('waterLevels', 'tools', { type: 'openWaterLevels' }, { key: WATER_KEY }),
  ...Object.entries(TOOL_KEYS).map(
    ([key, tool]): KeyBinding<DeskTarget> => ({
      id: tool,
      group: 'tools',
      presses: [{ key }],
      run({ store }) {
        store.setTool(tool);
        return true;
      },
    }),
  ),
  {
    id: 'drawingWay',
    group: 'draw',
    presses: [{ key: 'd' }],
    run({ store }) {
      if (drawsLines(store)) nextDrawingWay();
      return drawsLines(store);
    },
  },
  {
    id: 'grid',
    group: 'view',
    presses: [{ key: 'g' }],
    run() {
      toggleGrid();
      return true;
    },
  },
  step('undo', { key: 'z', ctrl: true }),
  step('redo', { key: 'z', ctrl: true, shift: true }, { key: 'y', ctrl: true }),
];

/** In the order in which they are asked: what is nearer to the hand comes first. */
const ON_SHEET: readonly KeyBinding<KeyTarget>[] = [
  ...CROSSHAIR_BINDINGS,
  ...SHEET_EDIT_BINDINGS,
  ...TOOL_BINDINGS,
  ...VIEW_BINDINGS,
];
const ON_DESK: readonly KeyBinding<DeskTarget>[] = [...DESK_EDIT_BINDINGS, ...DESK_BINDINGS];

/** What the list of keys tells: the records by which the keys work. */
export const ALL_KEYS: ReadonlyArray<Omit<KeyBinding<never>, 'run'>> = [...ON_DESK, ...ON_SHEET];

/** True when a key was used while the sheet has the focus. */
export function sheetKey(event: KeyboardEvent, target: KeyTarget): boolean {
  return runKey(ON_SHEET, event, target);
}

/** True when a key was used anywhere on the desk but in a field. */
export function deskKey(event: KeyboardEvent, target: DeskTarget): boolean {
  return runKey(ON_DESK, event, target);
}

function toolEvent(
  id: KeyId,
  group: 'draw' | 'chosen',
  type: ToolEvent['type'] & ('finish' | 'takeBack' | 'cancel' | 'remove'),
  press: KeyPress,
): KeyBinding<KeyTarget> {
  return {
    id,
    group,
    presses: [press],
    run({ host, hostView, crosshair }) {
      // Enter lets go of what is held; everything else is done with it where it was.
      if (type === 'finish' ? crosshair.letGo() : crosshair.abandon() && type === 'cancel') return true;
      host.handle({ type }, hostView());
      return true;
    },
  };
}

function panning(id: 'pan' | 'panFar', times: number): KeyBinding<KeyTarget> {
  return {
    id,
    group: 'view',
    presses: arrowsWith(id === 'panFar' ? { shift: true } : {}),
    run({ views }, { key }) {
      const step = ARROW_STEPS[key];
      if (step === undefined) return false;
      // The window goes where the arrow points, so the sheet goes the other way.
      views.pan(-step[0] * PAN_PX * times, -step[1] * PAN_PX * times);
      return true;
    },
  };
}

function zooming(
  id: 'zoomIn' | 'zoomOut',
  factor: number,
  ...presses: readonly KeyPress[]
): KeyBinding<KeyTarget> {
  return {
    id,
    group: 'view',
    presses,
    run({ views, crosshair }) {
      views.zoom(factor, crosshair.onScreen() ?? undefined);
      return true;
    },
  };
}

function intent(
  id: KeyId,
  group: KeyBinding<DeskTarget>['group'],
  asked: DeskIntent,
  press: KeyPress,
): KeyBinding<DeskTarget> {
  return {
    id,
    group,
    presses: [press],
    run({ store }) {
      store.emitIntent(asked);
      return true;
    },
  };
}

function step(id: 'undo' | 'redo', ...presses: readonly KeyPress[]): KeyBinding<DeskTarget> {
  return {
    id,
    group: 'chosen',
    presses,
    run({ store }) {
      store[id]();
      return true;
    },
  };
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
