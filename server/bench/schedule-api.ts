import { type ChildProcess, fork } from 'node:child_process';
import { once } from 'node:events';
import { fileURLToPath } from 'node:url';
import autocannon from 'autocannon';
import { v7 as uuidv7 } from 'uuid';
import { createDataSource } from '#server/entities/data-source.ts';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { A1_PX } from './a1-sheet.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, repeated, rowOf } from './bench.ts';
import { traceBenchNet } from './bench-net.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';

const SECONDS = 4;
const CONNECTIONS = 10;
const RUNS = 3;

/** A sheet without tiles: nothing here looks at them. */
export async function addSheet(stand: BenchStand, client: ApiClient): Promise<string> {
  const [drawingId, sheetId] = [uuidv7(), uuidv7()];
  const db = await createDataSource({ url: stand.ownerUrl, poolSize: 1 }).initialize();
  await db.getRepository(DrawingEntity).insert({
    id: drawingId,
    damId: client.damId,
    uploadedBy: client.personId,
    sha256: '0'.repeat(64),
    fileName: 'a1.tif',
    mediaType: 'image/tiff',
    byteSize: '1',
  });
  await db.getRepository(SheetEntity).insert({
    id: sheetId,
    drawingId,
    pageNumber: 1,
    widthPx: A1_PX.width,
    heightPx: A1_PX.height,
    dpi: 300,
    rendition: 'none',
    tileSizePx: 512,
    maxZoom: 5,
    tileFormat: 'png',
  });
  await db
    .getRepository(RenderJobEntity)
    .insert({ id: uuidv7(), drawingId, state: 'done', pagesTotal: 1, pagesDone: 1 });
  await db.destroy();
  return sheetId;
}

function startBareServer(
  databaseUrl: string,
  owners: string[],
): Promise<{ child: ChildProcess; address: string }> {
  const file = fileURLToPath(new URL('./bare-schedule-server.ts', import.meta.url));
  const env = { ...process.env, BARE_DATABASE_URL: databaseUrl, BARE_OWNERS: owners.join(',') };
  const child = fork(file, { env, execArgv: ['--import', 'tsx'] });
  return new Promise((resolve, reject) => {
    child.once('message', (message: { address: string }) => resolve({ child, address: message.address }));
    child.once('error', reject);
  });
}

/** Requests answered in a second; an answer that is not 2xx stops the measurement. */
async function requestsPerSecond(url: string, cookie: string): Promise<number> {
  const result = await autocannon({ url, connections: CONNECTIONS, duration: SECONDS, headers: { cookie } });
  if (result.non2xx > 0 || result.errors > 0)
    throw new Error(`${result.non2xx + result.errors} requests failed.`);
  return result.requests.average;
}

export const scheduleApi: Bench = {
  name: 'schedule-api',
  about:
    'schedule of a net with 60 lines and 24 points, requests per second, beside a bare Express route with the same query',
  async run() {
    const stand = await openBenchStand();
    try {
      const client = await signInAtDam(stand);
      const { netId, sectionId } = await traceBenchNet(client, await addSheet(stand, client));
      const reading = await client.get<NetReading>(`/nets/${netId}/schedule`);
      if (reading.points.some((point) => point.status !== 'read'))
        throw new Error('The net was not read whole.');
      const bare = await startBareServer(stand.appUrl, [netId, sectionId]);
      const schedule = `${stand.address}/api/v1/nets/${netId}/schedule`;
      const own = await repeated(RUNS, () => requestsPerSecond(schedule, client.cookie));
      const reference = await repeated(RUNS, () => requestsPerSecond(bare.address, ''));
      // Gone before the database is, or it would complain of losing it.
      bare.child.kill();
      await once(bare.child, 'exit');
      return [rowOf('schedule-api', 'requests/s', own, reference)];
    } finally {
      await stand.close();
    }
  },
};
