import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DocumentEntityRow, NetEntity } from '#server/entities/net-entity.ts';
import type { Clock } from '#server/http/clock.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { LivePort } from '#server/live/live-port.ts';
import type { netInput, netPatch } from '#shared/contract/nets.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { writeEvent } from './event-writer.ts';
import { withIds } from './net-file-ops.ts';
import { lockNetsOfSection, lockSection, lockSectionOfNet } from './net-locks.ts';
import { type NetPlace, placeOfNet, placeOfSection, refusePutAway } from './net-place.ts';
import { firstNetEntities, newEntityRows } from './net-singles.ts';
import { refuseTakenId } from './new-id.ts';

/** A statement takes 65,535 values at most, and a row has thirteen. */
const ROWS_AT_ONCE = 1000;

export interface NetServiceDeps {
  manager: EntityManager;
  clock: Clock;
  live: LivePort;
}

/** Nets of a section: made, copied, renamed, put away and brought back. Runs in a transaction of the caller. */
export function createNetService({ manager, clock, live }: NetServiceDeps) {
  async function announce(
    place: Omit<NetPlace, 'net'>,
    netId: string,
    actor: Actor,
    type: string,
    text: string,
  ): Promise<void> {
    const damId = place.dam.id;
    const drawingId = place.drawing.id;
    await writeEvent(manager, { damId, drawingId, netId, personId: actor.id, type, text });
    await live.publish(manager, { type: 'drawing', damId, drawingId });
  }

  /** A new net starts at the newest change of its section, so that no later number is below it. */
  async function startNumber(sectionId: string): Promise<number> {
    const nets = await lockNetsOfSection(manager, sectionId);
    return Math.max(0, ...nets.map((net) => net.changeNumber));
  }

  async function insertNet(net: Partial<NetEntity>, rows: DocumentEntityRow[]): Promise<void> {
    await manager.insert(NetEntity, net);
    await insertRows(manager, rows);
  }

  async function setArchived(netId: string, archivedAt: Date | null, actor: Actor): Promise<void> {
    const place = await placeOfNet(manager, netId);
    if ((place.net.archivedAt === null) === (archivedAt === null)) return;
    await manager.update(NetEntity, { id: netId }, { archivedAt });
    const named = `the net "${place.net.name}" of ${sectionTitle(place.section.name)}`;
    await (archivedAt
      ? announce(place, netId, actor, 'net.archived', `put ${named} away`)
      : announce(place, netId, actor, 'net.restored', `brought ${named} back`));
  }

  return {
    /** Makes an empty net in the dam's units. */
    async create(sectionId: string, input: z.output<typeof netInput>, actor: Actor): Promise<void> {
      await lockSection(manager, sectionId);
      const place = await placeOfSection(manager, sectionId);
      refusePutAway(place);
      await refuseTakenId(manager, NetEntity, input.id, 'net');
      const changeNumber = await startNumber(sectionId);
      const at = clock.now();
      const { unitSystem, gammaW } = place.dam;
      const rows = newEntityRows({ netId: input.id }, firstNetEntities(unitSystem, gammaW), {
        personId: actor.id,
        changeNumber,
        at,
      });
      await insertNet({ ...input, sectionId, unitSystem, ...startOf(changeNumber, actor, at) }, rows);
      const text = `started the net "${input.name}" on ${sectionTitle(place.section.name)}`;
      await announce(place, input.id, actor, 'net.created', text);
    },

    /**
     * Copies a net for another load case: its own entities under new ids, the section shared. Each entity keeps who
     * changed it last, and the copy its source, so that whoever drew the source drew the copy.
     */
    async copy(netId: string, input: z.output<typeof netInput>, actor: Actor): Promise<void> {
      await lockSectionOfNet(manager, netId);
      const place = await placeOfNet(manager, netId);
      refusePutAway(place);
      await refuseTakenId(manager, NetEntity, input.id, 'net');
      const changeNumber = await startNumber(place.section.id);
      const at = clock.now();
      const sources = await manager.find(DocumentEntityRow, {
        where: { netId, removed: false },
        // Ids sort by making: the copies are made in the order of their originals.
        order: { entityId: 'ASC' },
      });
      const ids = new Map(sources.map((row) => [row.entityId, uuidv7()]));
      const rows = sources.map((row) => ({
        ...copyOfRow(row, input.id, changeNumber, at),
        entityId: ids.get(row.entityId)!,
        value: withIds(row.value, ids),
      }));
      const { unitSystem } = place.net;
      await insertNet(
        {
          ...input,
          sectionId: place.section.id,
          unitSystem,
          copiedFrom: netId,
          ...startOf(changeNumber, actor, at),
        },
        rows,
      );
      const text = `copied the net "${place.net.name}" of ${sectionTitle(place.section.name)} to "${input.name}"`;
      await announce(place, input.id, actor, 'net.copied', text);
    },

    async rename(netId: string, patch: z.output<typeof netPatch>, actor: Actor): Promise<void> {
      const place = await placeOfNet(manager, netId);
      refusePutAway(place);
      if (patch.name === place.net.name) return;
      await manager.update(NetEntity, { id: netId }, { name: patch.name });
      const text = `renamed the net "${place.net.name}" of ${sectionTitle(place.section.name)} to "${patch.name}"`;
      await announce(place, netId, actor, 'net.renamed', text);
    },

    archive: (netId: string, actor: Actor) => setArchived(netId, clock.now(), actor),
    restore: (netId: string, actor: Actor) => setArchived(netId, null, actor),
  };
}

/** Inserts rows of a document, as many at once as a statement takes. */
export async function insertRows(manager: EntityManager, rows: DocumentEntityRow[]): Promise<void> {
  for (let first = 0; first < rows.length; first += ROWS_AT_ONCE) {
    const some = rows.slice(first, first + ROWS_AT_ONCE);
    await manager.insert(DocumentEntityRow, some as QueryDeepPartialEntity<DocumentEntityRow>[]);
  }
}

const startOf = (changeNumber: number, actor: Actor, at: Date) => ({
  changeNumber: String(changeNumber),
  createdBy: actor.id,
  createdAt: at,
  updatedAt: at,
});

function copyOfRow(row: DocumentEntityRow, netId: string, changeNumber: number, at: Date): DocumentEntityRow {
  return {
    ...row,
    ownerId: netId,
    netId,
    version: 1,
    changeNumber: String(changeNumber),
    clientId: null,
    changedAt: at,
  };
}
