import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { DeskIntent } from '#client/features/desk/model/intents.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const KEYS = { shift: false, alt: false, ctrl: false };

/** A desk with one traced line, and a computed one 40 px beside it. */
function desk() {
  const line = tracedLine([
    [100, 100],
    [100, 500],
  ]);
  const store = createDeskStore({ document: documentWith({ [LINE_A]: line }) });
  const host = createToolHost(store);
  const told: DeskIntent[] = [];
  store.onIntent((intent) => told.push(intent));
  store.setGuides('computedNet', {
    areas: [],
    lines: [
      {
        id: 'equipotential 2 0',
        tone: 'computedEquipotential',
        points: [
          [140, 100],
          [140, 500],
        ],
      },
    ],
    marks: [],
  });
  const click = (x: number, y: number) =>
    host.handle(
      { type: 'click', at: sheetPx(x, y), keys: KEYS, count: 1 },
      { zoom: 1, reachPx: 8, balloons: [] },
    );
  return { store, told, click };
}

describe('clicking a line of the computed net', () => {
  it('tells which one it is', () => {
    const { told, click } = desk();
    click(143, 300);
    expect(told).toEqual([{ type: 'pickComputedLine', guideId: 'equipotential 2 0' }]);
  });

  it('chooses the traced line where one is under the pointer, and nothing on bare sheet', () => {
    const { store, told, click } = desk();
    click(103, 300);
    expect(store.getState().selection.ids).toEqual([LINE_A]);
    click(400, 300);
    expect(store.getState().selection.ids).toEqual([]);
    expect(told).toEqual([]);
  });

  it('does nothing once the net is not shown', () => {
    const { store, told, click } = desk();
    store.setGuides('computedNet', null);
    click(143, 300);
    expect(told).toEqual([]);
  });
});
