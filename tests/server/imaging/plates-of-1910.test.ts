import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import PDFDocument from 'pdfkit';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inkSheetOf } from '#client/features/desk/model/ink-tiles.ts';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { crossingOnSheet } from '#shared/compute/ink/crossing-over-sheet.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { type Known, sectionOf } from '#tests/support/known-points.ts';
import {
  type Pick,
  PLATES,
  type Plate,
  plateBytes,
  turnedPick,
  turnedSheet,
} from '#tests/support/plates-of-1910.ts';

/**
 * Two plates of 1910 (The North River and The East River Divisions of a railway tunnel: long profiles with labelled
 * stations and elevations, drawn with exaggeration), put to scale from some of their labels and asked for others. The
 * sheets go through the product's own decoding and tiles; every pick is where a person would click, and the crossing of
 * the two printed lines near it is what is taken.
 */
let folder: string;
let renderer: RenderProcess;
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-plates-'));
  renderer = createRenderProcess();
});
afterAll(() => {
  renderer.close();
  rmSync(folder, { recursive: true, force: true });
});

async function sheetOf(bytes: Buffer, name: string) {
  const file = path.join(folder, name);
  writeFileSync(file, bytes);
  const { kind } = await renderer.probe(file);
  const outFolder = path.join(folder, `${name}-tiles`);
  const { widthPx, heightPx, dpi, tileFormat, tileSizePx, maxZoom } = await renderer.renderSheet({
    file,
    kind,
    pageNumber: 1,
    outFolder,
  });
  const tiles = { rendition: '', tileSizePx, maxZoom } as Parameters<typeof inkSheetOf>[0]['tiles'];
  const sheet = inkSheetOf({ id: '', widthPx, heightPx, tiles }, async ({ z, x, y }) => {
    const tile = path.join(outFolder, `${z}`, `${x}_${y}.${tileFormat}`);
    const { data, info } = await sharp(tile).greyscale().raw().toBuffer({ resolveWithObject: true });
    return { width: info.width, height: info.height, grey: new Uint8Array(data) };
  });
  return { sheet, widthPx, heightPx, dpi };
}

type Sheet = Awaited<ReturnType<typeof sheetOf>>['sheet'];

async function snapped(sheet: Sheet, pick: Pick): Promise<[number, number]> {
  const found = await crossingOnSheet(sheet, pick.at, 16);
  if (found === null) throw new Error(`No crossing is found at ${pick.name}.`);
  return [found.at[0], found.at[1]];
}

/** Puts a sheet to scale by the picks of the fit and reads the others. */
async function readOff(sheet: Sheet, plate: Plate, move: (pick: Pick) => Pick = (pick) => pick) {
  const points: Known[] = [];
  for (const pick of plate.fit.map(move)) {
    points.push({
      at: await snapped(sheet, pick),
      offset: pick.station ?? null,
      elevation: pick.elevation ?? null,
    });
  }
  const document = sectionOf(points, { scales: 'plottingExaggeration' }, { unitSystem: 'US', dpi: 400 });
  const { map, reading } = readSetOut(document);
  const read = [];
  for (const pick of plate.predicted.map(move)) {
    const [station, elevation] = map!.toSection(sheetPx(...(await snapped(sheet, pick))));
    read.push({ name: pick.name, pick, station, elevation });
  }
  return { reading, read };
}

const worstOf = (read: Awaited<ReturnType<typeof readOff>>['read'], key: 'station' | 'elevation') =>
  Math.max(
    0,
    ...read.flatMap(({ pick, ...each }) =>
      pick[key] === undefined ? [] : [Math.abs(each[key] - pick[key])],
    ),
  );

describe.each(PLATES)('$file', (plate) => {
  const bytes = plateBytes(plate.file);
  if (bytes === null) {
    it.skip('needs the shared inputs, which are absent here', () => {});
    return;
  }
  let asPrinted: Awaited<ReturnType<typeof readOff>>;

  it('is put to scale from some labels, and others are read within what its printing allows', async () => {
    const { sheet, dpi } = await sheetOf(bytes, `${plate.file}.png`);
    expect(dpi).toBe(400);
    asPrinted = await readOff(sheet, plate);
    const { reading, read } = asPrinted;
    expect(reading.state).toBe('fitted');
    expect(reading.exaggeration! / plate.exaggeration).toBeCloseTo(1, 1);
    const [station, elevation] = [worstOf(read, 'station'), worstOf(read, 'elevation')];
    console.info(
      `${plate.file}: 1:${reading.exaggeration!.toFixed(2)} exaggerated, turned ${reading.rotationDeg!.toFixed(3)}°, worst of ${read.length}: station ${station.toFixed(1)} ft, elevation ${elevation.toFixed(2)} ft`,
    );
    for (const each of read) {
      if (each.pick.station !== undefined)
        expect(Math.abs(each.station - each.pick.station), each.name).toBeLessThan(plate.allows.stationFt);
      if (each.pick.elevation !== undefined)
        expect(Math.abs(each.elevation - each.pick.elevation), each.name).toBeLessThan(
          plate.allows.elevationFt,
        );
    }
  });

  /** The same figures but for the tenths of a pixel that another sampling costs. */
  function expectSame(other: Awaited<ReturnType<typeof readOff>>): void {
    const { unitsPerPx, unitsPerPxUp } = asPrinted.reading;
    other.read.forEach((each, i) => {
      const before = asPrinted.read[i]!;
      expect(Math.abs(each.station - before.station), each.name).toBeLessThan(plate.samePx * unitsPerPx!);
      expect(Math.abs(each.elevation - before.elevation), each.name).toBeLessThan(
        plate.samePx * unitsPerPxUp!,
      );
    });
  }

  it('gives the same figures turned by 2°', async () => {
    const turned = await turnedSheet(bytes, 2);
    const { sheet } = await sheetOf(turned.bytes, `${plate.file}-turned.png`);
    const other = await readOff(sheet, plate, (pick) => turnedPick(pick, turned));
    expect(other.reading.rotationDeg! - asPrinted.reading.rotationDeg!).toBeCloseTo(2, 1);
    expectSame(other);
  });

  it('gives the same figures as a G4 TIFF', async () => {
    const tiff = await sharp(bytes)
      .greyscale()
      .threshold(128)
      .toColourspace('b-w')
      .tiff({ compression: 'ccittfax4', bitdepth: 1, xres: 400 / 25.4, yres: 400 / 25.4 })
      .toBuffer();
    const { sheet } = await sheetOf(tiff, `${plate.file}.tif`);
    expectSame(await readOff(sheet, plate));
  });

  it('gives the same figures as a scanned PDF', async () => {
    const { width, height } = await sharp(bytes).metadata();
    const size: [number, number] = [(width! / 400) * 72, (height! / 400) * 72];
    const file = path.join(folder, `${plate.file}.jpg`);
    await sharp(bytes).greyscale().jpeg({ quality: 90 }).toFile(file);
    const pdf = new PDFDocument({ size, margin: 0 });
    const chunks: Buffer[] = [];
    pdf.on('data', (chunk: Buffer) => chunks.push(chunk));
    pdf.image(file, 0, 0, { width: size[0], height: size[1] });
    const ended = new Promise((resolve) => pdf.on('end', resolve));
    pdf.end();
    await ended;
    const { sheet, widthPx, heightPx } = await sheetOf(Buffer.concat(chunks), `${plate.file}.pdf`);
    expect([widthPx, heightPx]).toEqual([width, height]);
    expectSame(await readOff(sheet, plate));
  });
});
