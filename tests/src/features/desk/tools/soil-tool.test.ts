import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { type EntityOf, UNSAID } from '#shared/contract/document.ts';
import { countedIds, documentWith } from '#tests/support/desk/desk-fixture.ts';

const SOIL = '000000b0-0000-7000-8000-000000000000';
const core: EntityOf<'soil'> = {
  kind: 'soil',
  name: 'Core',
  places: [],
  ...UNSAID.soil,
  k: null,
  unit: 'm/s',
  factor: null,
  source: '',
};

function desk({ chosen = true, readOnly = false } = {}) {
  const store = createDeskStore(
    { document: documentWith({ [SOIL]: core }) },
    { newId: countedIds(), readOnly },
  );
  const host = createToolHost(store);
  const view = { zoom: 1, reachPx: 8, balloons: [] };
  if (chosen) store.select({ kind: 'soil', ids: [SOIL] });
  store.setTool('soilPlace');
  const keys = { shift: false, alt: false, ctrl: false };
  return {
    store,
    click: (x: number, y: number, count = 1) =>
      host.handle({ type: 'click', at: sheetPx(x, y), keys, count }, view),
    key: (type: 'finish' | 'takeBack' | 'cancel') => host.handle({ type }, view),
    places: () => {
      const value = store.getState().document.entities[SOIL]?.value;
      return value?.kind === 'soil' ? value.places : [];
    },
  };
}

describe('the tool that marks where a soil lies', () => {
  it('is laid down when no soil is chosen', () => {
    const { store, click, places } = desk({ chosen: false });
    click(100, 100);
    expect(places()).toEqual([]);
    expect(store.getState().tool).toBe('select');
  });

  it('is not taken up on a net that may not be changed', () => {
    const { store, click, places } = desk({ readOnly: true });
    click(100, 100);
    expect(places()).toEqual([]);
    expect(store.getState().tool).toBe('select');
  });

  it('marks a place with each click, none twice, and undo takes it away', () => {
    const { store, click, places } = desk();
    click(100, 100);
    click(100, 100);
    click(200, 150);
    click(210, 150, 2);
    expect(places()).toEqual([
      [100, 100],
      [200, 150],
    ]);
    store.undo();
    expect(places()).toEqual([[100, 100]]);
  });

  it('takes the newest place back by Backspace, and ends by Escape or Enter with what is marked', () => {
    const { store, click, key, places } = desk();
    click(100, 100);
    click(200, 150);
    key('takeBack');
    expect(places()).toEqual([[100, 100]]);
    key('cancel');
    expect([store.getState().tool, places().length]).toEqual(['select', 1]);
  });
});
