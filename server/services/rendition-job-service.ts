import { In } from 'typeorm';
import { RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { placeOfSheet, type SheetPlace } from './net-place.ts';
import { LEASE_MS, MOST_ATTEMPTS } from './render-job-service.ts';
import { showRendition } from './rendition-service.ts';
import type { ServiceDeps } from './service-deps.ts';

/** A rendition that this run makes. */
export interface HeldRendition {
  id: string;
  runId: string;
  attempts: number;
  row: RenditionEntity;
  place: SheetPlace;
}

/** Until the tiles of the sheet itself are looked for again. */
const SHEET_WAIT_S = 10;

type MadeTiles = Pick<RenditionEntity, 'tileSizePx' | 'maxZoom' | 'tileFormat'>;
const waiting = { state: 'waiting', runId: null, leaseUntil: null, progress: 0 } as const;

/** The rows of renditions while they are made. Runs in a transaction of the caller. */
export function createRenditionJobService({
  manager,
  clock,
  live,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs'>) {
  const leaseUntil = () => new Date(clock.now().getTime() + LEASE_MS);

  const announce = ({ place }: HeldRendition) =>
    live.publish(manager, { type: 'drawing', damId: place.dam.id, drawingId: place.drawing.id });

  /** Changes the row as long as this run holds it. */
  async function update({ id, runId }: HeldRendition, change: Partial<RenditionEntity>): Promise<boolean> {
    const held = { id, runId, state: 'running' as const };
    // TypeORM's partial type cannot say the settings' tuples.
    const { affected } = await manager.update(RenditionEntity, held, change as object);
    return affected === 1;
  }

  async function end(held: HeldRendition, state: 'refused' | 'failed', message: string): Promise<void> {
    const ended = { state, message, runId: null, leaseUntil: null, progress: 0, finishedAt: clock.now() };
    if (await update(held, ended)) await announce(held);
  }

  const giveUp = (held: HeldRendition) =>
    end(
      held,
      'failed',
      'The server could not make this picture. Tell the administrator, who finds the reason in the log.',
    );

  /** After a restore the sheet's own tiles, of which the picture is made, may still be under way. */
  const isBeingDrawn = async ({ sheet, drawing }: SheetPlace) =>
    sheet.readyZoom !== null &&
    manager.existsBy(RenderJobEntity, { drawingId: drawing.id, state: In(['waiting', 'running']) });

  return {
    /** Takes the rendition when it waits or when the run that held it shows no sign of life; null when there is nothing to do. */
    async claim(id: string, runId: string): Promise<HeldRendition | null> {
      const row = await manager.findOne(RenditionEntity, {
        where: { id },
        lock: { mode: 'pessimistic_write' },
      });
      const isDead = row?.state === 'running' && (row.leaseUntil?.getTime() ?? 0) < clock.now().getTime();
      if (!row || (row.state !== 'waiting' && !isDead)) return null;
      const place = await placeOfSheet(manager, row.sheetId);
      if (await isBeingDrawn(place)) {
        await jobs.enqueue(manager, 'make-rendition', id, SHEET_WAIT_S);
        return null;
      }
      const attempts = row.attempts + 1;
      const held = { id, runId, attempts, row, place };
      await manager.update(
        RenditionEntity,
        { id },
        { state: 'running', runId, attempts, leaseUntil: leaseUntil() },
      );
      if (attempts > MOST_ATTEMPTS) {
        await giveUp(held);
        return null;
      }
      return held;
    },

    /** Says that the run lives. False when another one has taken the rendition. */
    keepAlive: (held: HeldRendition) => update(held, { leaseUntil: leaseUntil() }),

    async setProgress(held: HeldRendition, progress: number): Promise<void> {
      if (await update(held, { progress })) await announce(held);
    },

    /** Enters the finished picture, by which the sheet is shown from now on; the tiles are in place. */
    async finish(held: HeldRendition, tiles: MadeTiles): Promise<void> {
      const { sheetId } = held.row;
      await manager.findOne(SheetEntity, { where: { id: sheetId }, lock: { mode: 'pessimistic_write' } });
      const done = { ...tiles, state: 'done', progress: 1, runId: null, leaseUntil: null } as const;
      if (!(await update(held, { ...done, finishedAt: clock.now() }))) return;
      // One that had been made before, as in an archive, does not push the shown one aside.
      if (held.row.maxZoom === null) await showRendition(manager, sheetId, held.id);
      await announce(held);
    },

    refuse: (held: HeldRendition, message: string) => end(held, 'refused', message),

    /** A fault of the server, waited out a few times, then given up. */
    async fail(held: HeldRendition): Promise<void> {
      if (held.attempts >= MOST_ATTEMPTS) return giveUp(held);
      if (!(await update(held, waiting))) return;
      await jobs.enqueue(manager, 'make-rendition', held.id, 5 * 4 ** (held.attempts - 1));
    },

    /** Gives it back unharmed, because the server stops; the attempt does not count. */
    async release(held: HeldRendition): Promise<void> {
      await update(held, { ...waiting, attempts: held.attempts - 1 });
    },
  };
}

/** Queues every rendition that is not made; at the start of the server. One that another server makes keeps its lease. */
export async function requeueRenditions({
  manager,
  clock,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'jobs'>): Promise<void> {
  const open: RenditionEntity[] = await manager.find(RenditionEntity, {
    where: [{ state: 'waiting' }, { state: 'running' }],
    order: { madeAt: 'ASC' },
  });
  for (const row of open) {
    const left = row.state === 'running' ? (row.leaseUntil?.getTime() ?? 0) - clock.now().getTime() : 0;
    await jobs.enqueue(manager, 'make-rendition', row.id, Math.max(0, Math.ceil(left / 1000)));
  }
}
