import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cloneDatabase, type TestDatabase, withDataSource } from '#tests/support/test-database.ts';

/** What a schema is, as far as it can be compared: columns, constraints, indexes, triggers and functions. */
const SCHEMA_FACTS = `
  SELECT 'column' AS kind, concat_ws(' ', table_name, column_name, data_type, is_nullable, column_default) AS fact
    FROM information_schema.columns WHERE table_schema = 'public'
  UNION ALL SELECT 'constraint', conname || ' ' || pg_get_constraintdef(oid)
    FROM pg_constraint WHERE connamespace = 'public'::regnamespace
  UNION ALL SELECT 'index', indexdef FROM pg_indexes WHERE schemaname = 'public'
  UNION ALL SELECT 'trigger', pg_get_triggerdef(oid) FROM pg_trigger WHERE NOT tgisinternal
  UNION ALL SELECT 'function', proname FROM pg_proc WHERE pronamespace = 'public'::regnamespace
  ORDER BY kind, fact`;

const factsOf = async (db: DataSource): Promise<string[]> => {
  const rows: Array<{ kind: string; fact: string }> = await db.query(SCHEMA_FACTS);
  return rows.map((row) => `${row.kind}: ${row.fact}`).filter((fact) => !/\b(pk_)?migration\b/.test(fact));
};

let empty: TestDatabase;
let migrated: TestDatabase;

beforeAll(async () => {
  empty = await cloneDatabase({ empty: true });
  migrated = await cloneDatabase();
});

afterAll(async () => {
  await empty.drop();
  await migrated.drop();
});

describe('the migrations', () => {
  it('leave nothing behind when all are undone, and the same schema when run again', async () => {
    await withDataSource(empty.ownerUrl, async (db) => {
      await db.runMigrations({ transaction: 'each' });
      const first = await factsOf(db);
      expect(first.length).toBeGreaterThan(50);
      for (const _each of db.migrations) await db.undoLastMigration({ transaction: 'each' });
      expect(await factsOf(db)).toEqual([]);
      await db.runMigrations({ transaction: 'each' });
      expect(await factsOf(db)).toEqual(first);
    });
  });

  it('give the schema that the entities describe', async () => {
    await withDataSource(migrated.ownerUrl, async (db) => {
      const drift = await db.driver.createSchemaBuilder().log();
      expect(drift.upQueries.map((query) => query.query)).toEqual([]);
    });
  });

  it('give every table a primary key', async () => {
    await withDataSource(migrated.ownerUrl, async (db) => {
      const bare = await db.query(`SELECT c.relname FROM pg_class c
        WHERE c.relnamespace = 'public'::regnamespace AND c.relkind = 'r'
          AND NOT EXISTS (SELECT FROM pg_constraint p WHERE p.conrelid = c.oid AND p.contype = 'p')`);
      expect(bare).toEqual([]);
    });
  });
});

describe('the role the server uses', () => {
  const APPEND_ONLY = ['event', 'revision', 'decision', 'review_record', 'artifact'];

  it.each(APPEND_ONLY)('may neither change nor empty the table %s', async (table) => {
    await withDataSource(migrated.appUrl, async (db) => {
      for (const sql of [
        `DELETE FROM ${table}`,
        `TRUNCATE ${table}`,
        `UPDATE ${table} SET id = id`,
        `ALTER TABLE ${table} DISABLE TRIGGER ALL`,
        `DROP TABLE ${table}`,
      ])
        await expect(db.query(sql), sql).rejects.toThrow(/permission denied|must be owner/);
    });
  });

  it('may not switch triggers off for its session', async () => {
    await withDataSource(migrated.appUrl, async (db) => {
      await expect(db.query('SET session_replication_role = replica')).rejects.toThrow(/permission denied/);
    });
  });

  it.each(APPEND_ONLY)('is not alone in that: TRUNCATE of %s is refused to the owner too', async (table) => {
    await withDataSource(migrated.ownerUrl, async (db) => {
      await expect(db.query(`TRUNCATE ${table} CASCADE`)).rejects.toThrow(/append-only/);
    });
  });
});
