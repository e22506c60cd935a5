import { type EntityManager, In } from 'typeorm';
import { DocumentEntityRow } from '#server/entities/net-entity.ts';
import {
  FLOW_NET_FORMAT,
  FLOW_NET_VERSION,
  type FlowNetDocument,
  type UnitSystem,
} from '#shared/contract/document.ts';
import type { NetPlace } from './net-place.ts';

/** What a document says besides its entities. */
export interface DocumentFrame {
  id: string;
  name: string;
  unitSystem: UnitSystem;
  datum: string;
  sheet: { widthPx: number; heightPx: number; dpi: number | null };
}

export function documentFrameOf({ net, sheet, dam }: NetPlace): DocumentFrame {
  const { widthPx, heightPx, dpi } = sheet;
  return {
    id: net.id,
    name: net.name,
    unitSystem: net.unitSystem,
    datum: dam.datum,
    sheet: { widthPx, heightPx, dpi },
  };
}

/** The document made of its rows; removed ones are left out. */
export function assembleDocument(frame: DocumentFrame, rows: DocumentEntityRow[]): FlowNetDocument {
  const held = rows.filter((row) => !row.removed);
  return {
    format: FLOW_NET_FORMAT,
    version: FLOW_NET_VERSION,
    ...frame,
    entities: Object.fromEntries(
      held.map((row) => [row.entityId, { id: row.entityId, version: row.version, value: row.value }]),
    ),
  };
}

/**
 * The net's document as it stands: its own entities and those of its section. The change number of a `place` read
 * before is at most that of the document, so that catching up from it misses nothing.
 */
export async function readDocument(manager: EntityManager, place: NetPlace): Promise<FlowNetDocument> {
  const rows = await manager.findBy(DocumentEntityRow, {
    ownerId: In([place.net.id, place.section.id]),
    removed: false,
  });
  return assembleDocument(documentFrameOf(place), rows);
}
