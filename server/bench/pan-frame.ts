import { a1GroupFour } from './a1-sheet.ts';
import { signInAtDam } from './api-client.ts';
import { type Bench, rowOf } from './bench.ts';
import { traceBenchNet } from './bench-net.ts';
import { openBenchStand } from './bench-stand.ts';
import {
  dragAbout,
  expectToFollow,
  openBareCanvas,
  openChromium,
  openDesk,
  turnWheel,
  watched,
  workP95,
} from './desk-in-browser.ts';
import { uploadSheet } from './upload-sheet.ts';

const RUNS = 3;

export const panFrame: Bench = {
  name: 'pan-frame',
  about:
    'main thread for each frame, 95th percentile, panning an A1 sheet with 60 lines, beside a bare canvas',
  async run() {
    const stand = await openBenchStand({ pages: true });
    const browser = await openChromium();
    try {
      const client = await signInAtDam(stand);
      const sheet = await uploadSheet(client, await a1GroupFour(), 'a1.tif');
      const { netId } = await traceBenchNet(client, sheet.id);
      const desk = await openDesk(browser, stand, client, netId);
      // From the whole sheet to a view that shows most lines and sharper tiles.
      await turnWheel(desk, 8);
      await expectToFollow(desk);
      const bare = await openBareCanvas(browser, 60, 100);
      const [own, reference]: [number[], number[]] = [[], []];
      // The first of each is thrown away: it also fetches tiles and warms the compiler.
      for (let run = 0; run <= RUNS; run++) {
        own.push(workP95(await watched(desk, () => dragAbout(desk, 'middle'))));
        reference.push(workP95(await watched(bare, () => dragAbout(bare, 'middle'))));
      }
      return [rowOf('pan-frame', 'ms', own.slice(1), reference.slice(1))];
    } finally {
      await browser.close();
      await stand.close();
    }
  },
};
