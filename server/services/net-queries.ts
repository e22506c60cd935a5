import type { EntityManager } from 'typeorm';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import type { DamScope } from '#server/http/route-record.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { netActionsFor } from './net-actions.ts';
import { readDocument } from './net-document.ts';
import { drawersOfNet } from './net-drawers.ts';
import { placeOfNet } from './net-place.ts';
import { netSummaryOf } from './net-summaries.ts';
import { shownPictures } from './rendition-queries.ts';
import { sectionById } from './section-queries.ts';
import { presentSheet } from './sheet-presenter.ts';

/** All the desk needs to open a net. @throws AppError not-found */
export async function netDetail(
  manager: EntityManager,
  netId: string,
  scope: DamScope,
): Promise<NetDetailDto> {
  const place = await placeOfNet(manager, netId);
  const { net, sheet, drawing, dam } = place;
  const section = await sectionById(manager, place.section.id);
  return {
    net: await netSummaryOf(manager, netId),
    section,
    sheet: presentSheet(sheet, (await shownPictures(manager, [sheet.id])).get(sheet.id)),
    drawing: { id: drawing.id, number: drawing.number, title: drawing.title, revision: drawing.revision },
    dam: { id: dam.id, name: dam.name, datum: dam.datum, fullSupplyLevel: dam.fullSupplyLevel },
    document: await readDocument(manager, place),
    changeNumber: Number(net.changeNumber),
    drawnBy: await drawersOfNet(manager, netId),
    updatedAt: net.updatedAt.toISOString(),
    revisionCount: await manager.countBy(RevisionEntity, { netId }),
    can: netActionsFor(place, scope),
  };
}
