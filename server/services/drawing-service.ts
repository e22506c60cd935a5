import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { DrawingEntity, RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { originalKey } from '#server/storage/storage-keys.ts';
import type { DrawingDto, drawingPatch } from '#shared/contract/drawings.ts';
import { getDrawing } from './drawing-queries.ts';
import { drawingTitle } from './drawing-title.ts';
import { writeEvent } from './event-writer.ts';
import { createRenderJobService } from './render-job-service.ts';
import type { ServiceDeps } from './service-deps.ts';

/** A file that has arrived whole and whose kind is known. */
export interface ArrivedFile {
  path: string;
  fileName: string;
  mediaType: string;
  byteSize: number;
  sha256: string;
}

/** Drawings: taken in, described, put away and brought back. Runs in a transaction of the caller. */
export function createDrawingService({ manager, storage, clock, live, jobs }: ServiceDeps) {
  async function findLocked(drawingId: string): Promise<DrawingEntity> {
    const drawing = await manager.findOne(DrawingEntity, {
      where: { id: drawingId },
      lock: { mode: 'pessimistic_write' },
    });
    if (!drawing) throw notFound();
    return drawing;
  }

  async function announce(
    { id: drawingId, damId }: { id: string; damId: string },
    actor: Actor,
    type: string,
    text: string,
  ): Promise<void> {
    await writeEvent(manager, { damId, drawingId, personId: actor.id, type, text });
    await live.publish(manager, { type: 'drawing', damId, drawingId });
  }

  /** Locks the dam, so that the same file arriving twice at once is seen the second time. */
  async function lockDam(damId: string): Promise<void> {
    const dam = await manager.findOne(DamEntity, {
      where: { id: damId },
      lock: { mode: 'pessimistic_write' },
    });
    if (!dam) throw notFound();
    if (dam.archivedAt) throw damPutAway();
  }

  async function refuseSameFile(damId: string, sha256: string): Promise<void> {
    const same = await manager.findOne(DrawingEntity, { where: { damId, sha256 }, order: { id: 'ASC' } });
    if (!same) return;
    const where = same.archivedAt ? ', which has been put away' : '';
    throw conflict(
      'already-uploaded',
      'This file is here already',
      `The same file is kept on this dam as ${drawingTitle(same)}${where}. Open that drawing, or keep this one as well.`,
      { drawingId: same.id },
    );
  }

  async function setArchived(drawingId: string, archivedAt: Date | null, actor: Actor): Promise<DrawingDto> {
    const drawing = await findLocked(drawingId);
    if ((drawing.archivedAt === null) !== (archivedAt === null)) {
      await manager.update(DrawingEntity, { id: drawingId }, { archivedAt });
      await (archivedAt
        ? announce(drawing, actor, 'drawing.archived', `put ${drawingTitle(drawing)} away`)
        : announce(drawing, actor, 'drawing.restored', `brought ${drawingTitle(drawing)} back`));
    }
    return getDrawing(manager, drawingId, actor.id);
  }

  return {
    /**
     * Keeps the original, enters the drawing and asks for its sheets.
     * @throws AppError already-uploaded unless `again`
     */
    async takeIn(damId: string, file: ArrivedFile, again: boolean, actor: Actor): Promise<DrawingDto> {
      await lockDam(damId);
      if (!again) await refuseSameFile(damId, file.sha256);
      await storage.putFile(originalKey(file.sha256), file.path);
      const { fileName, mediaType, sha256 } = file;
      const drawing = { id: uuidv7(), damId, fileName, mediaType, sha256 };
      await manager.insert(DrawingEntity, {
        ...drawing,
        byteSize: String(file.byteSize),
        uploadedBy: actor.id,
        uploadedAt: clock.now(),
      });
      const jobId = uuidv7();
      await manager.insert(RenderJobEntity, { id: jobId, drawingId: drawing.id, createdAt: clock.now() });
      await jobs.enqueue(manager, 'render-drawing', jobId);
      await announce(drawing, actor, 'drawing.uploaded', `uploaded ${fileName}`);
      return getDrawing(manager, drawing.id, actor.id);
    },

    async change(drawingId: string, patch: z.output<typeof drawingPatch>, actor: Actor): Promise<DrawingDto> {
      const drawing = await findLocked(drawingId);
      if (drawing.archivedAt) throw drawingPutAway();
      if (Object.keys(patch).length > 0) {
        await manager.update(DrawingEntity, { id: drawingId }, patch);
        const title = drawingTitle({ ...drawing, ...patch });
        await announce(drawing, actor, 'drawing.changed', `changed the particulars of ${title}`);
      }
      return getDrawing(manager, drawingId, actor.id);
    },

    /**
     * Asks once more for the sheets that a drawing lacks: of a file that was refused, could not be prepared, or of
     * which pages were left out. Sheets there are stay as they are.
     * @throws AppError conflict while the drawing is put away, is being prepared or lacks nothing
     */
    async prepareAgain(drawingId: string, actor: Actor): Promise<DrawingDto> {
      const drawing = await findLocked(drawingId);
      if (drawing.archivedAt) throw drawingPutAway();
      const jobId = await createRenderJobService({ manager, clock, live, jobs }).startAgain(drawingId);
      if (!jobId) throw nothingToPrepare();
      await announce(
        drawing,
        actor,
        'drawing.again',
        `asked for ${drawingTitle(drawing)} to be prepared again`,
      );
      return getDrawing(manager, drawingId, actor.id);
    },

    archive: (drawingId: string, actor: Actor) => setArchived(drawingId, clock.now(), actor),
    restore: (drawingId: string, actor: Actor) => setArchived(drawingId, null, actor),
  };
}

const damPutAway = () =>
  conflict('conflict', 'This dam is put away', 'Bring the dam back before you upload a drawing to it.');

const drawingPutAway = () =>
  conflict(
    'conflict',
    'This drawing is put away',
    'Bring the drawing back before you change anything in it.',
  );

const nothingToPrepare = () =>
  conflict(
    'conflict',
    'There is nothing to prepare again',
    'The drawing is being prepared, or all its pages are here already. Wait until it is ready, then look at it again.',
  );
