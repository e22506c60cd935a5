import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Schedule } from '#client/features/desk/components/schedule.tsx';
import { typePlace } from '#client/features/desk/components/schedule-edits.ts';
import {
  ENTERED_ORDER,
  type HideableColumn,
  nextSort,
  pointRemark,
  pointsNamed,
  type Sort,
  scheduleColumns,
  sortedPoints,
} from '#client/features/desk/components/schedule-rows.ts';
import { scheduleTsv } from '#client/features/desk/components/schedule-text.ts';
import { parseColumns } from '#client/features/desk/components/schedule-view.tsx';
import { readNet } from '#shared/compute/read-net.ts';
import { type EntityOf, UNSAID } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import { documentWith } from '#tests/support/desk/desk-fixture.ts';

const SI = { unitSystem: 'SI', datum: 'LD' } as const;

function point(name: string, changes: Partial<PointReading> = {}): PointReading {
  return {
    id: name,
    name,
    order: 0,
    sheetAt: null,
    offset: -24,
    elevation: 102.2,
    status: 'read',
    reason: null,
    dropsLost: 1.58,
    between: null,
    totalHead: 114.84,
    totalHeadPlusMinus: 0.14,
    pressureHead: 12.64,
    pressureHeadPlusMinus: 0.15,
    porePressure: 124,
    porePressurePlusMinus: 1.5,
    doubt: null,
    byHand: null,
    byField: null,
    explanation: '',
    findings: [],
    ...changes,
  };
}

const FIGURES: HideableColumn[] = ['dropsLost', 'totalHead', 'pressureHead', 'porePressure'];
/** Cells of a row as they count in the table's width. */
const cellsIn = (row: string) =>
  [...row.matchAll(/<t[dh](?: [^>]*?colSpan="(\d+)")?/g)].reduce(
    (sum, [, span]) => sum + Number(span ?? 1),
    0,
  );

