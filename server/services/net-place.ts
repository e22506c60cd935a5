import type { EntityManager } from 'typeorm';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { DrawingEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { NetEntity, SectionEntity } from '#server/entities/net-entity.ts';
import { AppError, notFound } from '#server/errors/app-error.ts';

export interface SheetPlace {
  sheet: SheetEntity;
  drawing: DrawingEntity;
  dam: DamEntity;
}
export interface SectionPlace extends SheetPlace {
  section: SectionEntity;
}
export interface NetPlace extends SectionPlace {
  net: NetEntity;
}

/** A sheet with everything above it. @throws AppError not-found */
export async function placeOfSheet(manager: EntityManager, sheetId: string): Promise<SheetPlace> {
  const sheet = await manager.findOneBy(SheetEntity, { id: sheetId });
  if (!sheet) throw notFound();
  const drawing = await manager.findOneByOrFail(DrawingEntity, { id: sheet.drawingId });
  const dam = await manager.findOneByOrFail(DamEntity, { id: drawing.damId });
  return { sheet, drawing, dam };
}

/** A section with everything above it. @throws AppError not-found */
export async function placeOfSection(manager: EntityManager, sectionId: string): Promise<SectionPlace> {
  const section = await manager.findOneBy(SectionEntity, { id: sectionId });
  if (!section) throw notFound();
  return { section, ...(await placeOfSheet(manager, section.sheetId)) };
}

/** A net with everything above it. @throws AppError not-found */
export async function placeOfNet(manager: EntityManager, netId: string): Promise<NetPlace> {
  const net = await manager.findOneBy(NetEntity, { id: netId });
  if (!net) throw notFound();
  return { net, ...(await placeOfSection(manager, net.sectionId)) };
}

/**
 * What says that something is put away, naming the outermost thing that has to be brought back first; null when
 * nothing is. What is put away is kept as it is, and so is everything in it.
 */
export function putAwayRefusal(
  place: SheetPlace & Partial<NetPlace>,
  status: 409 | 422 = 409,
): AppError | null {
  const away = (
    [
      ['dam', place.dam],
      ['drawing', place.drawing],
      ['section', place.section],
      ['net', place.net],
    ] as const
  ).find(([, thing]) => thing?.archivedAt);
  if (!away) return null;
  return new AppError(
    'conflict',
    status,
    'This has been put away',
    `The ${away[0]} has been put away. Bring it back before you change anything in it.`,
  );
}

/**
 * Refuses changes of what is put away. Commands say so with 422, since their 409 carries a result.
 * @throws AppError conflict
 */
export function refusePutAway(place: SheetPlace & Partial<NetPlace>, status: 409 | 422 = 409): void {
  const refusal = putAwayRefusal(place, status);
  if (refusal) throw refusal;
}
