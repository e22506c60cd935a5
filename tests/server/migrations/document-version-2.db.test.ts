import type { DataSource, MigrationInterface } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { DocumentVersion21796126400013 } from '#server/migrations/1796126400013-document-version-2.ts';
import { flowNetDocument } from '#shared/contract/document.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';
import { firstDocument } from '#tests/support/first-version/first-version.ts';
import { cloneDatabase, type TestDatabase, withDataSource } from '#tests/support/test-database.ts';

let database: TestDatabase;
beforeAll(async () => {
  database = await cloneDatabase();
  await withDataSource(database.ownerUrl, dropReferences);
});
afterAll(() => database.drop());

type Value = { kind: string };
type First = { entities: Record<string, { value: Value }> };

/** Whom and what the rows belong to is of no account here. */
async function dropReferences(db: DataSource): Promise<void> {
  const references: Array<{ conname: string }> = await db.query(
    "SELECT conname FROM pg_constraint WHERE conrelid = 'document_entity'::regclass AND contype = 'f'",
  );
  for (const { conname } of references)
    await db.query(`ALTER TABLE document_entity DROP CONSTRAINT "${conname}"`);
}

/** Rows as the first version wrote them. */
async function insertRows(db: DataSource, values: ReadonlyArray<readonly [id: string, value: Value]>) {
  const owner = uuidv7();
  for (const [id, value] of values) {
    await db.query(
      `INSERT INTO document_entity (owner_id, entity_id, net_id, kind, version, value, changed_by)
       VALUES ($1, $2, $1, $3, 1, $4, $5)`,
      [owner, id, value.kind, value, uuidv7()],
    );
  }
}

async function valuesIn(db: DataSource): Promise<Record<string, Value>> {
  const rows: Array<{ entity_id: string; value: Value }> = await db.query(
    'SELECT entity_id, value FROM document_entity',
  );
  return Object.fromEntries(rows.map((row) => [row.entity_id, row.value]));
}

async function run(db: DataSource, way: keyof Pick<MigrationInterface, 'up' | 'down'>) {
  const runner = db.createQueryRunner();
  await new DocumentVersion21796126400013()[way](runner);
  await runner.release();
}

it('rows of version 1 become what the document of version 2 says of them, and are again what they were', async () => {
  const first = firstDocument() as First;
  const before = Object.fromEntries(Object.entries(first.entities).map(([id, { value }]) => [id, value]));
  const brought = flowNetDocument.parse(upgradeDocument(first));
  await withDataSource(database.ownerUrl, async (db) => {
    await insertRows(db, Object.entries(before));
    await run(db, 'up');
    const after = await valuesIn(db);
    expect(new Set(Object.values(after).map(({ kind }) => kind)).size).toBe(7);
    for (const [id, { value }] of Object.entries(brought.entities)) expect(after[id]).toEqual(value);
    await run(db, 'down');
    expect(await valuesIn(db)).toEqual(before);
  });
});

it('a field that is filled in already is not emptied, and kinds that version 1 lacks leave with it', async () => {
  await withDataSource(database.ownerUrl, async (db) => {
    await db.query('DELETE FROM document_entity');
    const [line, profile] = [uuidv7(), uuidv7()];
    await insertRows(db, [
      [line, { kind: 'line', origin: 'guessed' } as Value],
      [profile, { kind: 'profile' }],
    ]);
    await run(db, 'up');
    expect((await valuesIn(db))[line]).toEqual({ kind: 'line', origin: 'guessed' });
    await run(db, 'down');
    expect(await valuesIn(db)).toEqual({ [line]: { kind: 'line' } });
  });
});
