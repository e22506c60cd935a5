import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { conflict, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import { MAX_PIXELS } from '#shared/contract/limits.ts';
import type { RenditionDto, RenditionSettings, renditionInput } from '#shared/contract/renditions.ts';
import { writeEvent } from './event-writer.ts';
import { placeOfSheet, refusePutAway, type SheetPlace } from './net-place.ts';
import { presentRendition } from './rendition-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

/** Cleaned-up pictures of a sheet: asked for, and chosen to be shown by. Runs in a transaction of the caller. */
export function createRenditionService({
  manager,
  clock,
  live,
  jobs,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs'>) {
  async function openPlace(sheetId: string): Promise<SheetPlace> {
    await lockSheet(manager, sheetId);
    const place = await placeOfSheet(manager, sheetId);
    refusePutAway(place);
    return place;
  }

  async function announce(place: SheetPlace, actor: Actor, type: string, text: string): Promise<void> {
    const { id: damId } = place.dam;
    const { id: drawingId } = place.drawing;
    await writeEvent(manager, { damId, drawingId, personId: actor.id, type, text });
    await live.publish(manager, { type: 'drawing', damId, drawingId });
  }

  return {
    /**
     * Asks for a picture, by which the sheet is shown once it is made. Asking again with the same id changes nothing.
     * @throws AppError invalid-input, conflict while the sheet is put away or still being prepared
     */
    async ask(
      sheetId: string,
      { id, settings }: z.output<typeof renditionInput>,
      actor: Actor,
    ): Promise<RenditionDto> {
      const place = await openPlace(sheetId);
      const known = await manager.findOneBy(RenditionEntity, { id });
      if (known) {
        if (known.sheetId !== sheetId) throw notFound();
        return presentRendition(manager, known);
      }
      refuseUnready(place.sheet);
      const geometry = geometryOf(place.sheet, settings);
      const row = {
        id,
        sheetId,
        settings,
        widthPx: geometry.widthPx,
        heightPx: geometry.heightPx,
        toBase: [...geometry.toBase],
        madeBy: actor.id,
        madeAt: clock.now(),
      };
      await manager.insert(RenditionEntity, row);
      await jobs.enqueue(manager, 'make-rendition', id);
      await announce(place, actor, 'rendition.asked', `cleaned up ${sheetName(place)}`);
      return presentRendition(manager, await manager.findOneByOrFail(RenditionEntity, { id }));
    },

    /** Shows the sheet by a finished picture, or as it was scanned. @throws AppError not-found, conflict */
    async show(sheetId: string, renditionId: string | null, actor: Actor): Promise<void> {
      const place = await openPlace(sheetId);
      if (renditionId !== null) {
        const row = await manager.findOneBy(RenditionEntity, { id: renditionId, sheetId });
        if (!row) throw notFound('This sheet has no such picture.');
        if (row.state !== 'done') throw notMade();
        if (row.shown) return;
      }
      await showRendition(manager, sheetId, renditionId);
      await (renditionId === null
        ? announce(place, actor, 'rendition.original', `showed ${sheetName(place)} as it was scanned`)
        : announce(place, actor, 'rendition.shown', `showed ${sheetName(place)} by a cleaned-up picture`));
    },
  };
}

/** One change of what a sheet is shown by at a time. @throws AppError not-found */
async function lockSheet(manager: EntityManager, sheetId: string): Promise<void> {
  const sheet = await manager.findOne(SheetEntity, {
    where: { id: sheetId },
    lock: { mode: 'pessimistic_write' },
  });
  if (!sheet) throw notFound();
}

/** Makes a picture, or none, the one that a sheet is shown by. */
export async function showRendition(
  manager: EntityManager,
  sheetId: string,
  renditionId: string | null,
): Promise<void> {
  await manager.update(RenditionEntity, { sheetId, shown: true }, { shown: false });
  if (renditionId !== null) await manager.update(RenditionEntity, { id: renditionId }, { shown: true });
}

const sheetName = ({ sheet, drawing }: SheetPlace) =>
  `sheet ${sheet.pageNumber} of ${drawing.number || drawing.fileName}`;

function geometryOf(sheet: SheetEntity, settings: RenditionSettings) {
  if (settings.black >= settings.white)
    throw invalidInput([{ path: 'settings.white', message: 'White must be lighter than black.' }]);
  const geometry = renditionGeometry(sheet, settings);
  if (geometry === null) {
    const message =
      'These settings leave no picture. Set the corners in order around the drawing, and a crop within it.';
    throw invalidInput([{ path: 'settings.corners', message }]);
  }
  if (geometry.widthPx * geometry.heightPx > MAX_PIXELS)
    throw invalidInput([{ path: 'settings', message: 'The picture would be too large. Crop it.' }]);
  return geometry;
}

/** While the first view stands in for a sheet its full-size tiles are not there. */
function refuseUnready(sheet: SheetEntity): void {
  if (sheet.readyZoom == null) return;
  throw conflict(
    'conflict',
    'The sheet is being prepared',
    'Wait until the whole sheet is ready, then clean it up.',
  );
}

const notMade = () =>
  conflict('conflict', 'This picture is not made', 'Wait until it is ready, or choose another picture.');
