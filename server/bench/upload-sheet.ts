import type { DrawingDto, SheetDto } from '#shared/contract/drawings.ts';
import type { ApiClient } from './api-client.ts';

const PATIENCE_MS = 10 * 60_000;
/** Asked for anyway, in case an announcement was missed. */
const AT_LEAST_MS = 1000;
/** Levels of a first view that fill a desk's window: 1,025 to 2,048 pixels on the longer side. */
const DESK_ZOOM = 2;

/** Uploads a file and waits until its first page is there whole and its finest tile has been received. */
export async function uploadSheet(client: ApiClient, file: Buffer, name: string): Promise<SheetDto> {
  const sheet = await uploaded(client, file, name, (each) => each.tiles.readyZoom === undefined);
  await client.getBytes(tilePath(sheet, sheet.tiles.maxZoom, '0_0'));
  return sheet;
}

/** Uploads a file and waits until a desk's window can be filled with its first page, whole or not. */
export async function uploadToFirstView(client: ApiClient, file: Buffer, name: string): Promise<SheetDto> {
  const sheet = await uploaded(client, file, name, () => true);
  const { tileSizePx, maxZoom } = sheet.tiles;
  const zoom = Math.min(DESK_ZOOM, maxZoom);
  const tilesAlong = (lengthPx: number) => Math.ceil(lengthPx / 2 ** (maxZoom - zoom) / tileSizePx);
  const wanted: Promise<unknown>[] = [];
  for (let x = 0; x < tilesAlong(sheet.widthPx); x++)
    for (let y = 0; y < tilesAlong(sheet.heightPx); y++)
      wanted.push(client.getBytes(tilePath(sheet, zoom, `${x}_${y}`)));
  await Promise.all(wanted);
  return sheet;
}

const tilePath = (sheet: SheetDto, zoom: number, tile: string) =>
  `/sheets/${sheet.id}/tiles/${sheet.tiles.rendition}/${zoom}/${tile}`;

/** Hears of the drawing as a browser does, by the stream of events, and looks again at each. */
async function uploaded(
  client: ApiClient,
  file: Buffer,
  name: string,
  isThere: (sheet: SheetDto) => boolean,
): Promise<SheetDto> {
  const ending = new AbortController();
  const ear = await openEar(client, ending.signal);
  try {
    const form = new FormData();
    form.append('file', new Blob([new Uint8Array(file)]), name);
    const { id } = await client.post<DrawingDto>(`/dams/${client.damId}/drawings`, form);
    for (const began = performance.now(); performance.now() - began < PATIENCE_MS; ) {
      const news = ear.next();
      const drawing = await client.get<DrawingDto>(`/drawings/${id}`);
      if (drawing.job.state === 'refused' || drawing.job.state === 'failed')
        throw new Error(drawing.job.message);
      if (drawing.sheets[0] && isThere(drawing.sheets[0])) return drawing.sheets[0];
      await news;
    }
    throw new Error('The drawing was not ready within ten minutes.');
  } finally {
    ending.abort();
  }
}

/** `next` resolves with the first event after it was asked for. */
async function openEar(client: ApiClient, signal: AbortSignal): Promise<{ next(): Promise<void> }> {
  const waiting = new Set<() => void>();
  const { body } = await client.open('/live', signal);
  const listen = async () => {
    for await (const _ of body as ReadableStream<Uint8Array> & AsyncIterable<Uint8Array>) {
      for (const wake of waiting) wake();
      waiting.clear();
    }
  };
  listen().catch(() => undefined);
  return {
    next: () =>
      new Promise((resolve) => {
        const timer = setTimeout(resolve, AT_LEAST_MS);
        waiting.add(() => {
          clearTimeout(timer);
          resolve();
        });
      }),
  };
}
