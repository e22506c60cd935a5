import type { DataSource } from 'typeorm';
import { readConfig } from '#server/config/config.ts';
import { createDataSource } from '#server/entities/data-source.ts';

/** Runs `use` with a connection of the database's owner, for scripts that change the schema. */
export async function withOwner<T>(use: (db: DataSource) => Promise<T>): Promise<T> {
  const { databaseUrl } = readConfig(process.env);
  if (!databaseUrl) throw new Error('DATABASE_URL must name the database with its owner.');
  const db = await createDataSource({ url: databaseUrl, poolSize: 2 }).initialize();
  try {
    return await use(db);
  } finally {
    await db.destroy();
  }
}
