import type { EntityManager } from 'typeorm';
import type { RegisterRow } from '#shared/contract/register.ts';
import { foundParts } from '#shared/text/found-text.ts';

/** Entries of one net looked through for the words, newest first: one that is shown is enough. */
const MOST_ENTRIES = 200;

interface FoundRow {
  net_id: string;
  number: number;
  text: string;
}

/**
 * For each of the nets among the ids the note in which the search was found, as far as its names alone are not what was found: an
 * entry with all the words, else the newest one with any of them. Notes tell figures: whoever may still read a net blind
 * is shown none of its notes.
 */
export async function foundNotes(
  manager: EntityManager,
  ids: readonly string[],
  search: string,
  readerId: string,
): Promise<Map<string, NonNullable<RegisterRow['found']>>> {
  if (search === '' || ids.length === 0) return new Map();
  const rows: FoundRow[] = await manager.query(
    `WITH asked AS (
        SELECT search_query($2) AS all_words, replace(search_query($2)::text, ' & ', ' | ')::tsquery AS any_word
      )
      SELECT n.id AS net_id, f.number, f.text
      FROM asked, net n JOIN section c ON c.id = n.section_id JOIN sheet s ON s.id = c.sheet_id
        JOIN drawing w ON w.id = s.drawing_id JOIN dam d ON d.id = w.dam_id
      CROSS JOIN LATERAL (
        SELECT l.number, l.text FROM (
          SELECT o.number, e.text, e.created_at, search_words(e.text) AS words
          FROM note o JOIN note_entry e ON e.note_id = o.id
          WHERE o.net_id = n.id ORDER BY e.created_at DESC LIMIT ${MOST_ENTRIES}
        ) l WHERE l.words @@ any_word ORDER BY l.words @@ all_words DESC, l.created_at DESC LIMIT 1
      ) f
      WHERE n.id = ANY ($1::uuid[]) AND NOT search_words(concat_ws(' ', d.name, w.number, number_in_one(w.number),
        w.revision, w.title, w.drawn_on, w.source, w.file_name, c.name, c.chainage, n.name)) @@ all_words
        AND NOT EXISTS (SELECT 1 FROM revision r WHERE r.net_id = n.id AND figures_kept_back(r.id, $3))`,
    [ids, search, readerId],
  );
  return new Map(
    rows.map(({ net_id, number, text }) => [net_id, { noteNumber: number, parts: foundParts(text, search) }]),
  );
}
