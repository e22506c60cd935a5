import type { EntityManager } from 'typeorm';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { EventFilter } from '#shared/contract/events.ts';
import { BYTE_ORDER_MARK, type CsvCell, csvText } from '#shared/text/csv.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import type { DecimalMark } from '#shared/text/number-text.ts';
import { type Position, positionTime } from './cursor.ts';
import { eventCondition } from './event-filter.ts';

/** Rows read at once, so that the history of decades needs no more memory than that of a day. */
const READ_AT_ONCE = 1000;
const HEAD: CsvCell[] = ['Time (UTC)', 'Person', 'What', 'Kind', 'Drawing', 'Section', 'Net', 'Event id'];

interface EventRow {
  id: string;
  at: Date;
  position: string;
  person: string | null;
  text: string;
  type: string;
  drawing: string | null;
  section: string | null;
  net: string | null;
}

/**
 * What happened on a dam as CSV, oldest first, as far as it is asked for, made while it is sent.
 * @throws AppError not-found
 */
export async function eventsFile(
  manager: EntityManager,
  damId: string,
  filter: EventFilter,
  mark: DecimalMark,
): Promise<{ fileName: string; parts: AsyncGenerator<string> }> {
  const dam = await manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  return {
    fileName: cleanFileName(`${dam.name} activity.csv`),
    parts: csvParts(manager, damId, filter, mark),
  };
}

async function* csvParts(
  manager: EntityManager,
  damId: string,
  filter: EventFilter,
  mark: DecimalMark,
): AsyncGenerator<string> {
  yield BYTE_ORDER_MARK + csvText([HEAD], mark);
  let after: Position | null = null;
  for (;;) {
    const rows: EventRow[] = await readAfter(manager, damId, after, filter);
    const last = rows.at(-1);
    if (!last) return;
    yield csvText(rows.map(cellsOf), mark);
    after = { at: last.position, id: last.id };
  }
}

function readAfter(
  manager: EntityManager,
  damId: string,
  after: Position | null,
  filter: EventFilter,
): Promise<EventRow[]> {
  const values: unknown[] = [damId, after?.at ?? null, after?.id ?? null];
  const wanted = eventCondition(filter, values);
  return manager.query(
    `SELECT e.id, e.at, ${positionTime('e.at')} AS position, p.name AS person, e.text, e.type,
        d.number AS drawing, c.name AS section, n.name AS net
      FROM event e
      LEFT JOIN person p ON p.id = e.person_id
      LEFT JOIN net n ON n.id = e.net_id
      LEFT JOIN section c ON c.id = n.section_id
      LEFT JOIN drawing d ON d.id = e.drawing_id
      WHERE e.dam_id = $1 AND ($2::timestamptz IS NULL OR (e.at, e.id) > ($2::timestamptz, $3::uuid))
        AND ${wanted}
      ORDER BY e.at, e.id LIMIT ${READ_AT_ONCE}`,
    values,
  );
}

const cellsOf = (row: EventRow): CsvCell[] => [
  row.at.toISOString(),
  row.person ?? '',
  row.text,
  row.type,
  row.drawing ?? '',
  row.section ?? '',
  row.net ?? '',
  row.id,
];
