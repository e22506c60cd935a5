import { randomUUID } from 'node:crypto';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import type { AppDeps } from '#server/app-deps.ts';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { createRenderPool } from '#server/imaging/render-pool.ts';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import type { FirstView, ProbedPage, ProbeResult } from '#server/imaging/render-types.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { createRenderJobService, type HeldJob, LEASE_MS } from '#server/services/render-job-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { sheetIdOf } from '#server/services/sheet-id.ts';
import { originalKey, tilePrefix } from '#server/storage/storage-keys.ts';

/** The first rendition of every sheet, whose pixels are the sheet's coordinates. */
const BASE = 'base';
const PROGRESS_MS = 1000;

type Jobs = ReturnType<typeof createRenderJobService>;

/**
 * Turns an uploaded drawing into sheets. Its row of `render_job` is the truth: a run holds it by a lease, pages that
 * are sheets already are not drawn again, and whatever ends the run leaves either finished sheets or none.
 */
export function createRenderDrawingHandler(
  deps: AppDeps,
  createProcess: () => RenderProcess = createRenderProcess,
): JobHandler {
  const pool = createRenderPool(createProcess);
  const rows = <T>(work: (jobs: Jobs) => Promise<T>) =>
    inTransaction(deps, (tx) => work(createRenderJobService(tx)));

  return async (jobId, signal) => {
    const job = await rows((jobs) => jobs.claim(jobId, randomUUID()));
    if (!job) return;
    const renderer = pool.take();
    let isSound = false;
    const run = startRun(job, signal, rows, deps, renderer);
    try {
      const message = await run.renderPages();
      await rows((jobs) => jobs.finish(job, message));
      isSound = message === '';
    } catch (error) {
      await settle(error, job, signal);
    } finally {
      pool.giveBack(renderer, isSound);
      await run.end();
    }
  };

  async function settle(error: unknown, job: HeldJob, signal: AbortSignal): Promise<void> {
    if (signal.aborted) return rows((jobs) => jobs.release(job));
    if (error instanceof RenderRefusal) return rows((jobs) => jobs.refuse(job, error.message));
    if (error instanceof LostLease) return;
    deps.logger.error({ err: error, drawingId: job.drawing.id, attempts: job.attempts }, 'rendering failed');
    return rows((jobs) => jobs.fail(job));
  }
}

/** Another run has taken the job over; nothing of this one counts any more. */
class LostLease extends Error {}

type SheetPlace = { id: string; pageNumber: number; rendition: string };

type Rows = <T>(work: (jobs: Jobs) => Promise<T>) => Promise<T>;

