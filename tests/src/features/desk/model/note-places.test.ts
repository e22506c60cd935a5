import { describe, expect, it } from 'vitest';
import { cellAt, middleOfCell } from '#client/features/desk/model/cell-places.ts';
import { isAnchorGone, placeOfNote } from '#client/features/desk/model/note-places.ts';
import type { DocumentEntity, FlowNetDocument, LineKind, SheetPoint } from '#shared/contract/document.ts';
import { documentWith } from '#tests/support/desk/desk-fixture.ts';

const line = (kind: LineKind, points: SheetPoint[]): DocumentEntity => ({
  kind: 'line',
  origin: 'traced',
  line: kind,
  name: '',
  points,
  finished: true,
  water: null,
  head: null,
  drops: null,
});
const upright = (x: number) =>
  line('equipotential', [
    [x, 0],
    [x, 300],
  ]);
const level = (y: number, kind: LineKind = 'flowLine') =>
  line(kind, [
    [0, y],
    [400, y],
  ]);

/** Three lines of equal head 100 apart and three flow lines, the lowest the impervious base. */
function grid(): FlowNetDocument {
  return documentWith({
    h1: upright(100),
    h2: upright(200),
    h3: upright(300),
    f1: level(100),
    f2: level(200),
    base: level(300, 'impervious'),
  });
}

const put = (document: FlowNetDocument, id: string, value: DocumentEntity) =>
  documentWith({
    ...Object.fromEntries(Object.entries(document.entities).map(([key, each]) => [key, each.value])),
    [id]: value,
  });

describe('the cell at a place', () => {
  it('is none outside of the net, where lines lie on one side only', () => {
    expect(cellAt(grid(), [50, 150])).toBeNull();
    expect(cellAt(grid(), [150, 50])).toBeNull();
    expect(cellAt(documentWith({}), [150, 150])).toBeNull();
  });

  it('lies between the two lines of equal head and the two flow lines around it', () => {
    const cell = cellAt(grid(), [130, 160]);
    expect(cell?.heads.toSorted()).toEqual(['h1', 'h2']);
    expect(cell?.flows.toSorted()).toEqual(['f1', 'f2']);
    expect(cellAt(grid(), [290, 260])?.flows.toSorted()).toEqual(['base', 'f2']);
  });

  it('takes no line that is not finished yet', () => {
    const half = { ...upright(160), finished: false } as DocumentEntity;
    expect(cellAt(put(grid(), 'half', half), [150, 150])?.heads.toSorted()).toEqual(['h1', 'h2']);
  });

  it('has its middle where its lines run now, also where they end short of one another', () => {
    const cell = cellAt(grid(), [130, 160])!;
    expect(middleOfCell(grid(), cell)).toEqual([150, 150]);
    expect(middleOfCell(put(grid(), 'h2', upright(260)), cell)).toEqual([180, 150]);
    const short = line('equipotential', [
      [200, 0],
      [200, 190],
    ]);
    expect(middleOfCell(put(grid(), 'h2', short), cell)).toEqual([150, 148.75]);
  });
});

describe('a balloon', () => {
  it('moves with its line and keeps its place along it', () => {
    const anchor = { on: 'line', entityId: 'h1', at: [100, 120] } as const;
    expect(placeOfNote(anchor as never, put(grid(), 'h1', upright(140)), null)).toEqual([140, 120]);
  });

  it('moves with a profile on the sheet', () => {
    const profile = (y: number): DocumentEntity => ({
      kind: 'profile',
      name: '',
      use: 'base',
      place: {
        on: 'sheet',
        points: [
          [0, y],
          [400, y],
        ],
      },
      spacing: null,
      finished: true,
      order: 1,
    });
    const anchor = { on: 'profile', entityId: 'p', at: [77, 250] } as const;
    expect(placeOfNote(anchor as never, put(grid(), 'p', profile(280)), null)).toEqual([77, 280]);
  });

  it('stays where it was set when what it was about is gone, and says so', () => {
    const lost = { on: 'line', entityId: 'lost', at: [100, 120] } as never;
    expect(placeOfNote(lost, grid(), null)).toEqual([100, 120]);
    expect(isAnchorGone(lost, grid())).toBe(true);
    const cell = { ...cellAt(grid(), [130, 160])!, heads: ['h1', 'lost'] as [string, string] };
    expect(placeOfNote(cell, grid(), null)).toEqual([130, 160]);
    expect(isAnchorGone(cell, grid())).toBe(true);
  });

  it('has no place on the sheet for a figure or the whole drawing', () => {
    expect(placeOfNote({ on: 'drawing' }, grid(), null)).toBeNull();
    expect(placeOfNote({ on: 'titleBlock', cell: 'drops' }, grid(), null)).toBeNull();
    expect(isAnchorGone({ on: 'drawing' }, grid())).toBe(false);
  });
});
