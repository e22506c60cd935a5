import { describe, expect, it } from 'vitest';
import {
  NO_SELECTION,
  prunedSelection,
  selectOne,
  selectSeveral,
  withoutKinds,
} from '#client/features/desk/model/selection.ts';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import { documentWith, LINE_A, LINE_B, POINT_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const KNOWN = '000000b0-0000-7000-8000-000000000000';
const point: DocumentEntity = {
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name: 'P1',
  place: { on: 'sheet', at: [5, 5] },
  order: 1,
};
const line = tracedLine([
  [1, 1],
  [2, 2],
]);
const known: DocumentEntity = {
  kind: 'knownPoint',
  name: 'K1',
  at: [1, 1],
  offset: null,
  elevation: null,
  use: 'fit',
};
const document = documentWith({
  [LINE_A]: line,
  [LINE_B]: { ...line, line: 'flowLine' },
  [POINT_A]: point,
  [KNOWN]: known,
});

describe('what is chosen', () => {
  it('is several only from two on, each once, of kinds that go together', () => {
    expect(selectSeveral([], document)).toEqual(NO_SELECTION);
    expect(selectSeveral([KNOWN, 'not there'], document)).toEqual(NO_SELECTION);
    expect(selectSeveral([POINT_A, POINT_A], document)).toEqual(selectOne('readingPoint', POINT_A));
    expect(selectSeveral([LINE_A, POINT_A, KNOWN], document)).toEqual({
      kind: 'several',
      ids: [LINE_A, POINT_A],
      vertex: null,
    });
  });

  it('never holds two things under the name of one kind', () => {
    expect(prunedSelection({ kind: 'line', ids: [LINE_A, LINE_B], vertex: 1 }, document)).toEqual({
      kind: 'several',
      ids: [LINE_A, LINE_B],
      vertex: null,
    });
  });

  it('is the same object while nothing of it goes, and one thing when the others have gone', () => {
    const several = selectSeveral([LINE_A, LINE_B, POINT_A], document);
    expect(prunedSelection(several, document)).toBe(several);
    expect(prunedSelection(several, documentWith({ [LINE_B]: line }))).toEqual(selectOne('line', LINE_B));
    expect(prunedSelection(several, documentWith({}))).toEqual(NO_SELECTION);
  });

  it('loses what is hidden or locked', () => {
    const several = selectSeveral([LINE_A, LINE_B, POINT_A], document);
    expect(withoutKinds(several, ['equipotential'], document).ids).toEqual([LINE_B, POINT_A]);
    expect(withoutKinds(several, ['equipotential', 'readingPoint'], document)).toEqual(
      selectOne('line', LINE_B),
    );
    expect(withoutKinds(several, ['equipotential', 'flowLine', 'readingPoint'], document)).toEqual(
      NO_SELECTION,
    );
  });
});
