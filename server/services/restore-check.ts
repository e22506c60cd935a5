import type { DataSource } from 'typeorm';
import * as z from 'zod/mini';
import type { RevisionEntity } from '#server/entities/ledger-entity.ts';
import type { ReviewRecordEntity } from '#server/entities/review-entity.ts';
import { type ArchivedPerson, archivedPerson } from '#shared/contract/archives.ts';
import { FLOW_NET_VERSION } from '#shared/contract/document.ts';
import { type ArchiveFile, refusedArchive, verifyEntries } from './archive-file.ts';
import { fileEntry, PEOPLE_ENTRY, tableEntry } from './archive-service.ts';
import { ARCHIVED_TABLES, type ArchivedRow, type ArchivedTable } from './archive-tables.ts';
import { openReviewRecords } from './review-records.ts';
import { openPayload } from './revision-payload.ts';

/**
 * Everything that can be wrong with an archive, looked for before anything is written: hashes, tables and columns that
 * this installation does not know, rows of another dam, files that are not there, and the chain of the ledger.
 * @throws AppError refused-file that names the entry
 */
export async function checkArchive(db: DataSource, archive: ArchiveFile): Promise<ArchivedPerson[]> {
  const { documentVersion } = archive.manifest;
  if (documentVersion !== FLOW_NET_VERSION)
    throw refusedArchive(
      'manifest.json',
      `The nets in it have version ${documentVersion}, this installation works with version ${FLOW_NET_VERSION}. Restore it with a release of that version and upgrade.`,
    );
  await verifyEntries(archive);
  await refuseUnknownTables(archive);
  const columns = await columnsOf(db);
  for (const table of ARCHIVED_TABLES) await checkTable(archive, table, columns.get(table.name) ?? new Set());
  await checkLedger(archive);
  return peopleOf(archive);
}

async function refuseUnknownTables({ manifest }: ArchiveFile): Promise<void> {
  const known = new Set([PEOPLE_ENTRY, ...ARCHIVED_TABLES.map(({ name }) => tableEntry(name))]);
  const unknown = manifest.entries.find(({ name }) => !name.startsWith('files/') && !known.has(name));
  if (unknown)
    throw refusedArchive(unknown.name, 'It is of a later release, which keeps more than this one.');
}

async function columnsOf(db: DataSource): Promise<Map<string, Set<string>>> {
  const rows: Array<{ table_name: string; column_name: string }> = await db.query(
    `SELECT table_name, column_name FROM information_schema.columns WHERE table_schema = 'public'`,
  );
  const columns = new Map<string, Set<string>>();
  for (const { table_name, column_name } of rows)
    columns.set(table_name, (columns.get(table_name) ?? new Set()).add(column_name));
  return columns;
}

async function checkTable(archive: ArchiveFile, table: ArchivedTable, columns: Set<string>): Promise<void> {
  const entry = tableEntry(table.name);
  let rows = 0;
  for await (const row of rowsOf(archive, table.name)) {
    rows += 1;
    const unknown = Object.keys(row).find((column) => !columns.has(column));
    if (unknown)
      throw refusedArchive(entry, `It is of a later release: "${unknown}" is not known to this one.`);
    const key = table.fileOf?.(row) ?? null;
    if (key !== null && !archive.has(fileEntry(key)))
      throw refusedArchive(fileEntry(key), `The file is missing, and a row of ${entry} refers to it.`);
    const damId = table.name === 'dam' ? row.id : row.dam_id;
    if (damId !== undefined && damId !== archive.manifest.dam.id)
      throw refusedArchive(entry, 'A row of it is of another dam.');
  }
  if (table.name === 'dam' && rows !== 1) throw refusedArchive(entry, 'It must hold one dam.');
}

/** Every revision against its hash, its row and the revision before it in the same net. */
async function checkLedger(archive: ArchiveFile): Promise<void> {
  const newest = new Map<string, string>();
  const revisions = new Map<string, RevisionEntity>();
  for await (const json of rowsOf(archive, 'revision')) {
    const row = asEntity(json) as unknown as RevisionEntity;
    try {
      openPayload(row, newest.get(row.netId) ?? null);
    } catch {
      throw refusedArchive(
        tableEntry('revision'),
        `Revision ${row.label} is not as it was frozen, or does not follow the one before it.`,
      );
    }
    newest.set(row.netId, row.payloadHash);
    revisions.set(row.id, row);
  }
  await checkReviewRecords(archive, revisions);
}

/** The records of every revision against their hashes and the ones before them. */
async function checkReviewRecords(
  archive: ArchiveFile,
  revisions: ReadonlyMap<string, RevisionEntity>,
): Promise<void> {
  const chains = new Map<string, ReviewRecordEntity[]>();
  for await (const json of rowsOf(archive, 'review_record')) {
    const row = asEntity(json) as unknown as ReviewRecordEntity;
    chains.set(row.revisionId, [...(chains.get(row.revisionId) ?? []), row]);
  }
  for (const [revisionId, rows] of chains) {
    const revision = revisions.get(revisionId);
    try {
      if (revision === undefined) throw new Error('its revision is missing');
      openReviewRecords(rows, revision);
    } catch {
      throw refusedArchive(
        tableEntry('review_record'),
        `A record of revision ${revision?.label ?? revisionId} is not as it was made, or does not follow the one before it.`,
      );
    }
  }
}

/** The row with the names of the entity's members and its times as dates. */
function asEntity(row: ArchivedRow): Record<string, unknown> {
  return Object.fromEntries(
    Object.entries(row).map(([column, value]) => {
      const member = column.replaceAll(/_([a-z])/g, (_, letter: string) => letter.toUpperCase());
      return [
        member,
        (column === 'at' || column.endsWith('_at')) && typeof value === 'string' ? new Date(value) : value,
      ];
    }),
  );
}

async function peopleOf(archive: ArchiveFile): Promise<ArchivedPerson[]> {
  const people: ArchivedPerson[] = [];
  for await (const line of archive.lines(PEOPLE_ENTRY)) {
    const parsed = z.safeParse(archivedPerson, parsedLine(PEOPLE_ENTRY, line));
    if (!parsed.success) throw refusedArchive(PEOPLE_ENTRY, 'A line of it names nobody.');
    people.push(parsed.data);
  }
  return people;
}

/** The rows of a table as they were archived. */
export async function* rowsOf(archive: ArchiveFile, table: string): AsyncGenerator<ArchivedRow> {
  const entry = tableEntry(table);
  for await (const line of archive.lines(entry)) {
    const row = parsedLine(entry, line);
    if (typeof row !== 'object' || row === null) throw refusedArchive(entry, 'A line of it is no row.');
    yield row as ArchivedRow;
  }
}

function parsedLine(entry: string, line: string): unknown {
  try {
    return JSON.parse(line);
  } catch {
    throw refusedArchive(entry, 'A line of it is no JSON.');
  }
}
