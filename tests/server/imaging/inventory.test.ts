import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import type { ProbedPage } from '#server/imaging/render-types.ts';

/**
 * Real and hostile files of others, each held against the outcome their inventory states. Every file goes through
 * the real rendering process: all pages are probed, the first is drawn.
 */
const inputs = path.resolve(import.meta.dirname, '../../../../shared/inputs');
const isPresent = existsSync(path.join(inputs, 'INVENTORY.md'));
const FOLDERS = ['hostile', 'pdf', 'tiff', 'image', 'drawings'];

/** Low, to be quick; the bomb and the largest pages get no nearer to a limit by it. */
const PDF_DPI = 50;

interface Stated {
  file: string;
  outcome: string;
}

/** The rows of the inventory's tables, under the heading of their folder. */
function readInventory(): Stated[] {
  const rows: Stated[] = [];
  let folder = '';
  for (const line of readFileSync(path.join(inputs, 'INVENTORY.md'), 'utf8').split('\n')) {
    folder = /^## (\w+)\//.exec(line)?.[1] ?? folder;
    const cells = line.split('|').map((cell) => cell.trim());
    const [name, outcome] = [cells[1], cells.at(-2)];
    if (cells.length < 7 || !name || !outcome || name === 'file' || /^-+$/.test(name)) continue;
    if (FOLDERS.includes(folder)) rows.push({ file: `${folder}/${name}`, outcome });
  }
  return rows;
}

/** The one answer that is meant to be another than the inventory's tools give: WebP is taken here. */
const TAKEN_HERE: Record<string, string> = { 'hostile/hopper.webp': 'accepted, 1 page' };

interface Seen {
  refusal: RenderRefusal | null;
  pages: ProbedPage[];
  note: string;
}

function checkInventory(): void {
  const stated = readInventory();
  let folder: string;
  let renderer: RenderProcess;
  beforeAll(() => {
    folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-inventory-'));
    renderer = createRenderProcess({ seconds: 40 });
  });
  afterAll(() => {
    renderer.close();
    rmSync(folder, { recursive: true, force: true });
  });

  async function open(file: string): Promise<Seen> {
    const seen: Seen = { refusal: null, pages: [], note: '' };
    const outFolder = path.join(folder, 'sheet');
    try {
      const { kind, pages } = await renderer.probe(file);
      seen.pages = pages;
      const first = pages.find((page) => !page.refusal);
      const dpi = kind === 'pdf' ? { dpi: PDF_DPI } : {};
      const pageNumber = first?.pageNumber ?? 1;
      const sheet = await renderer.renderSheet({ file, kind, pageNumber, outFolder, ...dpi });
      seen.note = sheet.note;
    } catch (error) {
      // Anything but a refusal is a fault of the product, whatever the file.
      if (!(error instanceof RenderRefusal)) throw error;
      seen.refusal = error;
    } finally {
      rmSync(outFolder, { recursive: true, force: true });
    }
    return seen;
  }

  it('are the 201 rows that the inventory lists for drawings', () => {
    expect(stated).toHaveLength(201);
  });

  it.each(stated)('$file: $outcome', async ({ file, outcome }) => {
    const wanted = TAKEN_HERE[file] ?? outcome;
    const { refusal, pages } = await open(path.join(inputs, file));
    expect(renderer.peakBytes()).toBeLessThan(1_300_000_000);
    const mayAccept = /accepted|with no drawing|or drawn/.test(wanted);
    const mayRefuse = /refus/.test(wanted);
    if (refusal) {
      expect(mayRefuse, `refused: ${refusal.message}`).toBe(true);
      expect(refusal.message).toMatch(/^[A-Z].+\. .+\.$/);
      return;
    }
    expect(mayAccept, 'accepted').toBe(true);
    const count = Number(/(\d+) pages?/.exec(wanted)?.[1] ?? 1);
    expect(pages).toHaveLength(count);
  });

  it('say so on the sheet when a picture is left blank because it has no data', async () => {
    const { note } = await open(path.join(inputs, 'pdf/issue18042.pdf'));
    expect(note).toContain('A picture on this page has no data');
  });

  it.each([
    ['tiff/g4_orientation_1.tif', 590, 88],
    ['tiff/g4_orientation_3.tif', 590, 88],
    ['tiff/g4_orientation_6.tif', 590, 88],
    ['tiff/g4_orientation_8.tif', 590, 88],
    ['image/Landscape_6.jpg', 600, 450],
    ['image/Portrait_7.jpg', 450, 600],
    ['pdf/hello_world_rotated.pdf', 792, 612],
  ])('%s stands upright: %i × %i', async (file, width, height) => {
    const { pages } = await renderer.probe(path.join(inputs, file));
    expect(pages[0]).toMatchObject({ width, height });
  });
}

function sayThatItIsAbsent(): void {
  it('are absent on this machine, so that only the files the project makes itself have been tried', () => {
    console.info(`No inventory at ${path.relative(process.cwd(), inputs)}: the real files were not tried.`);
  });
}

describe('the files of the inventory', isPresent ? checkInventory : sayThatItIsAbsent);
