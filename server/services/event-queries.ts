import type { EntityManager } from 'typeorm';
import type { EventDto } from '#shared/contract/dams.ts';
import type { EventFilter } from '#shared/contract/events.ts';
import { PAGE_SIZE } from '#shared/contract/limits.ts';
import { fromCursor, type Position, positionTime, toCursor } from './cursor.ts';
import { eventCondition } from './event-filter.ts';

interface EventRow {
  id: string;
  type: string;
  text: string;
  person_id: string | null;
  person_name: string | null;
  drawing_id: string | null;
  net_id: string | null;
  at: Date;
  position: string;
}

/** Rows read at once. An afternoon at one net writes hundreds, which are shown as one line. */
const READ_AT_ONCE = 500;

async function readBefore(
  manager: EntityManager,
  damId: string | null,
  before: Position | null,
  filter: EventFilter,
): Promise<EventRow[]> {
  const values: unknown[] = [damId, before?.at ?? null, before?.id ?? null];
  const wanted = eventCondition(filter, values);
  return manager.query(
    `SELECT e.id, e.type, e.text, e.person_id, p.name AS person_name, e.drawing_id, e.net_id, e.at,
        ${positionTime('e.at')} AS position
      FROM event e LEFT JOIN person p ON p.id = e.person_id
      WHERE ${damId === null ? '$1::uuid IS NULL AND e.dam_id IS NULL' : 'e.dam_id = $1'} AND ($2::timestamptz IS NULL OR (e.at, e.id) < ($2::timestamptz, $3::uuid))
        AND ${wanted}
      ORDER BY e.at DESC, e.id DESC LIMIT ${READ_AT_ONCE}`,
    values,
  );
}

/** The same person going on with the same net: the newest line stands for the run. */
const goesOn = (newer: EventRow, older: EventRow) =>
  newer.net_id !== null &&
  newer.net_id === older.net_id &&
  newer.person_id === older.person_id &&
  newer.type === older.type;

const toDto = (row: EventRow): EventDto => ({
  id: row.id,
  type: row.type,
  text: row.text,
  person: row.person_id && row.person_name !== null ? { id: row.person_id, name: row.person_name } : null,
  drawingId: row.drawing_id,
  netId: row.net_id,
  at: row.at.toISOString(),
});

/** What happened on a dam, or with `null` apart from every dam, newest first, runs of the same work as one line. */
export async function listEvents(
  manager: EntityManager,
  damId: string | null,
  cursor: string | undefined,
  filter: EventFilter = {},
): Promise<{ items: EventDto[]; nextCursor: string | null }> {
  const rows = await readBefore(manager, damId, cursor ? fromCursor(cursor) : null, filter);
  const items: EventDto[] = [];
  let last: EventRow | null = null;
  for (const row of rows) {
    const starts = last === null || !goesOn(last, row);
    if (starts && items.length === PAGE_SIZE) break;
    if (starts) items.push(toDto(row));
    last = row;
  }
  const isEnd = rows.length < READ_AT_ONCE && last === (rows.at(-1) ?? null);
  return { items, nextCursor: isEnd || !last ? null : toCursor({ at: last.position, id: last.id }) };
}
