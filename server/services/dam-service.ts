import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { NetEntity } from '#server/entities/net-entity.ts';
import { conflict, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { damInput, damPatch } from '#shared/contract/dams.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { writeEvent } from './event-writer.ts';
import type { ServiceDeps } from './service-deps.ts';

/**
 * Unit weights water can have, from warm fresh water to water heavy with silt. A value outside is one of the other
 * system: 62.4 in an SI dam would give pressures six times too high that look like any others.
 */
const WATER: Record<UnitSystem, { from: number; to: number; unit: string }> = {
  SI: { from: 9, to: 12, unit: 'kN/m³' },
  US: { from: 57, to: 76, unit: 'lb/ft³' },
};

function refuseOtherUnits(unitSystem: UnitSystem, gammaW: number): void {
  const { from, to, unit } = WATER[unitSystem];
  if (gammaW >= from && gammaW <= to) return;
  const message = `the unit weight of water lies between ${from} and ${to} ${unit} in this unit system`;
  throw invalidInput([{ path: 'gammaW', message }]);
}

/** Dams: made, described, put away and brought back. Runs in a transaction of the caller. */
export function createDamService({ manager, clock, live }: ServiceDeps) {
  async function findLocked(damId: string): Promise<DamEntity> {
    const dam = await manager.findOne(DamEntity, {
      where: { id: damId },
      lock: { mode: 'pessimistic_write' },
    });
    if (!dam) throw notFound();
    return dam;
  }

  async function announce(damId: string, actor: Actor, type: string, text: string): Promise<void> {
    await writeEvent(manager, { damId, personId: actor.id, type, text });
    await live.publish(manager, { type: 'dam', damId });
  }

  /** Values are kept as they were entered, so another unit system would turn metres into feet unseen. */
  async function refuseUnitChange(damId: string): Promise<void> {
    const nets = await manager
      .createQueryBuilder(NetEntity, 'net')
      .innerJoin('section', 'section', 'section.id = net.section_id')
      .innerJoin('sheet', 'sheet', 'sheet.id = section.sheet_id')
      .innerJoin('drawing', 'drawing', 'drawing.id = sheet.drawing_id')
      .where('drawing.dam_id = :damId', { damId })
      .getCount();
    if (nets === 0) return;
    throw conflict(
      'conflict',
      'The units are in use',
      'Flow nets of this dam hold values in its unit system, so it cannot be changed any more.',
    );
  }

  async function setArchived(damId: string, archivedAt: Date | null, actor: Actor): Promise<void> {
    const dam = await findLocked(damId);
    if ((dam.archivedAt === null) === (archivedAt === null)) return;
    await manager.update(DamEntity, { id: damId }, { archivedAt });
    await (archivedAt
      ? announce(damId, actor, 'dam.archived', 'put the dam away')
      : announce(damId, actor, 'dam.restored', 'brought the dam back'));
  }

  return {
    async create(input: z.output<typeof damInput>, actor: Actor): Promise<string> {
      refuseOtherUnits(input.unitSystem, input.gammaW);
      const id = uuidv7();
      await manager.insert(DamEntity, { id, ...input, createdBy: actor.id, createdAt: clock.now() });
      await announce(id, actor, 'dam.created', 'entered the dam');
      return id;
    },

    async change(damId: string, patch: z.output<typeof damPatch>, actor: Actor): Promise<void> {
      const dam = await findLocked(damId);
      if (dam.archivedAt)
        throw conflict(
          'conflict',
          'This dam is put away',
          'Bring the dam back before you change anything on it.',
        );
      if (Object.keys(patch).length === 0) return;
      const next = { ...dam, ...patch };
      if (next.unitSystem !== dam.unitSystem) await refuseUnitChange(damId);
      refuseOtherUnits(next.unitSystem, next.gammaW);
      await manager.update(DamEntity, { id: damId }, patch);
      await announce(damId, actor, 'dam.changed', 'changed the facts of the dam');
    },

    archive: (damId: string, actor: Actor) => setArchived(damId, clock.now(), actor),
    restore: (damId: string, actor: Actor) => setArchived(damId, null, actor),
  };
}
