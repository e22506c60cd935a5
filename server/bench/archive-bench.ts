import { createWriteStream } from 'node:fs';
import { cp, stat } from 'node:fs/promises';
import path from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { runCommand } from '#server/start/run-command.mjs';
import { a1Jpeg } from './a1-sheet.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, rowOf } from './bench.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { peakOfTree } from './process-tree.ts';
import { ensureProgram, withFile } from './reference-tools.ts';
import { anotherCopy } from './upload-bench.ts';
import { uploadSheet } from './upload-sheet.ts';

const RUNS = 3;
/** Sheets of the dam; the same archive of half of them shows whether the memory grows. */
const SHEETS = 8;
const MEGABYTE = 1e6;

interface Sample {
  throughput: number;
  megabytes: number;
}

async function timed(byteSize: number, work: () => Promise<{ bytes: number }>): Promise<Sample> {
  const began = performance.now();
  const { bytes } = await work();
  const seconds = (performance.now() - began) / 1000;
  return { throughput: byteSize / MEGABYTE / seconds, megabytes: bytes / MEGABYTE };
}

/** From the request until the last byte of the archive lies on the disk. */
async function receive({ open, damId }: ApiClient, file: string): Promise<number> {
  const answer = await open(`/dams/${damId}/archive.zip`, new AbortController().signal);
  await pipeline(Readable.fromWeb(answer.body as never), createWriteStream(file));
  return (await stat(file)).size;
}

async function run(program: string, args: string[]): Promise<void> {
  const { code, output } = await runCommand(program, args);
  if (code !== 0) throw new Error(`${program}: ${output}`);
}

async function measure(stand: BenchStand, client: ApiClient, folder: string) {
  const originals = path.join(stand.storageDir, 'sha256');
  const [ours, zips, copies]: [Sample[], Sample[], Sample[]] = [[], [], []];
  // The first of each is thrown away: it warms the disk's cache.
  for (let sample = 0; sample <= RUNS; sample++) {
    const target = path.join(folder, `${sample}.zip`);
    const bytes = await receive(client, target);
    ours.push(await timed(bytes, () => peakOfTree(stand.serverPid, () => receive(client, target))));
    const zip = () => run('zip', ['-0', '-r', '-q', path.join(folder, `${sample}-others.zip`), originals]);
    zips.push(await timed(bytes, () => peakOfTree(process.pid, zip, 'children')));
    const copy = async () => {
      await cp(originals, path.join(folder, `${sample}-copy`), { recursive: true });
      return { bytes: 0 };
    };
    copies.push(await timed(bytes, copy));
  }
  const of = (key: keyof Sample, samples: Sample[]) => samples.slice(1).map((each) => each[key]);
  return { of, ours, zips, copies };
}

export const archive: Bench = {
  name: 'archive',
  about: `an archive of a dam of ${SHEETS} A1 scans, from the request to the last byte on disk, and peak memory of the server, beside zip without compression and a plain copy`,
  async run(): Promise<BenchRow[]> {
    await ensureProgram('zip', '--version', 'zip');
    const scan = await a1Jpeg();
    const stand = await openBenchStand();
    try {
      const client = await signInAtDam(stand);
      const add = async (from: number, to: number) => {
        for (let n = from; n < to; n++) await uploadSheet(client, anotherCopy(scan, n), `a1-${n}.jpg`);
      };
      await add(0, SHEETS / 2);
      const half = await withFile(Buffer.alloc(0), 'none', (_, folder) => measure(stand, client, folder));
      await add(SHEETS / 2, SHEETS);
      const whole = await withFile(Buffer.alloc(0), 'none', (_, folder) => measure(stand, client, folder));
      const { of, ours, zips, copies } = whole;
      return [
        rowOf('archive', 'MB/s', of('throughput', ours), of('throughput', zips)),
        rowOf('archive-copy', 'MB/s', of('throughput', ours), of('throughput', copies)),
        // Beside the same with half of the sheets: a memory that does not grow has a ratio of 1.
        rowOf('archive-memory', 'MB', of('megabytes', ours), half.of('megabytes', half.ours)),
      ];
    } finally {
      await stand.close();
    }
  },
};
