import type { EntityManager } from 'typeorm';
import { notFound } from '#server/errors/app-error.ts';
import type { NetSummary } from '#shared/contract/drawings.ts';
import type { RevisionState } from '#shared/contract/revisions.ts';
import type { UnitSystem } from '#shared/contract/unit-system.ts';
import { canBeRead } from './schedule-queries.ts';
import { isUnreadBy } from './unread-notes.ts';

interface SummaryRow {
  id: string;
  section_id: string;
  name: string;
  change_number: string;
  unit_system: UnitSystem;
  datum: string;
  archived_at: Date | null;
  drops: number | null;
  open_notes: number;
  unread_notes: number;
  label: string | null;
  reviewer_id: string | null;
  reviewer_name: string | null;
  revision_state: RevisionState | null;
  changed_since: boolean | null;
}

/** The newest revision says where a net stands; everything before it is history. $1 = reader, null for nobody. */
const SUMMARIES = `
  SELECT n.id, n.section_id, n.name, n.archived_at, n.change_number, n.unit_system, m.datum,
    (SELECT (e.value->>'drops')::float8 FROM document_entity e
      WHERE e.owner_id = n.id AND e.kind = 'netCount' AND NOT e.removed
        -- A count is a figure too, which who may still read blind counts for themselves.
        AND figures_kept_back(r.id, $1::uuid) IS NOT TRUE) AS drops,
    (SELECT count(*)::int FROM note o WHERE o.net_id = n.id AND o.state <> 'closed') AS open_notes,
    (SELECT count(*)::int FROM note o WHERE o.net_id = n.id AND ${isUnreadBy('$1')}
      AND EXISTS (SELECT 1 FROM membership b WHERE b.dam_id = m.id AND b.person_id = $1::uuid)) AS unread_notes,
    r.label, r.reviewer_id, p.name AS reviewer_name, n.change_number > r.change_number AS changed_since,
    revision_state(r.id) AS revision_state
  FROM net n
  JOIN section c ON c.id = n.section_id
  JOIN sheet s ON s.id = c.sheet_id
  JOIN drawing w ON w.id = s.drawing_id
  JOIN dam m ON m.id = w.dam_id
  LEFT JOIN LATERAL (SELECT v.id, v.label, v.reviewer_id, v.change_number FROM revision v
    WHERE v.net_id = n.id ORDER BY v.number DESC LIMIT 1) r ON true
  LEFT JOIN person p ON p.id = r.reviewer_id`;

/** Where its newest revision leaves a net: after an acceptance was withdrawn it is to be sent again, as a returned one. */
const STATE_OF: Record<RevisionState, NetSummary['state']> = {
  waiting: 'sent',
  accepted: 'accepted',
  acceptedWithNotes: 'accepted',
  returned: 'returned',
  acceptanceWithdrawn: 'returned',
  withdrawn: 'draft',
};

async function toSummary(manager: EntityManager, row: SummaryRow): Promise<NetSummary> {
  const { reviewer_id: id, reviewer_name: name } = row;
  return {
    id: row.id,
    name: row.name,
    drops: await countOf(manager, row),
    openNotes: row.open_notes,
    ...(row.unread_notes > 0 ? { unreadNotes: row.unread_notes } : {}),
    state: row.revision_state === null ? 'draft' : STATE_OF[row.revision_state],
    revisionLabel: row.label,
    changedSinceRevision: row.changed_since ?? false,
    reviewer: id && name !== null ? { id, name } : null,
    archivedAt: row.archived_at?.toISOString() ?? null,
  };
}

/** The drops stated, once the lines bear them out; until then the net is not traced, whatever was counted. */
async function countOf(manager: EntityManager, row: SummaryRow): Promise<number | null> {
  const { id, name, datum, change_number: changeNumber, unit_system: unitSystem } = row;
  if (row.drops === null) return null;
  const stands = await canBeRead(manager, { id, changeNumber, name, unitSystem, datum });
  return stands ? row.drops : null;
}

/** The nets of each section, in order of making, with what is new in them to the reader. */
export async function netSummariesBySection(
  manager: EntityManager,
  sectionIds: readonly string[],
  readerId: string | null,
): Promise<Map<string, NetSummary[]>> {
  const rows: SummaryRow[] = await manager.query(
    `${SUMMARIES} WHERE n.section_id = ANY($2::uuid[]) ORDER BY n.id`,
    [readerId, sectionIds],
  );
  const bySection = new Map<string, NetSummary[]>(sectionIds.map((id) => [id, []]));
  const summaries = await Promise.all(rows.map((row) => toSummary(manager, row)));
  summaries.forEach((summary, i) => {
    bySection.get(rows[i]!.section_id)?.push(summary);
  });
  return bySection;
}

/** One net as lists show it. @throws AppError not-found */
export async function netSummaryOf(manager: EntityManager, netId: string): Promise<NetSummary> {
  const rows: SummaryRow[] = await manager.query(`${SUMMARIES} WHERE n.id = $2`, [null, netId]);
  const row = rows[0];
  if (!row) throw notFound();
  return toSummary(manager, row);
}
