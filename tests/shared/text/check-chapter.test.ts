import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { ReviewDto } from '#shared/contract/review.ts';
import { checkChapter } from '#shared/text/calculation-sheet/check.ts';
import type { SheetBlock, SheetSource } from '#shared/text/calculation-sheet/content.ts';
import { figuresToCheck } from '#shared/text/figures-to-check.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const document = finishedDocument(2);
const reading = readNet(document);
const person = { id: '01890000-0000-7000-8000-000000000001', name: 'Remi Okafor' };
const at = '2026-12-01T10:00:00.000Z';
const hash = 'a3'.repeat(32);

const sourceOf = (review: Partial<ReviewDto>) =>
  ({
    document,
    reading,
    status: {
      kind: 'revision',
      review: { openings: [], blindReadings: [], checks: [], ...review },
    },
  }) as unknown as SheetSource;

const tables = (blocks: readonly SheetBlock[]) => blocks.filter((block) => block.kind === 'table');

describe('the figures to check', () => {
  it('are those with a figure, each once, with what they are of', () => {
    const figures = figuresToCheck(document, reading);
    expect(new Set(figures.map(({ key }) => key)).size).toBe(figures.length);
    const [point] = reading.points;
    const own = figures.filter(({ of }) => of === point?.name);
    expect(own.map(({ what }) => what)).toEqual([
      'offset',
      'elevation',
      'drops lost',
      'total head',
      'pressure head',
      'pore pressure',
    ]);
    expect(own.at(-1)?.value).toMatch(/^[\d.]+ ± [\d.]+ kPa$/);
    const withheld = { ...point!, dropsLost: null, totalHead: null, pressureHead: null, porePressure: null };
    const less = figuresToCheck(document, { ...reading, points: [withheld] });
    expect(less.filter(({ of }) => of === point?.name)).toHaveLength(2);
  });
});

describe('the check on the calculation sheet', () => {
  it('is left out of a draft and where nothing of it was recorded', () => {
    expect(checkChapter(sourceOf({}))).toBeNull();
    const draft = { status: { kind: 'draft', at } } as unknown as SheetSource;
    expect(checkChapter(draft)).toBeNull();
  });

  it('tells who opened the figures when', () => {
    const chapter = checkChapter(sourceOf({ openings: [{ person, at, hash }] }));
    expect(chapter?.blocks).toEqual([
      {
        kind: 'facts',
        rows: [
          {
            label: 'Figures opened',
            value: 'by Remi Okafor, 2026-12-01 10:00 UTC, without reading blind',
          },
        ],
      },
    ]);
  });

  it('sets a blind reading beside the engineer’s figures and says what was known', () => {
    const [point] = reading.points;
    const own = {
      placesShownAt: null,
      figuresMailed: true,
      drops: 10,
      headwater: 5,
      outletHead: 0,
      gammaW: 9.81,
      points: [
        {
          pointId: point!.id,
          name: point!.name,
          sheetAt: null,
          offset: null,
          elevation: point!.elevation!,
          dropsLost: 3,
          totalHead: point!.totalHead! + 10,
          porePressure: point!.porePressure! + 98.1,
          remark: 'By eye.',
        },
      ],
    };
    const chapter = checkChapter(sourceOf({ blindReadings: [{ person, at, hash, reading: own }] }));
    expect(JSON.stringify(chapter?.blocks[0])).toMatch(/mail about the revision told the main figures/);
    const [row] = tables(chapter!.blocks)[0]!.rows;
    expect(row?.[4]).toBe('+10.00');
    expect(row?.[6]).toBe('+98.1');
    expect(row?.slice(-2)).toEqual(['NO', 'By eye.']);
  });

  it('lists what was ticked of each point, and the check list as it was answered', () => {
    const figures = figuresToCheck(document, reading).map(({ key, of, what, value }, i) => ({
      key,
      of,
      what,
      value,
      ticked: i === 0,
    }));
    const checkList = [
      { id: 'datum', text: 'The datum is named.', answer: 'yes' as const, remark: '' },
      { id: 'drops', text: 'Counted again.', answer: null, remark: '' },
    ];
    const check = { figures, checkList };
    const decisionId = person.id;
    const chapter = checkChapter(
      sourceOf({ checks: [{ person, at, hash, decisionId, decision: 'returned', check }] }),
    );
    expect(JSON.stringify(chapter?.blocks[0])).toContain(`1 of ${figures.length}`);
    const [ticks, list] = tables(chapter!.blocks);
    expect(ticks?.rows[0]?.[1]).toMatch(/^offset /);
    expect(ticks?.rows.at(-1)?.[1]).toBe('none');
    expect(list?.rows).toEqual([
      ['The datum is named.', 'yes', ''],
      ['Counted again.', 'not answered', ''],
    ]);
  });
});
