import { IsNull, Not } from 'typeorm';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { SectionEntity } from '#server/entities/net-entity.ts';
import { drawingTitle } from './drawing-title.ts';
import { writeEvent } from './event-writer.ts';
import type { ServiceDeps } from './service-deps.ts';

/** How long a run is believed alive without a sign of life. */
export const LEASE_MS = 30_000;
/** Runs after which a fault of the server itself is no longer waited out. */
export const MOST_ATTEMPTS = 3;

const ONLY_SMALL = 'Only a small picture of this page could be made.';

/** A job this run holds. */
export interface HeldJob {
  jobId: string;
  runId: string;
  attempts: number;
  drawing: DrawingEntity;
  /** Dots per inch for pages of vectors; null = the usual. */
  askedDpi: number | null;
}

type NewSheet = Omit<SheetEntity, 'createdAt' | 'drawingId'>;

/** The rows of rendering, which are the truth about it. Runs in a transaction of the caller. */
export function createRenderJobService({
  manager,
  clock,
  live,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs'>) {
  const leaseUntil = () => new Date(clock.now().getTime() + LEASE_MS);

  const announce = ({ drawing: { id: drawingId, damId } }: HeldJob) =>
    live.publish(manager, { type: 'drawing', damId, drawingId });

  const tell = ({ drawing }: HeldJob, type: string, text: string) =>
    writeEvent(manager, { damId: drawing.damId, drawingId: drawing.id, personId: null, type, text });

  /** Changes the row as long as this run holds it. */
  async function update({ jobId, runId }: HeldJob, change: Partial<RenderJobEntity>): Promise<boolean> {
    const { affected } = await manager.update(
      RenderJobEntity,
      { id: jobId, runId, state: 'running' },
      change,
    );
    return affected === 1;
  }

  async function end(
    job: HeldJob,
    state: 'done' | 'refused' | 'failed',
    message: string,
    [type, text]: [string, string],
  ): Promise<void> {
    const ended = { state, message, runId: null, leaseUntil: null, pageProgress: 0, finishedAt: clock.now() };
    if (!(await update(job, ended))) return;
    await tell(job, type, text);
    await announce(job);
  }

  const giveUp = (job: HeldJob) =>
    end(
      job,
      'failed',
      'The server could not prepare this drawing. The file is kept; tell the administrator, who finds the reason in the log.',
      ['drawing.failed', `${drawingTitle(job.drawing)} could not be prepared`],
    );

  async function queueAnew(jobId: string, askedDpi: number | null): Promise<void> {
    const anew = { ...waiting, attempts: 0, message: '', finishedAt: null, askedDpi };
    await manager.update(RenderJobEntity, { id: jobId }, anew);
    await jobs.enqueue(manager, 'render-drawing', jobId);
  }

  /** What a run before this one has entered of the same page is replaced. */
  async function enter(job: HeldJob, sheet: NewSheet): Promise<void> {
    const row = { ...sheet, drawingId: job.drawing.id };
    const { affected } = await manager.update(SheetEntity, { id: sheet.id }, row);
    if (affected === 0) await manager.insert(SheetEntity, { ...row, createdAt: clock.now() });
    await announce(job);
  }

  return {
    /** Takes the job when it waits or when the run that held it shows no sign of life; null when there is nothing to do. */
    async claim(jobId: string, runId: string): Promise<HeldJob | null> {
      const row = await manager.findOne(RenderJobEntity, {
        where: { id: jobId },
        lock: { mode: 'pessimistic_write' },
      });
      const isDead = row?.state === 'running' && (row.leaseUntil?.getTime() ?? 0) < clock.now().getTime();
      if (!row || (row.state !== 'waiting' && !isDead)) return null;
      const attempts = row.attempts + 1;
      const held = { state: 'running', runId, attempts, leaseUntil: leaseUntil(), message: '' } as const;
      await manager.update(RenderJobEntity, { id: jobId }, held);
      const drawing = await manager.findOneByOrFail(DrawingEntity, { id: row.drawingId });
      const job = { jobId, runId, attempts, drawing, askedDpi: row.askedDpi };
      // A file that ends the whole server each time must not do so for ever.
      if (attempts > MOST_ATTEMPTS) {
        await giveUp(job);
        return null;
      }
      await announce(job);
      return job;
    },

    /** Says that the run lives. False when another one has taken the job. */
    keepAlive: (job: HeldJob) => update(job, { leaseUntil: leaseUntil() }),

    async setPages(job: HeldJob, pagesTotal: number, pagesDone: number): Promise<void> {
      if (await update(job, { pagesTotal, pagesDone, pageProgress: 0 })) await announce(job);
    },

    async setProgress(job: HeldJob, pageProgress: number): Promise<void> {
      if (await update(job, { pageProgress })) await announce(job);
    },

    async donePages(drawingId: string): Promise<Set<number>> {
      const sheets = await manager.find(SheetEntity, {
        select: { pageNumber: true },
        where: { drawingId, readyZoom: IsNull() },
      });
      return new Set(sheets.map((sheet) => sheet.pageNumber));
    },

    /** Enters a finished sheet; the tiles are in place. False when another run has taken the job. */
    async addSheet(job: HeldJob, sheet: NewSheet, pagesDone: number): Promise<boolean> {
      if (!(await update(job, { pagesDone, pageProgress: 0, leaseUntil: leaseUntil() }))) return false;
      await enter(job, sheet);
      return true;
    },

    /** Enters a sheet of which only the coarse levels are in place. */
    async addFirstView(job: HeldJob, sheet: NewSheet): Promise<void> {
      if (await update(job, { leaseUntil: leaseUntil() })) await enter(job, sheet);
    },

    /**
     * Takes a sheet back that was shown by its first view and turned out to be damaged. One that somebody works on
     * already stays, and says what it is. True when its tiles can go.
     */
    async withdraw(sheetId: string, reason: string): Promise<boolean> {
      const unfinished = { id: sheetId, readyZoom: Not(IsNull()) };
      if (!(await manager.existsBy(SheetEntity, unfinished))) return false;
      const isUsed = await manager.existsBy(SectionEntity, { sheetId });
      if (isUsed) await manager.update(SheetEntity, unfinished, { note: `${ONLY_SMALL} ${reason}` });
      else await manager.delete(SheetEntity, unfinished);
      return !isUsed;
    },

    /** `message` names pages that were left out; empty otherwise. */
    finish: (job: HeldJob, message: string) =>
      end(job, 'done', message, ['drawing.ready', `${drawingTitle(job.drawing)} is ready to work on`]),

    refuse: (job: HeldJob, message: string) =>
      end(job, 'refused', message, ['drawing.refused', `${drawingTitle(job.drawing)} could not be shown`]),

    /** A fault of the server, not of the file: waited out a few times, then given up. */
    async fail(job: HeldJob): Promise<void> {
      if (job.attempts >= MOST_ATTEMPTS) return giveUp(job);
      if (!(await update(job, waiting))) return;
      await jobs.enqueue(manager, 'render-drawing', job.jobId, 5 * 4 ** (job.attempts - 1));
      await announce(job);
    },

    /** Queues a job that has ended without all its pages; null when there is no such job. */
    async startAgain(drawingId: string): Promise<string | null> {
      const row = await manager.findOne(RenderJobEntity, {
        where: { drawingId },
        lock: { mode: 'pessimistic_write' },
      });
      const hasEnded = row !== null && row.state !== 'waiting' && row.state !== 'running';
      // What was left out is told by the message of a job that is done.
      if (!hasEnded || row.message === '') return null;
      await queueAnew(row.id, null);
      return row.id;
    },

    /** Queues a job that has ended, for pages of vectors at a chosen resolution. False while it has not ended. */
    async startAtDpi(drawingId: string, askedDpi: number): Promise<boolean> {
      const row = await manager.findOne(RenderJobEntity, {
        where: { drawingId },
        lock: { mode: 'pessimistic_write' },
      });
      if (row === null || row.state === 'waiting' || row.state === 'running') return false;
      await queueAnew(row.id, askedDpi);
      return true;
    },

    /** Gives the job back unharmed, because the server stops; the attempt does not count. */
    async release(job: HeldJob): Promise<void> {
      if (await update(job, { ...waiting, attempts: job.attempts - 1 })) await announce(job);
    },
  };
}

const waiting = { state: 'waiting', runId: null, leaseUntil: null, pageProgress: 0 } as const;

/**
 * Queues every job that waits, and those a run holds whose end nobody will see; at the start of the server. A run
 * of another living server keeps its lease, and the queued job then finds nothing to do.
 */
export async function requeueRenderJobs({
  manager,
  clock,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'jobs'>): Promise<void> {
  const open: RenderJobEntity[] = await manager.find(RenderJobEntity, {
    where: [{ state: 'waiting' }, { state: 'running' }],
    order: { createdAt: 'ASC' },
  });
  for (const job of open) {
    const left = job.state === 'running' ? (job.leaseUntil?.getTime() ?? 0) - clock.now().getTime() : 0;
    await jobs.enqueue(manager, 'render-drawing', job.id, Math.max(0, Math.ceil(left / 1000)));
  }
}
