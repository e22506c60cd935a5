import { randomBytes } from 'node:crypto';
import pg from 'pg';
import type { DataSource } from 'typeorm';
import { inject } from 'vitest';
import { createDataSource } from '#server/entities/data-source.ts';

export interface TestDatabase {
  /** Address for the owner, who may change the schema. */
  ownerUrl: string;
  /** Address for the role the server uses. */
  appUrl: string;
  drop(): Promise<void>;
}

/**
 * An empty, migrated database of its own. Only in test files that get a cluster: those below `tests/api` and
 * `tests/contract`, in `tests/e2e`, or named `*.db.test.ts`. With `empty` not even the migrations have run.
 */
export async function cloneDatabase({ empty = false } = {}): Promise<TestDatabase> {
  const { superuserUrl, ownerUrl, appUrl } = inject('cluster');
  const name = `test_${randomBytes(6).toString('hex')}`;
  const template = empty ? 'template0' : 'tracehead';
  await asSuperuser(superuserUrl, `CREATE DATABASE ${name} TEMPLATE ${template} OWNER tracehead_owner`);
  return {
    ownerUrl: inDatabase(ownerUrl, name),
    appUrl: inDatabase(appUrl, name),
    drop: () => asSuperuser(superuserUrl, `DROP DATABASE ${name} WITH (FORCE)`),
  };
}

function inDatabase(url: string, name: string): string {
  const inOther = new URL(url);
  inOther.pathname = `/${name}`;
  return inOther.href;
}

async function asSuperuser(url: string, sql: string): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

/** Connects, runs `use`, and disconnects, whatever happens. */
export async function withDataSource<T>(url: string, use: (db: DataSource) => Promise<T>): Promise<T> {
  const db = await createDataSource({ url, poolSize: 2 }).initialize();
  try {
    return await use(db);
  } finally {
    await db.destroy();
  }
}
