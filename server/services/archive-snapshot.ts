import { Readable } from 'node:stream';
import type { DataSource, QueryRunner } from 'typeorm';
import type { ArchivedPerson } from '#shared/contract/archives.ts';
import { ARCHIVED_TABLES, type ArchivedRow, type ArchivedTable } from './archive-tables.ts';

/** Few enough that revisions of some megabytes each stay small in memory. */
const ROWS_AT_ONCE = 32;

/** A dam as it is at one moment, whatever is written meanwhile. */
export interface DamSnapshot {
  /** The rows of a table, a line of JSON each, read as they are wanted. One table at a time. */
  linesOf(table: ArchivedTable): Readable;
  /** Keys of all files that rows refer to, each once. */
  fileKeys(): Promise<string[]>;
  /** Everybody whom a row names. */
  people(): Promise<ArchivedPerson[]>;
  close(): Promise<void>;
}

/** Opens a snapshot of a dam in a transaction of its own, which ends with `close`. */
export async function openSnapshot(db: DataSource, damId: string): Promise<DamSnapshot> {
  const runner = db.createQueryRunner();
  await runner.connect();
  await runner.startTransaction('REPEATABLE READ');
  return {
    linesOf: (table) => Readable.from(lines(runner, table, damId)),
    fileKeys: () => fileKeys(runner, damId),
    people: () => people(runner, damId),
    async close() {
      if (runner.isReleased) return;
      // Nothing was written: it only has to end.
      await runner.rollbackTransaction().catch(() => undefined);
      await runner.release();
    },
  };
}

const selectRows = ({ name, where, order }: ArchivedTable) =>
  `SELECT row_to_json(t)::text AS line FROM ${name} t WHERE ${where} ORDER BY ${order}`;

async function* lines(runner: QueryRunner, table: ArchivedTable, damId: string): AsyncGenerator<string> {
  const cursor = `archive_${table.name}`;
  await runner.query(`DECLARE ${cursor} NO SCROLL CURSOR FOR ${selectRows(table)}`, [damId]);
  for (;;) {
    const rows: Array<{ line: string }> = await runner.query(`FETCH ${ROWS_AT_ONCE} FROM ${cursor}`);
    if (rows.length === 0) break;
    yield rows.map(({ line }) => `${line}\n`).join('');
  }
  await runner.query(`CLOSE ${cursor}`);
}

async function fileKeys(runner: QueryRunner, damId: string): Promise<string[]> {
  const keys = new Set<string>();
  for (const table of ARCHIVED_TABLES) {
    const { fileOf } = table;
    if (!fileOf) continue;
    const rows: Array<{ line: string }> = await runner.query(selectRows(table), [damId]);
    for (const { line } of rows) {
      const key = fileOf(JSON.parse(line) as ArchivedRow);
      if (key !== null) keys.add(key);
    }
  }
  return [...keys].sort();
}

/** Whatever id stands in a column of ids and is somebody's: so no new column that names people can be forgotten. */
async function people(runner: QueryRunner, damId: string): Promise<ArchivedPerson[]> {
  const columns: Array<{ table_name: string; column_name: string; udt_name: string }> = await runner.query(
    `SELECT table_name, column_name, udt_name FROM information_schema.columns
      WHERE table_schema = 'public' AND udt_name IN ('uuid', '_uuid')`,
  );
  const named = ARCHIVED_TABLES.flatMap(({ name, where }) =>
    columns
      .filter(({ table_name }) => table_name === name)
      .map(({ column_name, udt_name }) => {
        const value = udt_name === 'uuid' ? column_name : `unnest(${column_name})`;
        return `SELECT ${value} AS id FROM ${name} WHERE ${where}`;
      }),
  );
  return runner.query(
    `SELECT id, name, email FROM person WHERE id IN (${named.join(' UNION ')}) ORDER BY id`,
    [damId],
  );
}
