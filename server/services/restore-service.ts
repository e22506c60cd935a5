import { randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type { AppDeps } from '#server/app-deps.ts';
import { CalculationSheetEntity } from '#server/entities/calculation-sheet-entity.ts';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { conflict } from '#server/errors/app-error.ts';
import type { RestoredDto } from '#shared/contract/archives.ts';
import { type ArchiveFile, openArchiveFile } from './archive-file.ts';
import { tableEntry } from './archive-service.ts';
import { ARCHIVED_TABLES, type ArchivedRow, type ArchivedTable } from './archive-tables.ts';
import { writeEvent } from './event-writer.ts';
import { checkArchive } from './restore-check.ts';
import { type RestoredPeople, refuseOpenOwnWork, restorePeople } from './restore-people.ts';
import { inTransaction, type ServiceDeps } from './service-deps.ts';

const FILES = 'files/';
/** Rows entered by one statement: a revision may have megabytes. */
const ROWS_AT_ONCE = 32;

/**
 * Restores a whole dam from an archive that lies at `file`: everything is checked first, then the files are kept, then all
 * rows are entered in one transaction, with their ids, hashes and figures as they were. Tiles are made again by jobs.
 * `actorId`: who does it; null for the command line.
 * @throws AppError refused-file with the entry's name, already-exists when the dam is there
 */
export async function restoreArchive(
  deps: AppDeps,
  file: string,
  actorId: string | null,
): Promise<RestoredDto> {
  const archive = await openArchiveFile(file);
  try {
    const { dam } = archive.manifest;
    await refuseThere(deps.db.manager, dam.id);
    const archived = await checkArchive(deps.db, archive);
    const files = await keepFiles(deps, archive);
    return await inTransaction(deps, async (tx) => {
      const { manager } = tx;
      await refuseThere(manager, dam.id);
      const people = await restorePeople(manager, archived, tx.clock.now());
      let rows = 0;
      for (const table of ARCHIVED_TABLES) rows += await enterTable(manager, archive, table, people);
      await refuseOpenOwnWork(manager, dam.id, people);
      const drawings = await startAgain(tx, dam.id);
      await writeEvent(manager, {
        damId: dam.id,
        personId: actorId,
        type: 'dam.restored',
        text: `restored the dam from an archive of ${archive.manifest.madeAt.slice(0, 10)}`,
      });
      return { damId: dam.id, name: dam.name, rows, files, drawings, peopleMade: people.made };
    });
  } finally {
    archive.close();
  }
}

async function refuseThere(manager: EntityManager, damId: string): Promise<void> {
  const dam = await manager.findOneBy(DamEntity, { id: damId });
  if (dam)
    throw conflict(
      'already-exists',
      'This dam is here already',
      `The archive is of ${dam.name}, which is in this installation. An archive is restored where its dam is not; nothing was changed.`,
    );
}

/** Puts every file where rows look for it; the same file again is no error, as its name is its hash. */
async function keepFiles({ storage, config }: AppDeps, archive: ArchiveFile): Promise<number> {
  const folder = path.join(config.storageDir, 'incoming');
  await mkdir(folder, { recursive: true });
  const names = archive.manifest.entries.map(({ name }) => name).filter((name) => name.startsWith(FILES));
  for (const name of names) {
    const key = name.slice(FILES.length);
    if ((await storage.stat(key)) !== null) continue;
    const file = path.join(folder, randomUUID());
    try {
      await pipeline(await archive.open(name), createWriteStream(file, { flags: 'wx' }));
      await storage.putFile(key, file);
    } finally {
      await rm(file, { force: true });
    }
  }
  return names.length;
}

async function enterTable(
  manager: EntityManager,
  archive: ArchiveFile,
  table: ArchivedTable,
  people: RestoredPeople,
): Promise<number> {
  let rows = 0;
  let waiting: string[] = [];
  let columns: string[] = [];
  const enter = async () => {
    if (waiting.length > 0) await insertRows(manager, table.name, columns, waiting);
    rows += waiting.length;
    waiting = [];
  };
  for await (const line of archive.lines(tableEntry(table.name))) {
    const row = JSON.parse(line) as ArchivedRow;
    columns = Object.keys(row);
    waiting.push(table.isLedger ? line : withAccounts(line, row, people));
    if (waiting.length === ROWS_AT_ONCE) await enter();
  }
  await enter();
  return rows;
}

/**
 * PostgreSQL itself reads what it wrote, so that no figure passes through JavaScript. Columns that are newer than the
 * archive take their defaults.
 */
async function insertRows(
  manager: EntityManager,
  table: string,
  columns: readonly string[],
  lines: readonly string[],
): Promise<void> {
  const names = columns.map((column) => `"${column}"`).join(', ');
  await manager.query(
    `INSERT INTO "${table}" (${names}) SELECT ${names} FROM json_populate_recordset(NULL::"${table}", $1::json)`,
    [`[${lines.join(',')}]`],
  );
}

/** The line with the ids of accounts here; as it was when it names nobody who has another. */
function withAccounts(line: string, row: ArchivedRow, { accountOf }: RestoredPeople): string {
  const account = (id: unknown) => (typeof id === 'string' ? (accountOf.get(id) ?? id) : id);
  let changed = line;
  for (const value of Object.values(row)) {
    const ids = Array.isArray(value) ? value : [value];
    // An id is unlike anything else, so that the text can be changed and its figures stay as they are written.
    for (const id of ids)
      if (account(id) !== id) changed = changed.replaceAll(String(id), String(account(id)));
  }
  return changed;
}

/** Queues what was made of the originals or was still to be made: sheets and their pictures, calculation sheets. */
async function startAgain({ manager, jobs }: ServiceDeps, damId: string): Promise<number> {
  const drawings = await manager.findBy(DrawingEntity, { damId });
  let started = 0;
  for (const { id: drawingId } of drawings) {
    const held = await manager.findOneBy(RenderJobEntity, { drawingId });
    if (held && (held.state === 'refused' || held.state === 'failed')) continue;
    const id = held?.id ?? uuidv7();
    if (!held) await manager.insert(RenderJobEntity, { id, drawingId });
    else
      await manager.update(
        RenderJobEntity,
        { id },
        { state: 'waiting', runId: null, leaseUntil: null, attempts: 0, pagesDone: 0, finishedAt: null },
      );
    // A sheet of which nothing is there yet: the job makes its tiles as it makes them after a first view.
    await manager.update(SheetEntity, { drawingId }, { readyZoom: 0 });
    await jobs.enqueue(manager, 'render-drawing', id);
    started += 1;
    for (const sheet of await manager.findBy(SheetEntity, { drawingId }))
      await makePicturesAgain(manager, jobs, sheet.id);
  }
  await queueSheets(manager, jobs, damId);
  return started;
}

async function makePicturesAgain(
  manager: EntityManager,
  jobs: ServiceDeps['jobs'],
  sheetId: string,
): Promise<void> {
  for (const { id, state } of await manager.findBy(RenditionEntity, { sheetId })) {
    if (state === 'refused' || state === 'failed') continue;
    const again = { state: 'waiting' as const, progress: 0, runId: null, leaseUntil: null, attempts: 0 };
    await manager.update(RenditionEntity, { id }, again);
    await jobs.enqueue(manager, 'make-rendition', id);
  }
}

async function queueSheets(manager: EntityManager, jobs: ServiceDeps['jobs'], damId: string): Promise<void> {
  const rows: Array<{ id: string }> = await manager
    .createQueryBuilder(CalculationSheetEntity, 'c')
    .select('c.id', 'id')
    .where(
      `c.state = 'waiting' AND c.net_id IN (SELECT n.id FROM net n JOIN section s ON s.id = n.section_id
        JOIN sheet h ON h.id = s.sheet_id JOIN drawing d ON d.id = h.drawing_id WHERE d.dam_id = :damId)`,
      { damId },
    )
    .getRawMany();
  for (const { id } of rows) await jobs.enqueue(manager, 'make-calculation-sheet', id);
}