describe('the schedule', () => {
  it('sorts names as people count them and puts points without a figure last either way', () => {
    const points = [
      point('P10', { order: 1 }),
      point('P2', { order: 2, dropsLost: null }),
      point('P1', { order: 3, dropsLost: 3 }),
    ];
    const names = (sorted: PointReading[]) => sorted.map((each) => each.name);
    expect(names(sortedPoints(points, { column: 'name', descending: false }))).toEqual(['P1', 'P2', 'P10']);
    expect(names(sortedPoints(points, { column: 'dropsLost', descending: false }))).toEqual([
      'P10',
      'P1',
      'P2',
    ]);
    expect(names(sortedPoints(points, { column: 'dropsLost', descending: true }))).toEqual([
      'P1',
      'P10',
      'P2',
    ]);
    expect(names(sortedPoints(points, ENTERED_ORDER))).toEqual(['P10', 'P2', 'P1']);
  });

  it('goes from ascending to descending and back to the order entered', () => {
    const up = nextSort(ENTERED_ORDER, 'offset');
    const down = nextSort(up, 'offset');
    expect([up.descending, down.descending, nextSort(down, 'offset')]).toEqual([false, true, ENTERED_ORDER]);
  });

  it('has the units and the datum in its heads', () => {
    expect(scheduleColumns(SI).map((each) => each.label)).toEqual([
      'Point',
      'Offset, m',
      'Elevation, m LD',
      'Drops lost',
      'Total head, m LD',
      'Pressure head, m',
      'Pore pressure, kPa',
    ]);
    expect(scheduleColumns({ unitSystem: 'US', datum: '' }).at(-1)?.label).toBe('Pore pressure, lb/ft²');
  });

  it('says why a point has no figure', () => {
    const reason = { code: 'outside', text: 'The point lies outside the net.' };
    expect(pointRemark(point('P1', { status: 'withheld', reason }))).toBe('The point lies outside the net.');
    expect(pointRemark(point('P1', { status: 'abovePhreatic', reason }))).toContain('suction left out');
  });

  it('copies as numbers a spreadsheet reads, and never as a formula', () => {
    const tsv = scheduleTsv(
      SI,
      [point('=1+1'), point('P2', { status: 'withheld', dropsLost: null })],
      ENTERED_ORDER,
    );
    const rows = tsv.split('\n').map((row) => row.split('\t'));
    expect(rows[1]).toEqual([
      "'=1+1",
      '-24.0',
      '102.20',
      '1.58',
      '114.84',
      '0.14',
      '12.64',
      '124.0',
      '1.5',
      '',
    ]);
    expect(rows[2]?.[3]).toBe('');
    expect(new Set(rows.map((row) => row.length))).toEqual(new Set([10]));
  });

  it('is copied in the order it is shown in', () => {
    const points = [
      point('P10', { order: 1, totalHead: 101 }),
      point('P2', { order: 2, totalHead: 103 }),
      point('P1', { order: 3, totalHead: 102 }),
    ];
    const document = documentWith({});
    const reading = { ...readNet(document), points };
    const orders: Sort[] = [ENTERED_ORDER, { column: 'totalHead', descending: true }];
    const copied = orders.map((sort) =>
      scheduleTsv(SI, points, sort)
        .split('\n')
        .slice(1)
        .map((row) => row.split('\t')[0]),
    );
    const shown = orders.map((sort) => {
      const nothing = { onSort: () => {}, onEdit: null, selectedIds: [], onSelect: null };
      const html = renderToStaticMarkup(createElement(Schedule, { document, reading, sort, ...nothing }));
      return [...html.matchAll(/>(P\d+)</g)].map((match) => match[1]);
    });
    expect(copied).toEqual([
      ['P10', 'P2', 'P1'],
      ['P2', 'P1', 'P10'],
    ]);
    expect(shown).toEqual(copied);
  });

  it('is narrowed to the points of a name, whatever the case', () => {
    const points = [point('PZ-1'), point('Pz-12'), point('A3')];
    expect(pointsNamed(points, '').map(({ name }) => name)).toEqual(['PZ-1', 'Pz-12', 'A3']);
    expect(pointsNamed(points, ' pz-1').map(({ name }) => name)).toEqual(['PZ-1', 'Pz-12']);
    expect(pointsNamed(points, 'z-9')).toEqual([]);
  });

  it('has as many cells in each row as heads, whatever columns are left out', () => {
    const document = documentWith({});
    const points = [
      point('P1'),
      point('P2', { status: 'withheld', reason: null }),
      point('P3', { status: 'abovePhreatic' }),
    ];
    const reading = { ...readNet(document), points };
    const nothing = { onSort: () => {}, onEdit: null, selectedIds: [], onSelect: null };
    for (const hidden of [[], ['offset', 'totalHead'], ['porePressure'], FIGURES] as HideableColumn[][]) {
      const html = renderToStaticMarkup(
        createElement(Schedule, { document, reading, sort: ENTERED_ORDER, hidden, ...nothing }),
      );
      const [heads, ...rows] = html.split('<tr').slice(1).map(cellsIn);
      expect(rows, hidden.join()).toEqual(rows.map(() => heads));
      expect(heads).toBe(8 - hidden.length);
    }
  });

  it('forgets columns that were kept by a page which knew others', () => {
    expect(parseColumns(null)).toEqual([]);
    expect(parseColumns('["offset","of tomorrow"]')).toEqual([]);
    expect(parseColumns('["offset"]')).toEqual(['offset']);
  });

  it('makes a clicked point a typed one when a coordinate is typed, the other kept as read', () => {
    const clicked: EntityOf<'readingPoint'> = {
      kind: 'readingPoint',
      ...UNSAID.readingPoint,
      name: 'P1',
      order: 1,
      place: { on: 'sheet', at: [10, 20] },
    };
    expect(typePlace(clicked, point('P1'), { offset: 3.5 })?.ops).toEqual([
      {
        op: 'put',
        entityId: 'P1',
        value: { ...clicked, place: { on: 'section', offset: 3.5, elevation: 102.2 } },
      },
    ]);
    expect(typePlace(clicked, point('P1', { elevation: null }), { offset: 3.5 })).toBeNull();
  });
});
