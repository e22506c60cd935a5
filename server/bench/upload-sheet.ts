import type { DrawingDto, SheetDto } from '#shared/contract/drawings.ts';
import type { ApiClient } from './api-client.ts';

const POLL_MS = 50;
const PATIENCE_MS = 120_000;

/** Uploads a file and waits until its first page can be seen. */
export async function uploadSheet(client: ApiClient, file: Buffer, name: string): Promise<SheetDto> {
  const form = new FormData();
  form.append('file', new Blob([new Uint8Array(file)]), name);
  const drawing = await client.post<DrawingDto>(`/dams/${client.damId}/drawings`, form);
  const sheet = await firstSheet(client, drawing.id);
  await client.getBytes(`/sheets/${sheet.id}/tiles/${sheet.tiles.rendition}/0/0_0`);
  return sheet;
}

async function firstSheet(client: ApiClient, drawingId: string): Promise<SheetDto> {
  const deadline = performance.now() + PATIENCE_MS;
  while (performance.now() < deadline) {
    const drawing = await client.get<DrawingDto>(`/drawings/${drawingId}`);
    if (drawing.job.state === 'refused' || drawing.job.state === 'failed')
      throw new Error(drawing.job.message);
    if (drawing.job.state === 'done' && drawing.sheets[0]) return drawing.sheets[0];
    await new Promise((resolve) => setTimeout(resolve, POLL_MS));
  }
  throw new Error('The drawing was not ready within two minutes.');
}
