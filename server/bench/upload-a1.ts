import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { aptInstall, canInstall } from '#server/start/apt.mjs';
import { runCommand } from '#server/start/run-command.mjs';
import { a1GroupFour, a1Jpeg } from './a1-sheet.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, rowOf } from './bench.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { peakOfTree } from './process-tree.ts';
import { uploadSheet } from './upload-sheet.ts';

const RUNS = 3;
const MEGABYTE = 1e6;

interface Sample {
  seconds: number;
  megabytes: number;
}

async function timed(work: () => Promise<{ bytes: number }>): Promise<Sample> {
  const began = performance.now();
  const { bytes } = await work();
  return { seconds: (performance.now() - began) / 1000, megabytes: bytes / MEGABYTE };
}

/** From the first byte sent to the first tile received. */
function uploadToViewable(stand: BenchStand, client: ApiClient, file: Buffer, name: string): Promise<Sample> {
  return timed(() =>
    peakOfTree(stand.serverPid, async () => {
      await uploadSheet(client, file, name);
    }),
  );
}

/** libvips' own way from the same file to tiles of the same size. */
async function dzsave(file: Buffer, name: string): Promise<Sample> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-dzsave-'));
  const input = path.join(folder, name);
  writeFileSync(input, file);
  const args = ['dzsave', input, path.join(folder, 'out'), '--tile-size', '512', '--overlap', '0'];
  try {
    return await timed(async () => {
      const { result, bytes } = await peakOfTree(process.pid, () => runCommand('vips', args), 'children');
      if (result.code !== 0) throw new Error(`vips dzsave: ${result.output}`);
      return { bytes };
    });
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function ensureVips(): Promise<void> {
  if ((await runCommand('vips', ['--version'])).code === 0) return;
  if (!canInstall()) throw new Error('the reference needs vips: sudo apt-get install libvips-tools');
  await aptInstall('libvips-tools');
}

async function measure(
  name: string,
  make: (copy: number) => Promise<Buffer>,
  fileName: string,
): Promise<BenchRow[]> {
  await ensureVips();
  const stand = await openBenchStand();
  try {
    const client = await signInAtDam(stand);
    const own: Sample[] = [];
    const reference: Sample[] = [];
    // The first of each is thrown away: it also loads programs and warms the disk's cache.
    for (let run = 0; run <= RUNS; run++) {
      const file = await make(run);
      own.push(await uploadToViewable(stand, client, file, fileName));
      reference.push(await dzsave(file, fileName));
    }
    const seconds = (samples: Sample[]) => samples.slice(1).map((sample) => sample.seconds);
    const megabytes = (samples: Sample[]) => samples.slice(1).map((sample) => sample.megabytes);
    return [
      rowOf(name, 's', seconds(own), seconds(reference)),
      rowOf(`${name}-memory`, 'MB', megabytes(own), megabytes(reference)),
    ];
  } finally {
    await stand.close();
  }
}

export const uploadGroupFour: Bench = {
  name: 'upload-g4-a1',
  about:
    'an A1 sheet, 300 dpi, TIFF group 4: upload to first tile, and peak memory of the server, beside vips dzsave',
  run: () => measure('upload-g4-a1', a1GroupFour, 'a1.tif'),
};

export const uploadJpeg: Bench = {
  name: 'upload-jpeg-a1',
  about:
    'an A1 sheet, 300 dpi, JPEG: upload to first tile, and peak memory of the server, beside vips dzsave',
  run: () => measure('upload-jpeg-a1', a1Jpeg, 'a1.jpg'),
};
