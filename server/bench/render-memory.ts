import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, rowOf } from './bench.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { colourJpeg, groupFour } from './large-sheet.ts';
import { A0_400, E_600 } from './line-work.ts';
import { peakOfTree } from './process-tree.ts';
import { vectorPdf } from './sheet-as-pdf.ts';
import { uploadSheet } from './upload-sheet.ts';

const MEGABYTE = 1e6;
/** As a camera or a flat scanner states that the sheet lies on its side. */
const TURNED = 6;

interface Case {
  name: string;
  fileName: string;
  make(): Promise<Buffer>;
}

const CASES: Case[] = [
  { name: 'render-memory', fileName: 'e600.tif', make: () => groupFour(E_600) },
  { name: 'render-memory-colour', fileName: 'a0.jpg', make: () => colourJpeg(A0_400) },
  { name: 'render-memory-turned', fileName: 'turned.jpg', make: () => colourJpeg(A0_400, TURNED) },
  { name: 'render-memory-vectors', fileName: 'a0.pdf', make: () => vectorPdf(A0_400) },
];

async function peakMegabytes(stand: BenchStand, client: ApiClient, each: Case): Promise<number> {
  const file = await each.make();
  const { bytes } = await peakOfTree(stand.serverPid, () => uploadSheet(client, file, each.fileName));
  return bytes / MEGABYTE;
}

export const renderMemory: Bench = {
  name: 'render-memory',
  about:
    'peak resident memory of the server and what it starts while a sheet is prepared: E-size G4 at 600 dpi, A0 in colour at 400 dpi, the same lying on its side, A0 as vectors; promised: 1,200 MB',
  async run() {
    const stand = await openBenchStand();
    try {
      const client = await signInAtDam(stand);
      const rows = [];
      for (const each of CASES)
        rows.push(rowOf(each.name, 'MB', [await peakMegabytes(stand, client, each)], null));
      return rows;
    } finally {
      await stand.close();
    }
  },
};
