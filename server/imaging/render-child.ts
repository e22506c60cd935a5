import { prepareDecoder } from './image-source.ts';
import { probeImage } from './probe-image.ts';
import { RenderRefusal } from './refusal.ts';
import { renderImage } from './render-image.ts';
import { collectConsole } from './render-log.ts';
import type { ProbeResult, RenderAnswer, RenderOrder, RenderReport } from './render-types.ts';
import { sniffFile } from './sniff.ts';

/*
 * The rendering process: takes orders over IPC, one at a time. It holds no secret, opens no connection, and its
 * parent ends it when it takes too much memory or time.
 */
collectConsole();
prepareDecoder();
globalThis.fetch = () => Promise.reject(new Error('the rendering process fetches nothing'));

function answer(message: RenderAnswer): void {
  if (process.connected) process.send?.(message);
}

/** Loaded when the first PDF comes: it takes longer than drawing a small scan. */
async function pdfPart() {
  const [{ probePdf }, { renderPdf }] = await Promise.all([
    import('./probe-pdf.ts'),
    import('./render-pdf.ts'),
  ]);
  return { probePdf, renderPdf };
}

async function probe(file: string): Promise<ProbeResult> {
  const kind = await sniffFile(file);
  return {
    kind,
    pages: kind === 'pdf' ? await (await pdfPart()).probePdf(file) : await probeImage(file, kind),
  };
}

async function obey(order: RenderOrder): Promise<RenderAnswer> {
  const { id } = order;
  if (order.kind === 'probe') return { id, kind: 'probed', result: await probe(order.file) };
  const onProgress = (share: number) => answer({ id, kind: 'progress', share });
  const report: RenderReport = {
    progress: onProgress,
    firstView: (view) => answer({ id, kind: 'firstView', view }),
  };
  if (order.kind === 'rendition') {
    const { renderRendition } = await import('./rendition.ts');
    return { id, kind: 'renditionMade', result: await renderRendition(order.request, onProgress) };
  }
  const render = order.request.kind === 'pdf' ? (await pdfPart()).renderPdf : renderImage;
  return { id, kind: 'rendered', result: await render(order.request, report) };
}

function explain(id: number, error: unknown): RenderAnswer {
  if (error instanceof RenderRefusal) {
    return { id, kind: 'refused', refusal: { code: error.code, message: error.message } };
  }
  return {
    id,
    kind: 'failed',
    message: error instanceof Error ? (error.stack ?? error.message) : String(error),
  };
}

process.on('message', async (order: RenderOrder) => {
  answer(await obey(order).catch((error: unknown) => explain(order.id, error)));
});
process.on('disconnect', () => process.exit());
