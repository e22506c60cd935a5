import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, rowOf } from './bench.ts';
import { openBenchStand } from './bench-stand.ts';
import { colourJpeg, groupFour } from './large-sheet.ts';
import { A0_400, E_600 } from './line-work.ts';
import { vectorPdf } from './sheet-as-pdf.ts';
import { anotherCopy } from './upload-bench.ts';
import { uploadToFirstView } from './upload-sheet.ts';

const RUNS = 3;

async function seconds(client: ApiClient, file: Buffer, name: string): Promise<number[]> {
  const samples: number[] = [];
  for (let run = 0; run < RUNS; run++) {
    const copy = anotherCopy(file, run);
    const began = performance.now();
    const sheet = await uploadToFirstView(client, copy, name);
    samples.push((performance.now() - began) / 1000);
    await untilWhole(client, sheet.id);
  }
  return samples;
}

/** The next upload must not wait behind this one. */
async function untilWhole(client: ApiClient, sheetId: string): Promise<void> {
  for (;;) {
    const { items } = await client.get<{
      items: Array<{ job: { state: string }; sheets: Array<{ id: string }> }>;
    }>(`/dams/${client.damId}/drawings`);
    const drawing = items.find((each) => each.sheets.some((sheet) => sheet.id === sheetId));
    if (drawing?.job.state === 'done') return;
    if (drawing?.job.state !== 'running') throw new Error(`The drawing is ${drawing?.job.state}.`);
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

export const firstView: Bench = {
  name: 'first-view',
  about:
    'from the first byte sent until the tiles that fill a desk’s window are received: E-size G4 at 600 dpi, A0 in colour at 400 dpi, A0 as vectors; promised within 3 s. The first of three starts the rendering process',
  async run() {
    const stand = await openBenchStand();
    try {
      const client = await signInAtDam(stand);
      const row = async (name: string, file: Buffer, fileName: string) =>
        rowOf(name, 's', await seconds(client, file, fileName), null);
      return [
        await row('first-view', await groupFour(E_600), 'e600.tif'),
        await row('first-view-colour', await colourJpeg(A0_400), 'a0.jpg'),
        await row('first-view-vectors', await vectorPdf(A0_400), 'a0.pdf'),
      ];
    } finally {
      await stand.close();
    }
  },
};