function startRun(job: HeldJob, outer: AbortSignal, rows: Rows, deps: AppDeps, renderer: RenderProcess) {
  const folder = path.join(deps.config.storageDir, 'work', job.runId);
  const lost = new AbortController();
  const signal = AbortSignal.any([outer, lost.signal]);
  const heartbeat = setInterval(async () => {
    const alive = await rows((jobs) => jobs.keepAlive(job)).catch(() => true);
    if (!alive) lost.abort(new LostLease('the job has been taken over'));
  }, LEASE_MS / 3);

  /** Draws what is not a sheet yet and says which pages had to be left out. */
  async function renderPages(): Promise<string> {
    await mkdir(folder, { recursive: true });
    return deps.storage.withLocalFile(originalKey(job.drawing.sha256), async (file) => {
      const probed = await renderer.probe(file, { signal });
      const done = await rows((jobs) => jobs.donePages(job.drawing.id));
      await rows((jobs) => jobs.setPages(job, probed.pages.length, done.size));
      const leftOut = new Map<number, RenderRefusal>();
      for (const page of probed.pages) {
        if (done.has(page.pageNumber)) continue;
        const refusal = await renderPage(file, probed, page, done.size + leftOut.size + 1);
        if (refusal) leftOut.set(page.pageNumber, refusal);
        else done.add(page.pageNumber);
      }
      return summary(probed.pages.length, leftOut);
    });
  }

  /** The tiles of many pages could take the room that the database needs. */
  async function refuseFullDisk(): Promise<void> {
    const free = await deps.storage.freeBytes();
    if (free < deps.config.minFreeBytes)
      throw new Error(`only ${free} bytes are free; MIN_FREE_BYTES asks for more`);
  }

  /** Null when the page is a sheet now; otherwise why it cannot be one. */
  async function renderPage(
    file: string,
    { kind }: ProbeResult,
    page: ProbedPage,
    pagesDone: number,
  ): Promise<RenderRefusal | null> {
    if (page.refusal) return new RenderRefusal(page.refusal.code, page.refusal.message);
    await refuseFullDisk();
    const { pageNumber } = page;
    const outFolder = path.join(folder, String(pageNumber));
    // Under a name of its own, because browsers keep tiles for ever.
    const rendition = job.askedDpi === null ? BASE : `${BASE}-${job.askedDpi}`;
    const own = { id: sheetIdOf(job.drawing.id, pageNumber), pageNumber, rendition };
    const firstViews: Promise<void>[] = [];
    try {
      const dpi = job.askedDpi === null ? {} : { dpi: job.askedDpi };
      const order = { file, kind, pageNumber, outFolder, ...dpi };
      const onProgress = everyWhile(PROGRESS_MS, (share) => rows((jobs) => jobs.setProgress(job, share)));
      const onFirstView = (view: FirstView) => void firstViews.push(showFirstView(own, view));
      const drawn = await renderer.renderSheet(order, { signal, onProgress, onFirstView });
      await Promise.all(firstViews);
      await deps.storage.putTree(tilePrefix(own.id, rendition), outFolder);
      const sheet = { ...own, ...drawn, isDrawn: drawn.isDrawn ?? false, readyZoom: null };
      const isOurs = await rows((jobs) => jobs.addSheet(job, sheet, pagesDone));
      if (!isOurs) throw new LostLease('the job has been taken over');
      return null;
    } catch (error) {
      await Promise.all(firstViews);
      if (!(error instanceof RenderRefusal)) throw error;
      const isGone = await rows((jobs) => jobs.withdraw(own.id, error.message));
      if (isGone) await deps.storage.deletePrefix(tilePrefix(own.id, rendition));
      return error;
    }
  }

  /** A courtesy while the whole is drawn: that it failed is no reason to stop. */
  async function showFirstView(own: SheetPlace, { folder: from, ...view }: FirstView): Promise<void> {
    try {
      await deps.storage.putTree(tilePrefix(own.id, own.rendition), from);
      const sheet = { ...own, ...view, isDrawn: view.isDrawn ?? false };
      await rows((jobs) => jobs.addFirstView(job, sheet));
    } catch (error) {
      deps.logger.warn({ err: error, drawingId: job.drawing.id }, 'the first view of a sheet was not shown');
    }
  }

  return {
    renderPages,
    async end(): Promise<void> {
      clearInterval(heartbeat);
      await rm(folder, { recursive: true, force: true });
    },
  };
}

/** @throws RenderRefusal when no page could be drawn */
function summary(pageCount: number, leftOut: Map<number, RenderRefusal>): string {
  const [first] = leftOut;
  if (!first) return '';
  const [firstPage, reason] = first;
  if (leftOut.size === pageCount) throw reason;
  if (leftOut.size === 1) return `Page ${firstPage} of ${pageCount} was left out. ${reason.message}`;
  const pages = [...leftOut.keys()].join(', ');
  return `Pages ${pages} of ${pageCount} were left out. Page ${firstPage}: ${reason.message}`;
}

/** Calls `act` at most once in `everyMs`; what it does is a courtesy, and its failure is no reason to stop. */
function everyWhile(everyMs: number, act: (share: number) => Promise<void>): (share: number) => void {
  let last = 0;
  return (share) => {
    if (Date.now() - last < everyMs) return;
    last = Date.now();
    act(share).catch(() => undefined);
  };
}
