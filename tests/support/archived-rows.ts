import { writeFileSync } from 'node:fs';
import { expect } from 'vitest';
import { ARCHIVED_TABLES } from '#server/services/archive-tables.ts';
import type { Caller } from './caller.ts';
import type { TestApp } from './test-app.ts';

type Table = (typeof ARCHIVED_TABLES)[number];

/** Takes the archive of a dam as a browser does. */
export async function downloadArchive(from: TestApp, caller: Caller, damId: string, file: string) {
  const headers = { cookie: caller.cookieHeader() };
  const answer = await fetch(`${from.address}/api/v1/dams/${damId}/archive.zip`, { headers });
  expect(answer.status).toBe(200);
  writeFileSync(file, Buffer.from(await answer.arrayBuffer()));
}

/** All rows of a dam's table as the database writes them, without what a restore does not keep. */
async function rowsOf(of: TestApp, { name, where, order }: Table, damId: string): Promise<string[]> {
  const rows: Array<{ line: string }> = await of.db.query(
    `SELECT row_to_json(t)::text AS line FROM ${name} t WHERE ${where} ORDER BY ${order}`,
    [damId],
  );
  return rows
    .map(({ line }) => line)
    .filter((line) => name !== 'event' || !line.includes('"dam.restored"'))
    .map((line) => (name === 'sheet' ? line.replace(/"ready_zoom":(0|null)/, '"ready_zoom":…') : line));
}

/** Holds every row of a dam in one installation against those in another; jobs are begun anew. Answers how many there are. */
export async function expectSameRows(before: TestApp, after: TestApp, damId: string): Promise<number> {
  let count = 0;
  for (const table of ARCHIVED_TABLES) {
    if (table.name === 'render_job') continue;
    const rows = await rowsOf(before, table, damId);
    expect(await rowsOf(after, table, damId), table.name).toEqual(rows);
    count += rows.length;
  }
  return count;
}
