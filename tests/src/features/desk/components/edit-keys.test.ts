import { describe, expect, it } from 'vitest';
import { deskEditKey, sheetEditKey, sheetEditKeyUp } from '#client/features/desk/components/edit-keys.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { EditEvent } from '#client/features/desk/model/pending-edit.ts';
import { createViewStore } from '#client/features/desk/model/view-store.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const SHEET = { widthPx: 4000, heightPx: 3000 };

const line = tracedLine([
  [100, 100],
  [200, 100],
]);

function keys(readOnly = false) {
  const store = createDeskStore({ document: documentWith({ [LINE_A]: line }) }, { readOnly });
  const asked: EditEvent[] = [];
  store.onEditRequest((event) => asked.push(event));
  const event = (key: string, held: Partial<KeyboardEvent> = {}) => ({ key, ...held }) as KeyboardEvent;
  return {
    store,
    asked,
    sheet: (key: string, held: Partial<KeyboardEvent> = {}) =>
      sheetEditKey(event(key, held), { store, views: createViewStore(SHEET, null) }),
    desk: (key: string, held: Partial<KeyboardEvent> = {}) => deskEditKey(event(key, held), { store }),
    up: (key: string) => sheetEditKeyUp(event(key), { store }),
  };
}

describe('keys about what is chosen', () => {
  it('ask for an operation by its letter, and only for one', () => {
    const { desk, asked } = keys();
    for (const key of ['s', 'J', 't', 'x', 'i', 'o']) expect(desk(key)).toBe(true);
    expect(asked.map((event) => event.type === 'lineOp' && event.op)).toEqual([
      'split',
      'join',
      'trim',
      'extend',
      'reverse',
      'smooth',
    ]);
    for (const held of [{ ctrlKey: true }, { metaKey: true }, { altKey: true }, { shiftKey: true }]) {
      expect(desk('s', held)).toBe(false);
    }
    expect(desk('e')).toBe(false);
  });

  it('move what is chosen by one pixel or ten, and the sheet while nothing is', () => {
    const { sheet, up, asked, store } = keys();
    expect(sheet('ArrowRight')).toBe(false);
    store.select({ kind: 'line', ids: [LINE_A] });
    expect(sheet('ArrowRight')).toBe(true);
    expect(sheet('ArrowUp', { shiftKey: true })).toBe(true);
    up('ArrowUp');
    up('a');
    expect(asked).toEqual([
      { type: 'nudge', by: [1, 0] },
      { type: 'nudge', by: [0, -10] },
      { type: 'settle' },
    ]);
    store.setPendingEdit({ op: 'trim', lineId: LINE_A });
    expect(sheet('ArrowRight')).toBe(false);
    store.setTool('equipotential');
    expect(sheet('ArrowRight')).toBe(false);
  });

  it('choose all, copy, paste and duplicate with Ctrl, or with the key that stands for it', () => {
    const { sheet, asked } = keys();
    expect(sheet('a', { ctrlKey: true })).toBe(true);
    expect(sheet('C', { metaKey: true })).toBe(true);
    expect(sheet('v', { ctrlKey: true })).toBe(true);
    expect(sheet('d', { ctrlKey: true })).toBe(true);
    expect(sheet('z', { ctrlKey: true })).toBe(false);
    expect(sheet('c', { ctrlKey: true, shiftKey: true })).toBe(false);
    expect(asked.map(({ type }) => type)).toEqual(['chooseAll', 'copy', 'paste', 'duplicate']);
  });

  it('leave by Escape what is asked for, wherever the focus is, and nothing else', () => {
    const { desk, asked, store } = keys();
    expect(desk('Escape')).toBe(false);
    store.select({ kind: 'line', ids: [LINE_A] });
    store.setPendingEdit({ op: 'trim', lineId: LINE_A });
    expect(desk('Escape')).toBe(true);
    expect(asked).toEqual([{ type: 'leaveEdit' }]);
  });

  it('change nothing on a net that may only be looked at', () => {
    const { sheet, desk, asked, store } = keys(true);
    store.select({ kind: 'line', ids: [LINE_A] });
    expect(desk('s')).toBe(false);
    expect(sheet('ArrowRight')).toBe(false);
    expect(sheet('d', { ctrlKey: true })).toBe(false);
    expect(sheet('a', { ctrlKey: true })).toBe(true);
    expect(asked).toHaveLength(1);
  });
});
