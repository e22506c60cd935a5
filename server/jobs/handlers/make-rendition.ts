import { randomUUID } from 'node:crypto';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import type { AppDeps } from '#server/app-deps.ts';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { createRenderProcess, type RenditionProcess } from '#server/imaging/render-process.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { LEASE_MS } from '#server/services/render-job-service.ts';
import { createRenditionJobService, type HeldRendition } from '#server/services/rendition-job-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { tilePrefix } from '#server/storage/storage-keys.ts';

const PROGRESS_MS = 700;
type Rows = ReturnType<typeof createRenditionJobService>;

/** Another run has taken the rendition over; nothing of this one counts any more. */
class LostLease extends Error {}

/**
 * Job `make-rendition`: the id is that of a row of `rendition`. The tiles are put in place whole before the row says that
 * they are there; a repeat makes the same ones.
 */
export function createRenditionHandler(
  deps: AppDeps,
  createProcess: () => RenditionProcess = createRenderProcess,
): JobHandler {
  const rows = <T>(work: (rows: Rows) => Promise<T>) =>
    inTransaction(deps, (tx) => work(createRenditionJobService(tx)));

  return async (renditionId, outer) => {
    const held = await rows((each) => each.claim(renditionId, randomUUID()));
    if (!held) return;
    const folder = path.join(deps.config.storageDir, 'work', held.runId);
    const lost = new AbortController();
    const signal = AbortSignal.any([outer, lost.signal]);
    const heartbeat = setInterval(async () => {
      const alive = await rows((each) => each.keepAlive(held)).catch(() => true);
      if (!alive) lost.abort(new LostLease('the rendition has been taken over'));
    }, LEASE_MS / 3);
    const renderer = createProcess();
    try {
      await make(held, renderer, folder, signal);
    } catch (error) {
      await settle(error, held, outer);
    } finally {
      clearInterval(heartbeat);
      renderer.close();
      await rm(folder, { recursive: true, force: true });
    }
  };

  async function make(
    held: HeldRendition,
    renderer: RenditionProcess,
    folder: string,
    signal: AbortSignal,
  ): Promise<void> {
    const free = await deps.storage.freeBytes();
    if (free < deps.config.minFreeBytes)
      throw new Error(`only ${free} bytes are free; MIN_FREE_BYTES asks for more`);
    await mkdir(folder, { recursive: true });
    const outFolder = path.join(folder, 'tiles');
    const { id: sheetId, rendition, widthPx, heightPx, tileSizePx, maxZoom, tileFormat } = held.place.sheet;
    const onProgress = atMostEvery(PROGRESS_MS, (share) => rows((each) => each.setProgress(held, share)));
    const made = await deps.storage.withLocalTree(tilePrefix(sheetId, rendition), (tiles) => {
      const base = { folder: tiles, widthPx, heightPx, tileSizePx, maxZoom, format: tileFormat };
      return renderer.renderRendition(
        { base, settings: held.row.settings, outFolder },
        { signal, onProgress },
      );
    });
    await deps.storage.putTree(tilePrefix(sheetId, held.id), outFolder);
    await rows((each) => each.finish(held, made));
  }

  async function settle(error: unknown, held: HeldRendition, signal: AbortSignal): Promise<void> {
    if (signal.aborted) return rows((each) => each.release(held));
    if (error instanceof RenderRefusal) return rows((each) => each.refuse(held, error.message));
    if (error instanceof LostLease) return;
    deps.logger.error({ err: error, renditionId: held.id, attempts: held.attempts }, 'cleaning up failed');
    return rows((each) => each.fail(held));
  }
}

/** What `act` does is a courtesy, and its failure is no reason to stop. */
function atMostEvery(everyMs: number, act: (share: number) => Promise<void>): (share: number) => void {
  let last = 0;
  return (share) => {
    if (Date.now() - last < everyMs) return;
    last = Date.now();
    act(share).catch(() => undefined);
  };
}
