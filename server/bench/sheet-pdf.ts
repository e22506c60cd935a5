import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { createRenderProcess } from '#server/imaging/render-process.ts';
import { figurePlace } from '#server/sheets/draw-section.ts';
import { renderSheetPdf } from '#server/sheets/render-sheet-pdf.ts';
import { scanPicture } from '#server/sheets/scan-picture.ts';
import { createLocalDiskStorage } from '#server/storage/local-disk-storage.ts';
import { tilePrefix } from '#server/storage/storage-keys.ts';
import type { StoragePort } from '#server/storage/storage-port.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type SheetContent, sheetContent } from '#shared/text/calculation-sheet/content.ts';
import { a1Jpeg } from './a1-sheet.ts';
import { type Bench, type BenchRow, repeated, rowOf } from './bench.ts';
import { placesOver, tracedDocument } from './traced-exact-net.ts';

const RUNS = 5;
const POINTS = 60;
const SHEET_ID = '01890000-0000-7000-8000-000000000001';
const MADE_AT = new Date('2026-01-01T00:00:00Z');

/** A revision of 60 points, read once: the sheet shows frozen figures. */
function contentOfNet(): SheetContent {
  const net = flatApronNet({
    width: 20,
    headwater: 108,
    tailwater: 100,
    drops: 12,
    channels: 5,
    middle: [0, 100],
  });
  const places = placesOver(net, POINTS, 3);
  const document = tracedDocument({ net, pxPerUnit: 60, jitterPx: 0, seed: 1, places });
  const hash = '0'.repeat(64);
  return sheetContent({
    status: {
      kind: 'revision',
      label: 'A',
      hash,
      previousHash: null,
      sentAt: MADE_AT.toISOString(),
      sentBy: 'Sender',
      reviewer: 'Reviewer',
      message: '',
      stayedOpen: [],
      decision: null,
      records: [],
      review: { openings: [], blindReadings: [], checks: [] },
    },
    jobNumber: '1',
    dam: { name: 'Bench' },
    drawing: { number: '1', title: 'A1 sheet', revision: 'A', sha256: hash },
    section: { name: 'A', chainage: '0' },
    pageNumber: 1,
    netName: 'Net',
    document,
    reading: readNet(document),
    engineVersion: 'bench',
    drawnBy: ['Drawer'],
    notes: [],
  });
}

/** The A1 sheet as tiles in a storage of its own. */
async function tiledA1(
  folder: string,
): Promise<{ storage: StoragePort; sheet: Parameters<typeof scanPicture>[1] }> {
  const file = path.join(folder, 'a1.jpg');
  writeFileSync(file, await a1Jpeg());
  const renderer = createRenderProcess();
  try {
    const outFolder = path.join(folder, 'tiles');
    const sheet = await renderer.renderSheet({ file, kind: 'jpeg', pageNumber: 1, outFolder });
    const root = path.join(folder, 'storage');
    mkdirSync(root);
    const storage = createLocalDiskStorage(root);
    await storage.putTree(tilePrefix(SHEET_ID, 'base'), outFolder);
    return { storage, sheet: { ...sheet, id: SHEET_ID, rendition: 'base', readyZoom: null } };
  } finally {
    renderer.close();
  }
}

async function run(): Promise<BenchRow[]> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-sheet-pdf-'));
  try {
    const { storage, sheet } = await tiledA1(folder);
    const content = contentOfNet();
    const crop = [0, 0, sheet.widthPx, sheet.heightPx] as const;
    const whole = { ...content, figure: content.figure && { ...content.figure, crop } };
    const sizes: number[] = [];
    const { signal } = new AbortController();
    const times = await repeated(RUNS, async () => {
      const began = performance.now();
      const { widthPt } = figurePlace('A3', crop);
      const scan = await scanPicture(storage, sheet, { crop, widthPt }, signal);
      const pdf = await renderSheetPdf({ content: whole, paper: 'A3', scan, madeAt: MADE_AT });
      sizes.push(pdf.length / 1e6);
      return (performance.now() - began) / 1000;
    });
    return [rowOf('sheet-pdf', 's', times, null), rowOf('sheet-pdf-size', 'MB', sizes, null)];
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** The promise is a size below 5 MB. */
export const sheetPdf: Bench = {
  name: 'sheet-pdf',
  about: 'the calculation sheet on A3 of a whole A1 scan at 300 dpi, 60 points',
  run,
};
