import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { parseKeptView } from '#client/features/desk/model/kept-view.ts';
import { selectOne } from '#client/features/desk/model/selection.ts';
import { FIRST_AIDS } from '#client/features/desk/model/view-aids.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

describe('what is kept of how a person sees the sheet', () => {
  it('begins as chosen first, also where what was kept cannot be read', () => {
    for (const kept of [null, '', 'null', '{', '[]', '"x"']) {
      expect(parseKeptView(kept)).toEqual({ hidden: [], locked: [], aids: FIRST_AIDS });
    }
  });

  it('leaves out what is not known and figures that may not be', () => {
    const kept = {
      hidden: ['flowLine', 'walls'],
      locked: 'all',
      aids: { snapKinds: ['line', 'end', 'moon'], fadePct: 500, lineWeight: 'heavy', inverted: 'yes' },
    };
    expect(parseKeptView(JSON.stringify(kept))).toEqual({
      hidden: ['flowLine'],
      locked: [],
      aids: { ...FIRST_AIDS, snapKinds: ['end', 'line'], lineWeight: 'heavy' },
    });
  });

  it('reads back what was written', () => {
    const aids = { ...FIRST_AIDS, snapKinds: [], fadePct: 40, inverted: true, liveHelp: false } as const;
    const view = { hidden: ['note'], locked: ['ground'], aids };
    expect(parseKeptView(JSON.stringify(view))).toEqual(view);
  });

  it('lets go of what is chosen once its kind is hidden or locked', () => {
    const store = createDeskStore({
      document: documentWith({
        [LINE_A]: tracedLine([
          [0, 0],
          [9, 9],
        ]),
      }),
    });
    for (const put of [store.setHidden, store.setLocked]) {
      store.select(selectOne('line', LINE_A));
      put(['flowLine']);
      expect(store.getState().selection.ids).toEqual([LINE_A]);
      put(['equipotential']);
      expect(store.getState().selection.kind).toBe('none');
      put([]);
    }
  });
});
