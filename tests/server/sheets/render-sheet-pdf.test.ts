import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { getDocument, type PDFDocumentProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { renderSheetPdf } from '#server/sheets/render-sheet-pdf.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type SheetSource, sheetContent } from '#shared/text/calculation-sheet/content.ts';
import { fixedText, plainText, plusMinusText } from '#shared/text/number-text.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const document = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 12, 5) });
const reading = readNet(document);
const ACCEPTED = {
  decision: 'accepted',
  by: 'Remi Okafor',
  capacity: 'Reviewing engineer',
  note: '',
  at: '2026-11-05T14:00:00.000Z',
} as const;
const HASH = 'a3'.repeat(32);

const source = (more: Partial<SheetSource> = {}): SheetSource => ({
  status: {
    kind: 'revision',
    label: 'B',
    hash: HASH,
    previousHash: 'c4'.repeat(32),
    sentAt: '2026-11-03T09:12:44.000Z',
    sentBy: 'Ines Żółkoś',
    reviewer: 'Remi Okafor',
    message: 'Please look at line 3.',
    stayedOpen: [
      { key: 'noDatum', about: 'datum', text: 'The vertical datum has no name.', reason: 'Local gauge.' },
    ],
    decision: ACCEPTED,
    records: [ACCEPTED],
    review: { openings: [], blindReadings: [], checks: [] },
  },
  jobNumber: 'J-2207',
  dam: { name: 'High Fell' },
  drawing: { number: 'HF-114', title: 'Cross-sections', revision: 'C', sha256: 'f0'.repeat(32) },
  section: { name: 'B–B', chainage: '212' },
  pageNumber: 1,
  netName: 'Full supply level',
  document,
  reading,
  engineVersion: '9',
  drawnBy: ['Ines Żółkoś'],
  notes: [],
  ...more,
});

const MADE_AT = new Date('2026-11-05T14:00:00.000Z');
const render = (of: SheetSource, paper: 'A4' | 'A3' = 'A4', scan: Buffer | null = null) =>
  renderSheetPdf({ content: sheetContent(of), paper, scan, madeAt: MADE_AT });

async function open(pdf: Buffer): Promise<PDFDocumentProxy> {
  return getDocument({ data: new Uint8Array(pdf), verbosity: 0 }).promise;
}

async function textsOf(pdf: PDFDocumentProxy): Promise<string[]> {
  const pages = Array.from({ length: pdf.numPages }, async (_, i) => {
    const { items } = await (await pdf.getPage(i + 1)).getTextContent();
    return items
      .map((item) => ('str' in item ? item.str : ''))
      .join(' ')
      .replaceAll(/\s+/g, ' ');
  });
  return Promise.all(pages);
}

/** With SHEET_PDF_FOLDER set the sheets are kept, to be looked at. */
function keep(name: string, pdf: Buffer): void {
  const folder = process.env.SHEET_PDF_FOLDER;
  if (!folder) return;
  mkdirSync(folder, { recursive: true });
  writeFileSync(path.join(folder, name), pdf);
}

describe('the calculation sheet of a revision as PDF', () => {
  let pdf: Buffer;
  let opened: PDFDocumentProxy;
  let texts: string[];
  beforeAll(async () => {
    const [, , width, height] = sheetContent(source()).figure!.crop;
    const scan = await sharp({
      create: {
        width: Math.round(width / 4),
        height: Math.round(height / 4),
        channels: 3,
        background: '#e8e6df',
      },
    })
      .jpeg()
      .toBuffer();
    pdf = await render(source(), 'A4', scan);
    keep('a4.pdf', pdf);
    opened = await open(pdf);
    texts = await textsOf(opened);
  });

  it('gives every figure of the reading as the schedule shows it', () => {
    const text = texts.join(' ');
    expect(reading.state).toBe('read');
    for (const point of reading.points) {
      const row = [
        point.name,
        plusMinusText(point.totalHead, point.totalHeadPlusMinus, 2),
        plusMinusText(point.pressureHead, point.pressureHeadPlusMinus, 2),
        plusMinusText(point.porePressure, point.porePressurePlusMinus, 1),
      ];
      for (const figure of row) expect(text).toContain(figure);
    }
  });

  it('bears page n of m, revision and hash on every page', () => {
    expect(texts.length).toBeGreaterThan(2);
    texts.forEach((text, i) => {
      expect(text).toContain(`Page ${i + 1} of ${texts.length}`);
      expect(text).toContain('Revision B, SHA-256');
      expect(text.replaceAll(' ', '')).toContain(HASH);
      expect(text).not.toContain('DRAFT');
    });
  });

  it('names job, decision, validity and the letters of any European name', () => {
    const text = texts.join(' ').replaceAll(/\s+/g, ' ');
    expect(text.replaceAll(' ', '')).toContain('InesŻółkoś');
    for (const said of [
      'J-2207',
      'accepted by Remi Okafor',
      'Not for drawdown',
      'Registration number',
      'Stamp',
    ])
      expect(text).toContain(said);
  });

  it('has title, language, outline, links and embedded fonts', async () => {
    const { info } = (await opened.getMetadata()) as { info: { Title?: string; Language?: string } };
    expect(info.Title).toBe('Calculation sheet, High Fell, Section B–B, chainage 212, Full supply level');
    expect(info.Language).toBe('en-GB');
    const outline = await opened.getOutline();
    expect(outline.map((item) => item.title)).toEqual([
      'Section',
      ...sheetContent(source()).chapters.map((chapter) => chapter.title),
    ]);
    const annotations = await (await opened.getPage(2)).getAnnotations();
    expect(annotations.length).toBe(sheetContent(source()).chapters.length);
    for (const each of annotations) expect(await opened.getDestination(String(each.dest))).not.toBeNull();
    const fonts = pdf.toString('latin1').match(/\/BaseFont \/(\S+)/g) ?? [];
    expect(fonts.length).toBeGreaterThan(0);
    for (const font of fonts) expect(font).toMatch(/\/BaseFont \/[A-Z]{6}\+/);
  });

  it('comes out the same, byte for byte', async () => {
    const [once, again] = [await render(source()), await render(source())];
    expect(once.equals(again)).toBe(true);
    expect(once.equals(await render(source({ jobNumber: 'J-2208' })))).toBe(false);
  });
});

describe('other calculation sheets', () => {
  it('say DRAFT across each page and bear no hash', async () => {
    const pdf = await render(source({ status: { kind: 'draft', at: '2026-11-05T14:00:00.000Z' } }), 'A3');
    keep('draft-a3.pdf', pdf);
    for (const text of await textsOf(await open(pdf))) {
      expect(text).toContain('DRAFT, not a revision');
      expect(text).not.toContain(HASH);
    }
  });

  it('lie on A3 where that is asked for', async () => {
    const page = await (await open(await render(source(), 'A3'))).getPage(1);
    const { width, height } = page.getViewport({ scale: 25.4 / 72 });
    expect([Math.round(width), Math.round(height)]).toEqual([420, 297]);
  });

  it('print each sample of a profile and the uplift on it', async () => {
    const id = '01890000-0000-7000-8000-0000000000ff';
    const ends = [
      [-10, 100],
      [8, 100],
    ] as Array<[number, number]>;
    const value = {
      kind: 'profile',
      name: 'Underside',
      use: 'base',
      place: { on: 'section', points: ends },
      spacing: 2,
      finished: true,
      order: 1,
    } as const;
    const withProfile = {
      ...document,
      entities: { ...document.entities, [id]: { id, version: 1, value } },
    };
    const read = readNet(withProfile);
    const pdf = await render(source({ document: withProfile, reading: read }));
    keep('profile.pdf', pdf);
    const text = (await textsOf(await open(pdf))).join(' ');
    const [profile] = read.profiles;
    const pressures = profile!.samples.flatMap(({ porePressure }) =>
      porePressure === null ? [] : [porePressure],
    );
    expect(pressures.length).toBeGreaterThan(5);
    for (const pressure of pressures) expect(text).toContain(fixedText(pressure, 1));
    expect(profile!.uplift?.total).not.toBeNull();
    expect(text).toContain(`${plainText(profile!.uplift!.total!.vertical)} kN per m upwards`);
  });

  it('are made of a net with nothing on it too', async () => {
    const empty = { ...document, entities: {} };
    const text = (
      await textsOf(await open(await render(source({ document: empty, reading: readNet(empty) }))))
    ).join(' ');
    expect(text).toContain('Nothing is traced yet');
    expect(text).not.toMatch(/NaN|undefined|Infinity/);
  });
});
