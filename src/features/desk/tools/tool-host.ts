import type { SheetPx } from '#shared/compute/frames.ts';
import { IDENTITY } from '#shared/compute/linear-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import { clickedPlacesOf } from '../model/clicked-places.ts';
import type { CrossingClient } from '../model/crossing-client.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { drawingWayChoice } from '../model/drawing-way.ts';
import type { InkClient } from '../model/ink-client.ts';
import type { EditEvent } from '../model/pending-edit.ts';
import { rulerOf } from '../model/ruler.ts';
import { settingOutAids } from '../model/setting-out-aids.ts';
import { lineChoiceOf } from '../model/tool-choice.ts';
import type { ToolOverlay } from '../model/tool-overlay.ts';
import { createCrossingTurn, type SoughtCrossing } from './crossing-turn.ts';
import { crossingReach, isLookedAt } from './drawn-crossing.ts';
import { editStep } from './edit-step.ts';
import { shownLineAt } from './snap-lines.ts';
import { overlayOf, stepTool } from './tool-set.ts';
import {
  AT_REST,
  type Balloon,
  isGrabbing,
  type Modifiers,
  type ToolCommand,
  type ToolContext,
  type ToolEvent,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';
import { createInkTurn } from './ways-of-drawing/ink-turn.ts';
import { lookReach } from './ways-of-drawing/ink-way.ts';

/** What the view around the tools contributes to their context. */
export type HostView = {
  zoom: number;
  reachPx: number;
  balloons: readonly Balloon[];
  /** Left out, what is held moves only once the hand does so clearly. */
  steadyPx?: number;
};

export type ToolHost = {
  handle(event: ToolEvent, view: HostView): void;
  /** Does something with what is chosen, whatever tool is in hand. */
  edit(event: EditEvent, view: HostView): void;
  overlay(at: SheetPx | null, keys: Modifiers, view: HostView): ToolOverlay;
  /** True while the tool keeps the pointer, so that the sheet must not be panned by it. */
  grabs(): boolean;
  /** The shown line nearest to a place within reach; null when there is none. */
  lineAt(at: SheetPx, view: HostView): string | null;
  /** The set-out section of the document as it is now; null before it is set out. */
  map(): SectionMap | null;
};

/** Runs the tool in hand against a desk store: keeps the machine's state and carries its commands out. */
export function createToolHost(
  store: DeskStore,
  ink: InkClient | null = null,
  crossings: CrossingClient | null = null,
): ToolHost {
  let state: ToolState = AT_REST;
  const clicked = clickedPlacesOf(store);
  let copied: readonly DocumentEntity[] = [];
  const mapOf = rememberedMap();

  function contextFor(view: HostView): ToolContext {
    const { document, selection, draft, tool, boundaryKind, hiddenKinds, lockedKinds, ...state } =
      store.getState();
    return {
      document,
      selection,
      draft,
      pendingEdit: state.pendingEdit,
      copied,
      tool,
      choice: lineChoiceOf(tool, boundaryKind),
      hiddenKinds,
      lockedKinds,
      snapKinds: state.aids.snapKinds,
      working: state.reading?.frame?.matrix ?? IDENTITY,
      readOnly: state.readOnly,
      way: drawingWayChoice.getState().way,
      clicked,
      guides: state.guides,
      inkLook: ink?.newest() ?? null,
      ruler: rulerOf(store).getState(),
      crossingLook: settingOutAids.getState().takesCrossings ? (crossings?.newest() ?? null) : null,
      map: mapOf(document),
      newId: store.newId,
      ...view,
    };
  }

  function take(step: ToolStep, view: HostView): void {
    state = step.state;
    for (const command of step.commands) {
      if (command.do === 'keep') copied = command.values;
      else if (command.do === 'clicked') clicked.remember(command.lineId, command.places);
      else if (command.do === 'follow') turn.follow(command, view);
      else perform(store, command);
    }
  }

  /** A move by arrow keys becomes a step before anything else happens. */
  function settle(view: HostView): void {
    if (state.at === 'nudging') take(editStep(state, { type: 'settle' }, contextFor(view)), view);
  }

  function handle(event: ToolEvent, view: HostView): void {
    if (turn.holds(event, view) || crossingTurn.holds(event, view)) return;
    carryOut(event, view);
  }

  function carryOut(event: ToolEvent, view: HostView): void {
    settle(view);
    take(stepTool(state, event, contextFor(view)), view);
  }

  /** A known point that is set or let go of goes to the crossing there, which may still have to be found. */
  function soughtBy(event: ToolEvent, view: HostView): SoughtCrossing | null {
    const sets = event.type === 'click' ? event.count === 1 : event.type === 'release' && hasMoved(state);
    if (!sets || !('at' in event) || event.keys.alt || event.keys.ctrl) return null;
    if (!settingOutAids.getState().takesCrossings) return null;
    const context = contextFor(view);
    const { seeksCrossing, drawnCrossing } = overlayOf(state, event.at, event.keys, context);
    if (seeksCrossing == null || drawnCrossing != null || isLookedAt(seeksCrossing, context)) return null;
    return { about: seeksCrossing, reach: crossingReach(context) };
  }

  const turn = createInkTurn<HostView>(ink, {
    handle,
    step: (event, view) => take(stepTool(state, event, contextFor(view)), view),
    isUnderWay: (lineId) => store.getState().draft?.lineId === lineId,
  });

  const crossingTurn = createCrossingTurn<HostView>(crossings, { sought: soughtBy, step: carryOut });

  return {
    handle,
    edit(event, view) {
      crossingTurn.flush();
      if (event.type !== 'nudge') settle(view);
      take(editStep(state, event, contextFor(view)), view);
    },
    overlay(at, keys, view) {
      const context = contextFor(view);
      const overlay = overlayOf(state, at, keys, context);
      if (context.way === 'ink' && overlay.rubber !== null) turn.look(lookReach(overlay.rubber, context));
      const sought = overlay.seeksCrossing ?? null;
      if (sought !== null && settingOutAids.getState().takesCrossings) {
        crossings?.look(sought, crossingReach(context));
      }
      return overlay;
    },
    grabs: () => isGrabbing(state),
    lineAt: (at, view) => shownLineAt(contextFor(view), at),
    map: () => mapOf(store.getState().document),
  };
}

function perform(
  store: DeskStore,
  command: Exclude<ToolCommand, { do: 'keep' | 'clicked' | 'follow' }>,
): void {
  switch (command.do) {
    case 'run':
      store.run(command.label, command.ops);
      break;
    case 'select':
      store.select(command.selection);
      break;
    case 'draft':
      store.setDraft(command.draft);
      break;
    case 'preview':
      store.setPreview(command.values);
      break;
    case 'tool':
      store.setTool(command.tool, command.boundary ?? undefined);
      break;
    case 'intent':
      store.emitIntent(command.intent);
      break;
    case 'ruler':
      rulerOf(store).setState(command.ruler);
      break;
    case 'ask':
      store.setPendingEdit(command.edit);
      break;
    case 'notice':
      store.setNotice(command.text);
      break;
  }
}

const hasMoved = (state: ToolState) => state.at === 'dragging' && state.moved;

/** The section's map, worked out again only when the known points or the way of setting out have changed. */
function rememberedMap(): (document: FlowNetDocument) => SectionMap | null {
  let values: unknown[] = [];
  let map: SectionMap | null = null;
  let known = false;
  return (document) => {
    const now = Object.values(document.entities)
      .map((entity) => entity.value)
      .filter((value) => value.kind === 'knownPoint' || value.kind === 'setOut');
    if (!known || now.length !== values.length || now.some((value, i) => value !== values[i])) {
      map = readSetOut(document).map;
      values = now;
      known = true;
    }
    return map;
  };
}
