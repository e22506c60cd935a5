import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import type { SheetSource } from '#shared/text/calculation-sheet/content.ts';
import { inputsChapter } from '#shared/text/calculation-sheet/inputs.ts';
import { methodChapter } from '#shared/text/calculation-sheet/method.ts';
import { notesUntil } from '#shared/text/calculation-sheet/record.ts';
import { lowered, powerText, raised, richRuns } from '#shared/text/calculation-sheet/rich-text.ts';
import { sectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';
import { titleBlock } from '#shared/text/calculation-sheet/title-block.ts';
import { changed, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

describe('texts with raised and lowered runs', () => {
  it('come apart into their runs', () => {
    expect(richRuns(`k${lowered('h')} = 10${raised('−6')} m/s`)).toEqual([
      { text: 'k', level: 'line' },
      { text: 'h', level: 'lowered' },
      { text: ' = 10', level: 'line' },
      { text: '−6', level: 'raised' },
      { text: ' m/s', level: 'line' },
    ]);
    expect(powerText(2e-6, 2)).toBe(`2.0 × 10${raised('−6')}`);
    expect(powerText(null, 2)).toBe('–');
  });

  it('leave what a person wrote alone', () => {
    expect(richRuns('a^{2}_b <sup>')).toEqual([{ text: 'a^{2}_b <sup>', level: 'line' }]);
  });
});

describe('notes up to a moment', () => {
  const person = { id: '01890000-0000-7000-8000-000000000001', name: 'Tove Lind' };
  /** An entry that names nobody, has no file and was never changed. */
  const PLAIN = { editedAt: null, named: [], files: [] };
  const note: NoteDto = {
    id: '01890000-0000-7000-8000-000000000002',
    netId: '01890000-0000-7000-8000-000000000003',
    number: 1,
    anchor: { on: 'place', at: [1, 1] },
    state: 'closed',
    createdAt: '2026-01-01T00:00:00.000Z',
    closedBy: person,
    closedAt: '2026-01-04T00:00:00.000Z',
    answered: null,
    mustAnswer: null,
    unread: 0,
    entries: [
      { id: 'a', author: person, text: 'Why?', at: '2026-01-01T00:00:00.000Z', ...PLAIN },
      { id: 'b', author: person, text: 'So.', at: '2026-01-03T00:00:00.000Z', ...PLAIN },
    ],
  };

  it('stand as they stood then', () => {
    expect(notesUntil([note], '2025-12-31T00:00:00.000Z')).toEqual([]);
    expect(notesUntil([note], '2026-01-02T00:00:00.000Z')).toMatchObject([
      { state: 'open', closedAt: null, entries: [{ id: 'a' }] },
    ]);
    expect(notesUntil([note], '2026-01-03T00:00:00.000Z')).toMatchObject([{ state: 'answered' }]);
    expect(notesUntil([note], '2026-01-05T00:00:00.000Z')).toEqual([note]);
  });
});

describe('the figure of the section', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const turn = (mirrored: boolean) => {
    const document = exactNetDocument(net, { pxPerUnit, mirrored });
    return { document, figure: sectionFigure(document, readNet(document))! };
  };

  it('shows every trace within the sheet and a bar of the set-out scale', () => {
    const { document, figure } = turn(false);
    const [left, top, width, height] = figure.crop;
    for (const [x, y] of figure.lines.flatMap((line) => line.points)) {
      expect(x).toBeGreaterThanOrEqual(left);
      expect(x).toBeLessThanOrEqual(left + width);
      expect(y).toBeGreaterThanOrEqual(top);
      expect(y).toBeLessThanOrEqual(top + height);
    }
    expect(left + width).toBeLessThanOrEqual(document.sheet.widthPx);
    const [bar, ...others] = figure.scaleBars;
    expect(others).toEqual([]);
    // The document is drawn at so many pixels to the metre.
    expect(bar!.lengthPx / Number.parseFloat(bar!.label)).toBeCloseTo(pxPerUnit, 3);
  });

  it('has no bar on a photograph, where no length is the same in two places', () => {
    const { document } = turn(false);
    const reading = readNet(document);
    const aslant = changed(document, 'setOut', (value) => ({ ...value, scales: 'perspective' as const }));
    expect(sectionFigure(aslant, reading)!.scaleBars).toEqual([]);
  });

  it('turns the direction of flow with the drawing', () => {
    const sides = [turn(false).figure.flow, turn(true).figure.flow];
    expect(sides.sort()).toEqual(['left', 'right']);
  });
});

describe('the title block', () => {
  const document = exactNetDocument(EXACT_NETS[0]!.net, { pxPerUnit: EXACT_NETS[0]!.pxPerUnit });
  const reading = readNet(document);
  const residualOf = (of: typeof reading) =>
    titleBlock({
      document,
      reading: of,
      dam: { name: 'Harrow Fen Dam' },
      section: { name: 'B–B', chainage: '212' },
      drawing: { number: 'HF-114', title: 'Section', revision: 'C', sha256: 'ab12' },
      netName: 'Steady',
      jobNumber: '',
      drawnBy: [],
      status: { kind: 'draft', at: '2026-01-01T00:00:00.000Z' },
    } as unknown as SheetSource).find(({ label }) => label === 'Residual')!.value;

  it('tells what the known points leave to a place', () => {
    const { middle, corner } = reading.setOut.placeDoubt!;
    const length = (of: typeof middle) => Math.hypot(of.offset, of.elevation).toPrecision(2);
    expect(residualOf(reading)).toMatch(/; places ± [\d.]+/);
    expect(residualOf(reading)).toContain(`± ${Number(length(middle))}`);
    expect(residualOf(reading)).toContain(`${Number(length(corner))} m`);
  });

  it('tells nothing of it for a reading of an engine that did not work it out', () => {
    expect(residualOf({ ...reading, setOut: { ...reading.setOut, placeDoubt: null } })).not.toContain('±');
  });
});

describe('lines adopted from the computed net', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const document = exactNetDocument(net, { pxPerUnit });
  const textOf = (of: FlowNetDocument) => {
    const reading = readNet(of);
    const source = {
      document: of,
      reading,
      drawing: { number: 'HF-114', title: 'Section', revision: 'C', sha256: 'ab12' },
      section: { name: 'B–B', chainage: '212' },
      pageNumber: 1,
    } as SheetSource;
    return JSON.stringify([methodChapter(source), inputsChapter(source)]);
  };

  it('are named so in the table of lines, and the method says what that makes of the figures', () => {
    const adopted = withLines(document, 'equipotential', (value, i) =>
      i === 0 ? { ...value, origin: 'adopted' } : value,
    );
    const text = textOf(adopted);
    expect(text).toContain('equipotential, adopted');
    expect(text).toContain('One line of the net was adopted from the computed net');
    expect(text).toContain('agree with that solution by construction');
  });

  it('are not spoken of where there are none', () => {
    expect(textOf(document)).not.toContain('adopted');
  });
});
