import { a1GroupFour, a1Jpeg } from './a1-sheet.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, rowOf } from './bench.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { groupFour } from './large-sheet.ts';
import { A1, E_600 } from './line-work.ts';
import { peakOfTree } from './process-tree.ts';
import { ensureProgram, tilesByOthers, withFile } from './reference-tools.ts';
import { scannedPdf, vectorPdf } from './sheet-as-pdf.ts';
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

/** Bytes behind the end of a file, which no reader looks at, make another file of the same picture. */
export const anotherCopy = (file: Buffer, run: number) =>
  Buffer.concat([file, Buffer.from(`\n% copy ${run}\n`)]);

/** From the first byte sent until all tiles are made and one of the finest has been received. */
const own = (stand: BenchStand, client: ApiClient, file: Buffer, name: string): Promise<Sample> =>
  timed(() => peakOfTree(stand.serverPid, () => uploadSheet(client, file, name)));

const others = (bytes: Buffer, name: string): Promise<Sample> =>
  withFile(bytes, name, (file, folder) =>
    timed(() => peakOfTree(process.pid, () => tilesByOthers(file, folder), 'children')),
  );

async function measure(name: string, make: () => Promise<Buffer>, fileName: string): Promise<BenchRow[]> {
  await ensureProgram('vips', '--version', 'libvips-tools');
  if (fileName.endsWith('.pdf')) await ensureProgram('pdftoppm', '-v', 'poppler-utils');
  const file = await make();
  const stand = await openBenchStand();
  try {
    const client = await signInAtDam(stand);
    const [ours, theirs]: [Sample[], Sample[]] = [[], []];
    // The first of each is thrown away: it also loads programs and warms the disk's cache.
    for (let run = 0; run <= RUNS; run++) {
      ours.push(await own(stand, client, anotherCopy(file, run), fileName));
      theirs.push(await others(file, fileName));
    }
    const of = (key: keyof Sample, samples: Sample[]) => samples.slice(1).map((sample) => sample[key]);
    return [
      rowOf(name, 's', of('seconds', ours), of('seconds', theirs)),
      rowOf(`${name}-memory`, 'MB', of('megabytes', ours), of('megabytes', theirs)),
    ];
  } finally {
    await stand.close();
  }
}

const WHOLE =
  'upload until all tiles are made and one at full size is received, and peak memory of the server';

export const uploadGroupFour: Bench = {
  name: 'upload-g4-a1',
  about: `an A1 sheet, 300 dpi, TIFF group 4: ${WHOLE}, beside vips dzsave`,
  run: () => measure('upload-g4-a1', a1GroupFour, 'a1.tif'),
};

export const uploadJpeg: Bench = {
  name: 'upload-jpeg-a1',
  about: `an A1 sheet, 300 dpi, JPEG: ${WHOLE}, beside vips dzsave`,
  run: () => measure('upload-jpeg-a1', a1Jpeg, 'a1.jpg'),
};

export const uploadGroupFourE: Bench = {
  name: 'upload-g4-e600',
  about: `an E-size sheet, 600 dpi, 560 million pixels, TIFF group 4: ${WHOLE}, beside vips dzsave`,
  run: () => measure('upload-g4-e600', () => groupFour(E_600), 'e600.tif'),
};

export const uploadPdf: Bench = {
  name: 'upload-pdf-a1',
  about: `an A1 sheet of vectors, and one that is a scan, as PDF: ${WHOLE}, beside pdftoppm at 300 dpi and vips dzsave`,
  run: async () => [
    ...(await measure('upload-pdf-a1', () => vectorPdf(A1), 'a1.pdf')),
    ...(await measure('upload-pdf-a1-scan', async () => scannedPdf(A1, await a1Jpeg()), 'a1.pdf')),
  ],
};
