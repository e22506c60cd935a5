import type { Guides } from '#client/features/desk/model/guides.ts';
import { matched, type SheetMatch } from '#shared/compute/carry-across/match-sheets.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';

/** The lines of a net as they would lie on the sheet carried to. */
export function carriedGuides(document: FlowNetDocument, match: SheetMatch): Guides {
  const lines = entitiesOf(document, 'line').map(({ id, value }) => ({
    id,
    tone: value.line === 'flowLine' ? ('computedFlowLine' as const) : ('computedEquipotential' as const),
    points: value.points.map((point) => matched(match, point[0], point[1])),
  }));
  return { areas: [], marks: [], lines };
}
