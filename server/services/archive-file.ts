import { createHash } from 'node:crypto';
import { createInterface } from 'node:readline';
import { type Readable, Transform } from 'node:stream';
import { json } from 'node:stream/consumers';
import { pipeline } from 'node:stream/promises';
import { type Entry, openPromise, type ZipFile } from 'yauzl';
import * as z from 'zod/mini';
import { AppError } from '#server/errors/app-error.ts';
import { ARCHIVE_FORMAT, type ArchiveManifest, archiveManifest } from '#shared/contract/archives.ts';
import { MANIFEST_ENTRY } from './archive-service.ts';

/** A manifest of a hundred thousand files stays below this; anything larger is none. */
const MOST_MANIFEST_BYTES = 64 * 1024 * 1024;
/** Everything an archive may hold: nothing else is looked at, and no name leads out of a folder. */
const ENTRY_NAME =
  /^(manifest\.json|people\.ndjson|tables\/[a-z_]+\.ndjson|files\/(sha256|artifacts)\/[0-9a-f]{64})$/;

/** An archive whose names and manifest are in order. What its entries hold is read later. */
export interface ArchiveFile {
  manifest: ArchiveManifest;
  has(name: string): boolean;
  open(name: string): Promise<Readable>;
  /** The lines of an entry of rows, none when it is not there. */
  lines(name: string): AsyncIterable<string>;
  close(): void;
}

/** What is wrong with an archive, told with the name of the entry. */
export const refusedArchive = (entry: string | null, why: string) =>
  new AppError(
    'refused-file',
    422,
    'The archive is not in order',
    `${entry === null ? '' : `${entry}: `}${why} Nothing was restored.`,
    entry === null ? {} : { extra: { entry } },
  );

/** @throws AppError refused-file */
export async function openArchiveFile(path: string): Promise<ArchiveFile> {
  const zip = await openZip(path);
  try {
    const entries = await entriesOf(zip);
    const manifest = await manifestOf(zip, entries);
    holdNames(entries, manifest);
    const open = async (name: string): Promise<Readable> => {
      const entry = entries.get(name);
      if (!entry) throw refusedArchive(name, 'The entry is missing.');
      return zip.openReadStreamPromise(entry).catch((error: unknown) => {
        throw refusedArchive(name, `The entry cannot be read (${messageOf(error)}).`);
      });
    };
    return {
      manifest,
      has: (name) => entries.has(name),
      open,
      async *lines(name) {
        if (!entries.has(name)) return;
        const input = await open(name);
        yield* createInterface({ input, crlfDelay: Number.POSITIVE_INFINITY });
      },
      close: () => zip.close(),
    };
  } catch (error) {
    zip.close();
    throw error;
  }
}

/** Reads every entry and holds it against size and hash of the manifest. @throws AppError refused-file */
export async function verifyEntries({ manifest, open }: ArchiveFile): Promise<void> {
  for (const { name, byteSize, sha256 } of manifest.entries) {
    const found = await hashOf(name, await open(name));
    if (found.byteSize !== byteSize || found.sha256 !== sha256)
      throw refusedArchive(name, 'The content is not the one that was archived: its hash differs.');
    // A stored file is found by its hash: under another name it would be another file.
    if (name.startsWith('files/') && !name.endsWith(`/${sha256}`))
      throw refusedArchive(name, 'The name of the file is not the hash of its content.');
  }
}

async function openZip(path: string): Promise<ZipFile> {
  return openPromise(path, { lazyEntries: true, autoClose: false, validateEntrySizes: true }).catch(
    (error: unknown) => {
      throw refusedArchive(null, `This file cannot be read as a ZIP archive (${messageOf(error)}).`);
    },
  );
}

async function entriesOf(zip: ZipFile): Promise<Map<string, Entry>> {
  const entries = new Map<string, Entry>();
  try {
    for await (const entry of zip.eachEntry()) {
      const { fileName } = entry;
      if (!ENTRY_NAME.test(fileName)) throw refusedArchive(fileName, 'No archive has an entry of this name.');
      if (entries.has(fileName)) throw refusedArchive(fileName, 'The entry is there twice.');
      entries.set(fileName, entry);
    }
  } catch (error) {
    if (error instanceof AppError) throw error;
    throw refusedArchive(null, `The list of entries cannot be read (${messageOf(error)}).`);
  }
  return entries;
}

async function manifestOf(zip: ZipFile, entries: Map<string, Entry>): Promise<ArchiveManifest> {
  const entry = entries.get(MANIFEST_ENTRY);
  if (!entry) throw refusedArchive(MANIFEST_ENTRY, 'The entry is missing, so this is no archive of a dam.');
  if (entry.uncompressedSize > MOST_MANIFEST_BYTES) throw refusedArchive(MANIFEST_ENTRY, 'It is too large.');
  const content = await zip
    .openReadStreamPromise(entry)
    .then(json)
    .catch(() => null);
  const parsed = z.safeParse(archiveManifest, content);
  if (!parsed.success)
    throw refusedArchive(MANIFEST_ENTRY, `It does not say "${ARCHIVE_FORMAT}" in a version known here.`);
  return parsed.data;
}

function holdNames(entries: Map<string, Entry>, manifest: ArchiveManifest): void {
  const stated = new Set(manifest.entries.map(({ name }) => name));
  for (const name of entries.keys())
    if (name !== MANIFEST_ENTRY && !stated.has(name))
      throw refusedArchive(name, 'The manifest does not name this entry.');
  for (const name of stated) if (!entries.has(name)) throw refusedArchive(name, 'The entry is missing.');
}

async function hashOf(name: string, source: Readable): Promise<{ byteSize: number; sha256: string }> {
  const hash = createHash('sha256');
  let byteSize = 0;
  const count = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      byteSize += chunk.length;
      done();
    },
  });
  count.resume();
  await pipeline(source, count).catch((error: unknown) => {
    throw refusedArchive(name, `The content cannot be read (${messageOf(error)}).`);
  });
  return { byteSize, sha256: hash.digest('hex') };
}

const messageOf = (error: unknown) => (error instanceof Error ? error.message : String(error));
