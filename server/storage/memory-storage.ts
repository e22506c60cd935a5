import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Readable } from 'node:stream';
import { checkedKey, checkedTilePrefix } from './storage-keys.ts';
import { StorageError, type StoragePort } from './storage-port.ts';

/** What tests may look at and bring about besides the port itself. */
export interface MemoryStorage extends StoragePort {
  keys(): string[];
  failNext(error: Error): void;
  setFreeBytes(bytes: number): void;
}

export function createMemoryStorage(): MemoryStorage {
  const files = new Map<string, Buffer>();
  let freeBytes = 1e12;
  let nextFailure: Error | null = null;

  const passFailure = () => {
    const error = nextFailure;
    nextFailure = null;
    if (error) throw error;
  };
  const bytesOf = (key: string) => {
    const bytes = files.get(checkedKey(key));
    if (!bytes) throw new StorageError('missing', `Nothing is kept under ${key}.`);
    return bytes;
  };

  return {
    async putFile(key, localFile) {
      passFailure();
      checkedKey(key);
      const bytes = await readFile(localFile);
      const kept = files.get(key);
      if (kept && !kept.equals(bytes)) {
        throw new StorageError('conflict', `Other content is already kept under ${key}.`);
      }
      files.set(key, bytes);
      await rm(localFile);
    },
    async putTree(prefix, localFolder) {
      passFailure();
      dropBelow(files, checkedTilePrefix(prefix));
      for (const entry of await readdir(localFolder, { recursive: true, withFileTypes: true })) {
        if (!entry.isFile()) continue;
        const file = path.join(entry.parentPath, entry.name);
        const relative = path.relative(localFolder, file).split(path.sep).join('/');
        files.set(checkedKey(`${prefix}/${relative}`), await readFile(file));
      }
      await rm(localFolder, { recursive: true });
    },
    async stat(key) {
      passFailure();
      const bytes = files.get(checkedKey(key));
      return bytes ? { byteSize: bytes.length } : null;
    },
    async read(key, range) {
      passFailure();
      const bytes = bytesOf(key);
      return Readable.from([range ? bytes.subarray(range.start, range.end + 1) : bytes]);
    },
    async withLocalFile(key, use) {
      passFailure();
      const folder = await mkdtemp(path.join(tmpdir(), 'tracehead-memory-'));
      try {
        const file = path.join(folder, 'file');
        await writeFile(file, bytesOf(key));
        return await use(file);
      } finally {
        await rm(folder, { recursive: true, force: true });
      }
    },
    async withLocalTree(prefix, use) {
      passFailure();
      const below = [...files].filter(([key]) => key.startsWith(`${checkedTilePrefix(prefix)}/`));
      if (below.length === 0) throw new StorageError('missing', `Nothing is kept under ${prefix}.`);
      const folder = await mkdtemp(path.join(tmpdir(), 'tracehead-memory-'));
      try {
        for (const [key, bytes] of below) {
          const file = path.join(folder, key.slice(prefix.length + 1));
          await mkdir(path.dirname(file), { recursive: true });
          await writeFile(file, bytes);
        }
        return await use(folder);
      } finally {
        await rm(folder, { recursive: true, force: true });
      }
    },
    async deletePrefix(prefix) {
      passFailure();
      dropBelow(files, checkedTilePrefix(prefix));
    },
    async freeBytes() {
      passFailure();
      return freeBytes;
    },
    keys: () => [...files.keys()].sort(),
    failNext: (error) => {
      nextFailure = error;
    },
    setFreeBytes: (bytes) => {
      freeBytes = bytes;
    },
  };
}

function dropBelow(files: Map<string, Buffer>, prefix: string): void {
  for (const key of files.keys()) if (key.startsWith(`${prefix}/`)) files.delete(key);
}
