import type { EntityManager } from 'typeorm';
import type { Actor } from '#server/http/route-record.ts';
import { PAGE_SIZE } from '#shared/contract/limits.ts';
import { MAX_COUNTED, type RegisterPage, type RegisterQuery } from '#shared/contract/register.ts';
import { fromRegisterCursor, SORT_ORDERS, toRegisterCursor } from './register-cursor.ts';
import { presentRegister } from './register-rows.ts';

/** Dams the reader may see: in use, and put away. The same rule as `dam.read` in the policy. */
interface SeenDams {
  inUse: string[];
  putAway: string[];
}

async function seenDams(manager: EntityManager, actor: Actor, damId: string | undefined): Promise<SeenDams> {
  const rows: Array<{ id: string; away: boolean }> = await manager.query(
    `SELECT d.id, d.archived_at IS NOT NULL AS away
      FROM dam d LEFT JOIN membership m ON m.dam_id = d.id AND m.person_id = $1
      WHERE (m.person_id IS NOT NULL OR $2::boolean) AND ($3::uuid IS NULL OR d.id = $3)`,
    [actor.id, actor.admin, damId ?? null],
  );
  const idsOf = (away: boolean) => rows.filter((row) => row.away === away).map(({ id }) => id);
  return { inUse: idsOf(false), putAway: idsOf(true) };
}

/** A condition in SQL and the values of its parameters, in their order. */
interface Condition {
  sql: string;
  values: unknown[];
}

/** What the reader asks for among what they may see. */
function conditionOf(query: RegisterQuery, seen: SeenDams, actor: Actor): Condition {
  const values: unknown[] = [];
  const value = (each: unknown) => `$${values.push(each)}`;
  const isInUse = `e.dam_id = ANY (${value(seen.inUse)}::uuid[])`;
  const parts = [
    query.archived === 'yes'
      ? `((${isInUse} AND e.archived) OR e.dam_id = ANY (${value(seen.putAway)}::uuid[]))`
      : `${isInUse} AND NOT e.archived`,
  ];
  if (query.kind) parts.push(`e.kind = ${value(query.kind)}`);
  if (query.state) parts.push(`e.states @> ARRAY[${value(query.state)}]`);
  if (query.whose)
    parts.push(`e.people @> ARRAY[${value(query.whose === 'me' ? actor.id : query.whose)}::uuid]`);
  if (query.q) parts.push(`e.words @@ search_query(${value(query.q)})`);
  return { sql: parts.join(' AND '), values };
}

/**
 * A page of the drawings, sections and nets that the reader may see and asks for. Questions that do not wait for one
 * another are asked at once, so that a page takes three turns to the database; `manager` is therefore no transaction's.
 */
export async function listRegister(
  manager: EntityManager,
  actor: Actor,
  query: RegisterQuery,
): Promise<RegisterPage> {
  const condition = conditionOf(query, await seenDams(manager, actor, query.dam), actor);
  const [rows, total] = await Promise.all([
    rowsAfter(manager, condition, query),
    query.cursor === undefined ? countOf(manager, condition) : null,
  ]);
  const shown = rows.slice(0, PAGE_SIZE);
  const last = rows.length > PAGE_SIZE ? shown.at(-1) : undefined;
  const ids = shown.map(({ id }) => id);
  return {
    items: await presentRegister(manager, ids, actor, query.q ?? ''),
    nextCursor: last ? toRegisterCursor(sortOf(query), last.position) : null,
    total,
  };
}

const sortOf = ({ sort = 'number' }: RegisterQuery) => sort;

/** Ids in the order asked for, one more than a page holds, each with the position a page could end at. */
function rowsAfter(
  manager: EntityManager,
  condition: Condition,
  query: RegisterQuery,
): Promise<Array<{ id: string; position: string[] }>> {
  const { columns, written, casts, direction } = SORT_ORDERS[sortOf(query)];
  const position = query.cursor === undefined ? [] : fromRegisterCursor(sortOf(query), query.cursor);
  const places = position.map((_, n) => `$${condition.values.length + n + 1}::${casts[n]}`);
  const isAfter = `(${columns.join(', ')}) ${direction === 'ASC' ? '>' : '<'} (${places.join(', ')})`;
  return manager.query(
    `SELECT e.id, ARRAY[${written.join(', ')}] AS position FROM register_entry e
      WHERE ${condition.sql} ${position.length > 0 ? `AND ${isAfter}` : ''}
      ORDER BY ${columns.map((column) => `${column} ${direction}`).join(', ')} LIMIT ${PAGE_SIZE + 1}`,
    [...condition.values, ...position],
  );
}

/** Counts no further than is told, so that a count of everything costs no more than a page. */
async function countOf(manager: EntityManager, { sql, values }: Condition): Promise<number> {
  const [{ count }] = await manager.query(
    `SELECT count(*)::int FROM (SELECT 1 FROM register_entry e WHERE ${sql} LIMIT ${MAX_COUNTED + 1}) counted`,
    values,
  );
  return count;
}
