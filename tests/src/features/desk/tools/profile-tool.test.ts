import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { firstSpacing } from '#client/features/desk/model/profile-edits.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import { countedIds, documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const base = tracedLine([
  [100, 400],
  [300, 400],
]);

function desk({ readOnly = false } = {}) {
  const store = createDeskStore(
    { document: documentWith({ [LINE_A]: base }) },
    { newId: countedIds(), readOnly },
  );
  const host = createToolHost(store);
  const view = { zoom: 1, reachPx: 8, balloons: [] };
  store.setTool('profile');
  const keys = { shift: false, alt: false, ctrl: false };
  return {
    store,
    click: (x: number, y: number, { count = 1, ...held } = {}) =>
      host.handle({ type: 'click', at: sheetPx(x, y), keys: { ...keys, ...held }, count }, view),
    key: (type: 'finish' | 'takeBack' | 'cancel' | 'remove') => host.handle({ type }, view),
    profiles: () => entitiesOf(store.getState().document, 'profile').map(({ value }) => value),
    places: () =>
      entitiesOf(store.getState().document, 'profile').map(({ value }) =>
        value.place.on === 'sheet' ? value.place.points : null,
      ),
  };
}

describe('the tool that draws a profile', () => {
  it('draws nothing on a net that may not be changed', () => {
    const { click, profiles } = desk({ readOnly: true });
    click(150, 420);
    expect(profiles()).toEqual([]);
  });

  it('keeps the profile from its first point on, unfinished, and leaves one point alone unkept', () => {
    const { store, click, key, profiles } = desk();
    click(150, 450);
    expect(profiles()).toMatchObject([{ name: 'Profile 1', use: 'other', finished: false, order: 1 }]);
    key('finish');
    expect(profiles()).toEqual([]);
    expect(store.getState().draft).toBeNull();
  });

  it('follows the traced line it snaps to, and Ctrl stops that', () => {
    const { click, places } = desk();
    click(103, 404);
    click(200, 405, { ctrl: true } as object);
    expect(places()).toEqual([
      [
        [100, 400],
        [200, 405],
      ],
    ]);
  });

  it('takes points back, is finished by a double click and chosen then; undo opens it again', () => {
    const { store, click, key, profiles, places } = desk();
    click(100, 450);
    click(200, 460);
    click(260, 480);
    key('takeBack');
    click(300, 500);
    click(300, 500, { count: 2 });
    expect(places()[0]).toEqual([
      [100, 450],
      [200, 460],
      [300, 500],
    ]);
    expect(profiles()[0]).toMatchObject({ finished: true, spacing: null });
    expect(store.getState().selection.kind).toBe('profile');
    store.undo();
    expect(profiles()[0]?.finished).toBe(false);
    expect(store.getState().draft).not.toBeNull();
  });

  it('is chosen by a click beside no traced line, and Delete removes it', () => {
    const { store, click, key, profiles } = desk();
    click(100, 450);
    click(300, 450);
    key('finish');
    store.setTool('select');
    click(200, 600);
    expect(store.getState().selection.kind).toBe('none');
    click(200, 452);
    expect(store.getState().selection.kind).toBe('profile');
    key('remove');
    expect(profiles()).toEqual([]);
    expect(store.getState().history.undoLabel).toBe('removed Profile 1');
  });

  it('cannot be chosen while profiles are hidden', () => {
    const { store, click, key } = desk();
    click(100, 450);
    click(300, 450);
    key('finish');
    store.setTool('select');
    click(200, 600);
    store.setHidden(['profile']);
    click(200, 450);
    expect(store.getState().selection.kind).toBe('none');
  });
});

describe('a vertex of a chosen profile', () => {
  const keys = { shift: false, alt: false, ctrl: true };
  const drag = (readOnly: boolean) => {
    const { store, click, key, places } = desk();
    click(100, 450);
    click(300, 450);
    key('finish');
    store.setTool('select');
    store.setReadOnly(readOnly);
    const host = createToolHost(store);
    const view = { zoom: 1, reachPx: 8, balloons: [] };
    host.handle({ type: 'press', at: sheetPx(302, 449), keys }, view);
    host.handle({ type: 'move', at: sheetPx(352, 499), keys }, view);
    const previewed = Object.keys(store.getState().preview).length;
    host.handle({ type: 'release', at: sheetPx(352, 499), keys }, view);
    return { store, places, previewed };
  };

  it('is dragged as that of a line, and undo puts it back', () => {
    const { store, places, previewed } = drag(false);
    expect(previewed).toBe(1);
    expect(places()[0]).toEqual([
      [100, 450],
      [350, 500],
    ]);
    expect(store.getState().selection).toMatchObject({ kind: 'profile', ids: [expect.any(String)] });
    expect(store.getState().history.undoLabel).toBe('moved a point of Profile 1');
    store.undo();
    expect(places()[0]?.[1]).toEqual([300, 450]);
  });

  it('stays where it is on a net that may not be changed', () => {
    expect(drag(true).places()[0]?.[1]).toEqual([300, 450]);
  });
});

describe('the spacing a profile begins with', () => {
  const map = readSetOut(documentWith({})).map;

  it('is none without a set-out section or without length', () => {
    expect(map).toBeNull();
    expect(
      firstSpacing(
        [
          [0, 0],
          [9, 9],
        ],
        null,
      ),
    ).toBeNull();
  });

  it.each([
    [4000, 2],
    [3999, 1],
    [100, 0.05],
    [19_000, 5],
  ])('of %s hundredths of a unit is %s, 1, 2 or 5 times a power of ten', (length, spacing) => {
    const unit = { toSection: ([x, y]: readonly [number, number]) => [x / 100, -y / 100] };
    expect(
      firstSpacing(
        [
          [0, 0],
          [length, 0],
        ],
        unit as never,
      ),
    ).toBe(spacing);
  });
});
