import { createHash } from 'node:crypto';
import { pipeline, Readable, Transform, type Writable } from 'node:stream';
import { pipeline as flow } from 'node:stream/promises';
import { ZipFile } from 'yazl';
import type { AppDeps } from '#server/app-deps.ts';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { AppError, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import { ARCHIVE_FORMAT, ARCHIVE_VERSION, type ArchiveManifest } from '#shared/contract/archives.ts';
import { FLOW_NET_VERSION } from '#shared/contract/document.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { type DamSnapshot, openSnapshot } from './archive-snapshot.ts';
import { ARCHIVED_TABLES } from './archive-tables.ts';
import { writeEvent } from './event-writer.ts';
import { inTransaction } from './service-deps.ts';

type ArchiveDeps = Pick<AppDeps, 'db' | 'storage' | 'clock'>;
type Entry = ArchiveManifest['entries'][number];

export const tableEntry = (table: string) => `tables/${table}.ndjson`;
export const fileEntry = (key: string) => `files/${key}`;
export const PEOPLE_ENTRY = 'people.ndjson';
export const MANIFEST_ENTRY = 'manifest.json';

export interface PreparedArchive {
  fileName: string;
  /** Writes the ZIP into `out` with a memory that does not grow with the dam. */
  writeTo(out: Writable): Promise<void>;
}

/**
 * An archive of a whole dam as it is now. The rows are those of one moment; files never change. That it was taken is told
 * in the dam's own events, which are in it.
 * @throws AppError not-found, or internal when a file that a row refers to is not in storage
 */
export async function prepareArchive(deps: AppDeps, damId: string, actor: Actor): Promise<PreparedArchive> {
  const dam = await deps.db.manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  await inTransaction(deps, ({ manager }) =>
    writeEvent(manager, {
      damId,
      personId: actor.id,
      type: 'dam.archiveTaken',
      text: 'downloaded an archive of the dam',
    }),
  );
  const snapshot = await openSnapshot(deps.db, damId);
  try {
    const keys = await snapshot.fileKeys();
    await refuseMissing(deps, keys);
    return {
      fileName: cleanFileName(`${dam.name} ${deps.clock.now().toISOString().slice(0, 10)}.zip`),
      writeTo: (out) => write(deps, { id: damId, name: dam.name }, snapshot, keys, out),
    };
  } catch (error) {
    await snapshot.close();
    throw error;
  }
}

/** Half-way through an answer nobody could be told any more. */
async function refuseMissing({ storage }: ArchiveDeps, keys: readonly string[]): Promise<void> {
  for (const key of keys)
    if ((await storage.stat(key)) === null)
      throw new AppError(
        'internal',
        500,
        'A file of this dam is missing',
        `The server no longer holds the file ${key}, so the archive would not be whole. Tell the administrator; the file has to be brought back from a backup.`,
      );
}

async function write(
  { storage, clock }: ArchiveDeps,
  dam: ArchiveManifest['dam'],
  snapshot: DamSnapshot,
  keys: readonly string[],
  out: Writable,
): Promise<void> {
  const entries: Entry[] = [];
  const zip = createZip(clock.now());
  for (const table of ARCHIVED_TABLES) {
    const name = tableEntry(table.name);
    zip.add(name, true, async () => hashed(name, snapshot.linesOf(table), entries));
  }
  zip.add(PEOPLE_ENTRY, true, async () => {
    const lines = (await snapshot.people()).map((person) => `${JSON.stringify(person)}\n`);
    // The rows are all read: a slow reader of the files holds no transaction up.
    await snapshot.close();
    return hashed(PEOPLE_ENTRY, Readable.from(lines), entries);
  });
  // Scans are packed already.
  for (const key of keys)
    zip.add(fileEntry(key), false, async () =>
      hashed(fileEntry(key), await storage.read(key), entries, hashOfKey(key)),
    );
  zip.add(MANIFEST_ENTRY, true, async () => {
    const manifest: ArchiveManifest = {
      format: ARCHIVE_FORMAT,
      version: ARCHIVE_VERSION,
      madeAt: clock.now().toISOString(),
      dam,
      documentVersion: FLOW_NET_VERSION,
      engineVersion: ENGINE_VERSION,
      entries,
    };
    return Readable.from([`${JSON.stringify(manifest, null, 2)}\n`]);
  });
  try {
    await flow(zip.finished(), out);
  } finally {
    zip.stop();
    await snapshot.close();
  }
}

/** A ZIP whose entries are opened one after another, each when its turn has come. */
function createZip(mtime: Date) {
  const zip = new ZipFile();
  const output = zip.outputStream as Readable;
  let current: Readable | null = null;
  zip.on('error', (error: Error) => output.destroy(error));
  return {
    add(name: string, compress: boolean, open: () => Promise<Readable>): void {
      zip.addReadStreamLazy(name, { mtime, compress }, (done) => {
        open().then(
          (stream) => {
            current = stream;
            done(null, stream);
          },
          (error: unknown) => done(error, Readable.from([])),
        );
      });
    },
    finished(): Readable {
      zip.end();
      return output;
    },
    /** Ends what is being read when nobody takes it any more. */
    stop: () => current?.destroy(),
  };
}

/** Passes a stream on and enters its size and hash. A file that is not what its key says breaks the archive off. */
function hashed(name: string, source: Readable, entries: Entry[], expected?: string): Readable {
  const hash = createHash('sha256');
  let byteSize = 0;
  const through = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      byteSize += chunk.length;
      done(null, chunk);
    },
    flush(done) {
      const sha256 = hash.digest('hex');
      if (expected !== undefined && sha256 !== expected)
        return done(new Error(`The stored file ${name} is damaged: its content has the hash ${sha256}.`));
      entries.push({ name, byteSize, sha256 });
      done();
    },
  });
  pipeline(source, through, () => undefined);
  return through;
}

const hashOfKey = (key: string) => key.slice(key.lastIndexOf('/') + 1);
