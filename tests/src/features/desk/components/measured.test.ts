import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { changeMeasured, changeTip, clearMeasured } from '#client/features/desk/components/measured-edits.ts';
import { measuredSentence, measuredState } from '#client/features/desk/components/measured-words.ts';
import { Schedule } from '#client/features/desk/components/schedule.tsx';
import {
  ENTERED_ORDER,
  scheduleColumns,
  sortedPoints,
} from '#client/features/desk/components/schedule-rows.ts';
import { scheduleTsv } from '#client/features/desk/components/schedule-text.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { documentEntity, type EntityOf, UNSAID } from '#shared/contract/document.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { documentWith, POINT_A } from '#tests/support/desk/desk-fixture.ts';

type Point = EntityOf<'readingPoint'>;
const POINT_B = '000000a1-0000-7000-8000-000000000000';
const point = (name: string, changes: Partial<Point> = {}): Point => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name,
  place: { on: 'section', offset: -24, elevation: 102.2 },
  order: 1,
  ...changes,
});
const shown = { value: 114.2, as: 'totalHead' as const, plusMinus: 0.05, on: '1968-04-03' };
const pointIn = (edit: ReturnType<typeof changeMeasured>) =>
  edit?.ops[0]?.op === 'put' ? (edit.ops[0].value as Point) : null;
const compared = (changes: Partial<MeasuredReading> = {}): MeasuredReading => ({
  id: POINT_A,
  head: 114.2,
  headPlusMinus: 0.05,
  difference: 0.35,
  differencePlusMinus: 0.15,
  beyond: true,
  wetAboveNet: false,
  ...changes,
});

describe('typing what was measured', () => {
  it('needs a figure before anything else of it is kept', () => {
    expect(changeMeasured(POINT_A, point('P1'), { plusMinus: 0.1 })).toBeNull();
    expect(changeMeasured(POINT_A, point('P1'), { as: 'porePressure' })).toBeNull();
  });

  it('keeps zero, which is a figure', () => {
    const edit = changeMeasured(POINT_A, point('P1'), { value: 0, as: 'pressureHead' });
    expect(pointIn(edit)?.measured).toEqual({ value: 0, as: 'pressureHead', plusMinus: null, on: '' });
    expect(documentEntity.safeParse(pointIn(edit)).success).toBe(true);
  });

  it('changes one thing and leaves the others, and takes all of it away', () => {
    const held = point('P1', { measured: shown });
    expect(pointIn(changeMeasured(POINT_A, held, { plusMinus: null }))?.measured).toEqual({
      ...shown,
      plusMinus: null,
    });
    expect(pointIn(clearMeasured(POINT_A, held))?.measured).toBeNull();
    expect(pointIn(changeTip(POINT_A, held, 0.02))).toEqual({ ...held, elevationPlusMinus: 0.02 });
  });
});

describe('a measured value in words', () => {
  it.each([
    ['none', { difference: null, differencePlusMinus: null, beyond: false }, /no head here/],
    ['wet', { difference: null, beyond: false, wetAboveNet: true }, /above the phreatic line/],
    ['within', { difference: -0.1, beyond: false }, /^Measured minus net −0\.10 ± 0\.15 m\. Within the ±\.$/],
    ['adverse', {}, /^Measured minus net \+0\.35 ± 0\.15 m\. More than the ± explains, and adverse\.$/],
    ['low', { difference: -0.35 }, /^Measured minus net −0\.35 ± 0\.15 m\. Less than the net says/],
  ] as const)('is %s', (state, changes, sentence) => {
    expect(measuredState(compared(changes))).toBe(state);
    expect(measuredSentence(compared(changes), 'SI', 'm')).toMatch(sentence);
  });

  it('is not judged without a ±', () => {
    const words = measuredSentence(compared({ differencePlusMinus: null, beyond: false }), 'SI', 'm');
    expect(words).toBe('Measured minus net +0.35 m.');
  });
});

describe('the schedule with measured values', () => {
  const document = documentWith({ [POINT_A]: point('P1'), [POINT_B]: point('P2', { order: 2 }) });
  const reading = readNet(document);
  const table = (measured: MeasuredReading[], onMeasured?: () => void) =>
    renderToStaticMarkup(
      createElement(Schedule, {
        document,
        reading: { ...reading, measured },
        sort: ENTERED_ORDER,
        onSort: () => undefined,
        onEdit: null,
        selectedIds: [],
        onSelect: null,
        onMeasured,
      }),
    );

  it('has the two columns only where something was measured', () => {
    expect(scheduleColumns(document).map(({ column }) => column)).not.toContain('difference');
    expect(table([])).not.toContain('Measured');
    expect(table([compared()])).toContain('Measured, m LD');
    expect(table([compared()])).toContain('Measured − net, m');
  });

  it('shows an adverse difference beyond its ± in red, and one within it plainly', () => {
    expect(table([compared()])).toMatch(/text-wrong[^>]*>\+0\.35<span[^>]*> ± 0\.15/);
    expect(table([compared({ beyond: false })])).not.toContain('text-wrong');
  });

  it('is copied as it is shown: columns of numbers, the sign of the difference as spreadsheets read it', () => {
    const measured = [compared({ difference: -0.35 })];
    const [heads, first, second] = scheduleTsv(document, reading.points, ENTERED_ORDER, measured)
      .split('\n')
      .map((line) => line.split('\t'));
    expect(heads?.slice(-4)).toEqual(['Measured, m LD', '± at 95 %', 'Measured − net, m', '± at 95 %']);
    expect(first?.slice(-4)).toEqual(['114.20', '0.05', '-0.35', '0.15']);
    expect(second?.slice(-4)).toEqual(['', '', '', '']);
    expect(heads?.length).toBe(first?.length);
  });

  it('sorts by the difference, points without one last either way', () => {
    const measured = [compared({ id: POINT_B, difference: -1 })];
    for (const descending of [false, true]) {
      const sorted = sortedPoints(reading.points, { column: 'difference', descending }, measured);
      expect(sorted.map(({ name }) => name)).toEqual(['P2', 'P1']);
    }
  });
});
