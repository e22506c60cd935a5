import type { EntityManager } from 'typeorm';
import type { Actor } from '#server/http/route-record.ts';
import type { RegisterKind, RegisterRow, RegisterState } from '#shared/contract/register.ts';
import { foundNotes } from './register-found.ts';
import { isUnreadBy } from './unread-notes.ts';

interface EntryRow {
  id: string;
  kind: RegisterKind;
  dam_id: string;
  dam_name: string;
  drawing_id: string;
  number: string;
  revision: string;
  title: string;
  file_name: string;
  section_id: string | null;
  section_name: string | null;
  chainage: string | null;
  net_name: string | null;
  sheet_id: string | null;
  page_number: number | null;
  picture_id: string | null;
  states: RegisterState[];
  label: string | null;
  made_by: string;
  maker: string;
  at: Date;
  is_archived: boolean;
}

const ENTRIES = `
  SELECT e.id, e.kind, e.dam_id, d.name AS dam_name, e.drawing_id, w.number, w.revision, w.title, w.file_name,
    e.section_id, c.name AS section_name, c.chainage, n.name AS net_name, e.sheet_id, s.page_number,
    t.id AS picture_id, e.states, r.label, e.made_by, p.name AS maker, e.at,
    e.archived OR d.archived_at IS NOT NULL AS is_archived
  FROM unnest($1::uuid[]) WITH ORDINALITY asked (id, place)
  JOIN register_entry e ON e.id = asked.id
  JOIN dam d ON d.id = e.dam_id
  JOIN drawing w ON w.id = e.drawing_id
  JOIN person p ON p.id = e.made_by
  LEFT JOIN section c ON c.id = e.section_id
  LEFT JOIN net n ON n.id = e.id
  LEFT JOIN sheet s ON s.id = e.sheet_id
  LEFT JOIN rendition t ON t.sheet_id = e.sheet_id AND t.shown
  LEFT JOIN LATERAL (SELECT v.label FROM revision v WHERE v.net_id = n.id ORDER BY v.number DESC LIMIT 1) r ON true
  ORDER BY asked.place`;

/** Rows of the register by their ids, in the order asked for. Whoever asks has made sure that the reader may see them. */
export async function presentRegister(
  manager: EntityManager,
  ids: readonly string[],
  actor: Actor,
  search: string,
): Promise<RegisterRow[]> {
  if (ids.length === 0) return [];
  const [rows, notes, found] = await Promise.all([
    manager.query<EntryRow[]>(ENTRIES, [ids]),
    noteCounts(manager, ids, actor),
    foundNotes(manager, ids, search, actor.id),
  ]);
  return rows.map((row) => ({
    ...toRow(row),
    openNotes: notes.get(row.id)?.open ?? 0,
    unreadNotes: notes.get(row.id)?.unread ?? 0,
    found: found.get(row.id) ?? null,
  }));
}

function toRow(row: EntryRow): Omit<RegisterRow, 'openNotes' | 'unreadNotes' | 'found'> {
  const { section_id: sectionId, sheet_id: sheetId } = row;
  return {
    kind: row.kind,
    id: row.id,
    damId: row.dam_id,
    damName: row.dam_name,
    drawing: {
      id: row.drawing_id,
      number: row.number,
      revision: row.revision,
      title: row.title,
      fileName: row.file_name,
    },
    section: sectionId ? { id: sectionId, name: row.section_name ?? '', chainage: row.chainage ?? '' } : null,
    net: row.net_name,
    sheet: sheetId ? { id: sheetId, pageNumber: row.page_number ?? 1, pictureId: row.picture_id } : null,
    states: row.states,
    revisionLabel: row.label,
    madeBy: { id: row.made_by, name: row.maker },
    at: row.at.toISOString(),
    isArchived: row.is_archived,
  };
}

/** Notes of nets in use, counted for each net, its section and its drawing. */
async function noteCounts(
  manager: EntityManager,
  ids: readonly string[],
  actor: Actor,
): Promise<Map<string, { open: number; unread: number }>> {
  const rows: Array<{ id: string; open: number; unread: number }> = await manager.query(
    `WITH asked AS (SELECT unnest($2::uuid[]) AS id),
      nets AS (
        SELECT n.id, n.section_id, n.drawing_id FROM register_entry n
        WHERE n.kind = 'net' AND n.drawing_id IN (SELECT e.drawing_id FROM register_entry e JOIN asked USING (id))
          AND (NOT n.archived OR n.id IN (SELECT id FROM asked))
      ),
      counted AS (
        SELECT n.id, n.section_id, n.drawing_id, count(*) FILTER (WHERE o.state <> 'closed') AS open,
          count(*) FILTER (WHERE ${isUnreadBy('$1')} AND EXISTS (
            SELECT 1 FROM membership m JOIN register_entry e ON e.dam_id = m.dam_id
            WHERE m.person_id = $1 AND e.id = n.id)) AS unread
        FROM nets n JOIN note o ON o.net_id = n.id GROUP BY n.id, n.section_id, n.drawing_id
      )
      SELECT a.id, sum(c.open)::int AS open, sum(c.unread)::int AS unread
      FROM asked a JOIN counted c ON a.id IN (c.id, c.section_id, c.drawing_id) GROUP BY a.id`,
    [actor.id, ids],
  );
  return new Map(rows.map(({ id, open, unread }) => [id, { open, unread }]));
}
