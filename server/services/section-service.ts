import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import type * as z from 'zod/mini';
import { DocumentEntityRow, SectionEntity } from '#server/entities/net-entity.ts';
import { invalidInput } from '#server/errors/app-error.ts';
import type { Clock } from '#server/http/clock.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { LivePort } from '#server/live/live-port.ts';
import type { SectionDto } from '#shared/contract/drawings.ts';
import type { sectionInput, sectionPatch } from '#shared/contract/nets.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { writeEvent } from './event-writer.ts';
import { placeOfSection, placeOfSheet, refusePutAway, type SheetPlace } from './net-place.ts';
import { firstSectionEntities, newEntityRows } from './net-singles.ts';
import { refuseTakenId } from './new-id.ts';
import { sectionById } from './section-queries.ts';

export interface SectionServiceDeps {
  manager: EntityManager;
  clock: Clock;
  live: LivePort;
}

/** Sections of a sheet: made, renamed, put away and brought back. Runs in a transaction of the caller. */
export function createSectionService({ manager, clock, live }: SectionServiceDeps) {
  async function announce(place: SheetPlace, actor: Actor, type: string, text: string): Promise<void> {
    const { id: damId } = place.dam;
    const { id: drawingId } = place.drawing;
    await writeEvent(manager, { damId, drawingId, personId: actor.id, type, text });
    await live.publish(manager, { type: 'drawing', damId, drawingId });
  }

  async function setArchived(sectionId: string, archivedAt: Date | null, actor: Actor): Promise<SectionDto> {
    const place = await placeOfSection(manager, sectionId);
    if ((place.section.archivedAt === null) !== (archivedAt === null)) {
      await manager.update(SectionEntity, { id: sectionId }, { archivedAt });
      const title = sectionTitle(place.section.name);
      await (archivedAt
        ? announce(place, actor, 'section.archived', `put ${title} away`)
        : announce(place, actor, 'section.restored', `brought ${title} back`));
    }
    return sectionById(manager, sectionId);
  }

  return {
    /** Makes a section and the set-out that all its nets will share. */
    async create(sheetId: string, input: z.output<typeof sectionInput>, actor: Actor): Promise<SectionDto> {
      const place = await placeOfSheet(manager, sheetId);
      refusePutAway(place);
      refuseBadFrame(input.frame, place);
      await refuseTakenId(manager, SectionEntity, input.id, 'section');
      const at = clock.now();
      await manager.insert(SectionEntity, { ...input, sheetId, createdBy: actor.id, createdAt: at });
      const making = { personId: actor.id, changeNumber: 0, at };
      const rows = newEntityRows({ sectionId: input.id }, firstSectionEntities(), making);
      await manager.insert(DocumentEntityRow, rows as QueryDeepPartialEntity<DocumentEntityRow>[]);
      await announce(place, actor, 'section.created', `added ${sectionTitle(input.name)}`);
      return sectionById(manager, input.id);
    },

    async change(sectionId: string, patch: z.output<typeof sectionPatch>, actor: Actor): Promise<SectionDto> {
      const place = await placeOfSection(manager, sectionId);
      refusePutAway(place);
      refuseBadFrame(patch.frame ?? null, place);
      if (Object.keys(patch).length > 0) {
        await manager.update(SectionEntity, { id: sectionId }, patch);
        const title = sectionTitle(patch.name ?? place.section.name);
        await announce(place, actor, 'section.changed', `changed the name or frame of ${title}`);
      }
      return sectionById(manager, sectionId);
    },

    archive: (sectionId: string, actor: Actor) => setArchived(sectionId, clock.now(), actor),
    restore: (sectionId: string, actor: Actor) => setArchived(sectionId, null, actor),
  };
}

function refuseBadFrame(frame: SectionDto['frame'], { sheet }: SheetPlace): void {
  if (!frame) return;
  const [left, top, width, height] = frame;
  const isOnSheet = left < sheet.widthPx && top < sheet.heightPx && left + width > 0 && top + height > 0;
  if (width > 0 && height > 0 && isOnSheet) return;
  throw invalidInput([
    { path: 'frame', message: 'The frame has no size or lies off the sheet. Draw it again on the sheet.' },
  ]);
}
