import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { EditEvent } from '#client/features/desk/model/pending-edit.ts';
import type { ToolId } from '#client/features/desk/model/tool-choice.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import type { Balloon, Modifiers } from '#client/features/desk/tools/tool-types.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { type DocumentEntity, entitiesOf } from '#shared/contract/document.ts';
import { countedIds, documentWith } from './desk-fixture.ts';

export const NO_KEYS: Modifiers = { shift: false, alt: false, ctrl: false };

/** A desk with a hand on it. One sheet pixel is one screen pixel, and things are met within 8 px. */
export function toolHand(
  values: Record<string, DocumentEntity>,
  options: { tool?: ToolId; readOnly?: boolean; balloons?: readonly Balloon[] } = {},
) {
  const { tool = 'select', readOnly = false, balloons = [] } = options;
  const store = createDeskStore({ document: documentWith(values) }, { newId: countedIds(), readOnly });
  const host = createToolHost(store);
  const view = { zoom: 1, reachPx: 8, balloons };
  const labels: string[] = [];
  store.onCommand(({ label }) => labels.push(label));
  if (tool !== 'select') store.setTool(tool);
  const send = (type: 'press' | 'move' | 'release', x: number, y: number, keys: Partial<Modifiers> = {}) =>
    host.handle({ type, at: sheetPx(x, y), keys: { ...NO_KEYS, ...keys } }, view);
  return {
    store,
    host,
    /** Names of the steps taken, in order. */
    labels,
    edit: (event: EditEvent) => host.edit(event, view),
    op: (op: Extract<EditEvent, { type: 'lineOp' }>['op']) => host.edit({ type: 'lineOp', op }, view),
    click(x: number, y: number, keys: Partial<Modifiers> = {}, count = 1) {
      send('press', x, y, keys);
      send('release', x, y, keys);
      host.handle({ type: 'click', at: sheetPx(x, y), keys: { ...NO_KEYS, ...keys }, count }, view);
    },
    drag(from: [number, number], to: [number, number], keys: Partial<Modifiers> = {}) {
      send('press', ...from, keys);
      send('move', ...to, keys);
      send('release', ...to, keys);
    },
    press: (x: number, y: number, keys: Partial<Modifiers> = {}) => send('press', x, y, keys),
    move: (x: number, y: number, keys: Partial<Modifiers> = {}) => send('move', x, y, keys),
    key: (type: 'finish' | 'takeBack' | 'cancel' | 'remove') => host.handle({ type }, view),
    overlay: (x: number, y: number, keys: Partial<Modifiers> = {}) =>
      host.overlay(sheetPx(x, y), { ...NO_KEYS, ...keys }, view),
    lines: () => entitiesOf(store.getState().document, 'line').map(({ value }) => value),
    points: (id: string) => {
      const value = store.getState().document.entities[id]?.value;
      if (value?.kind !== 'line') throw new Error('no such line');
      return value.points;
    },
    chosen: () => store.getState().selection,
    notice: () => store.getState().notice,
    asked: () => store.getState().pendingEdit?.op ?? null,
  };
}
