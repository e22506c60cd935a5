import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { copyFile, mkdir, open, readdir, rename, rm, stat, statfs } from 'node:fs/promises';
import path from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { checkedKey, checkedTilePrefix } from './storage-keys.ts';
import { type ByteRange, StorageError, type StoragePort } from './storage-port.ts';

/** Files below one folder of this machine. Local files handed over should lie on the same file system. */
export function createLocalDiskStorage(rootFolder: string): StoragePort {
  const root = path.resolve(rootFolder);
  const pathOf = (key: string) => path.join(root, checkedKey(key));

  return {
    async putFile(key, localFile) {
      const target = pathOf(key);
      if (await exists(target)) {
        if (!(await sameContent(target, localFile))) {
          throw new StorageError('conflict', `Other content is already kept under ${key}.`);
        }
        await rm(localFile);
        return;
      }
      await mkdir(path.dirname(target), { recursive: true });
      await syncFile(localFile);
      await moveFile(localFile, target);
      await syncFolder(path.dirname(target));
    },

    async putTree(prefix, localFolder) {
      const target = path.join(root, checkedTilePrefix(prefix));
      await mkdir(path.dirname(target), { recursive: true });
      // Aside first: deleting thousands of files takes a while, in which tiles are asked for.
      const aside = `${target}.${process.pid}.old`;
      await rm(aside, { recursive: true, force: true });
      await renameIfThere(target, aside);
      await moveFolder(localFolder, target);
      await rm(aside, { recursive: true, force: true });
    },

    async stat(key) {
      const found = await statOrNull(pathOf(key));
      return found?.isFile() ? { byteSize: found.size } : null;
    },

    async read(key, range) {
      return openForReading(key, pathOf(key), range);
    },

    async withLocalFile(key, use) {
      const file = pathOf(key);
      if (!(await exists(file))) throw missing(key);
      return use(file);
    },

    async withLocalTree(prefix, use) {
      const folder = path.join(root, checkedTilePrefix(prefix));
      if ((await statOrNull(folder))?.isDirectory() !== true) throw missing(prefix);
      return use(folder);
    },

    async deletePrefix(prefix) {
      await rm(path.join(root, checkedTilePrefix(prefix)), { recursive: true, force: true });
    },

    async freeBytes() {
      await mkdir(root, { recursive: true });
      const { bavail, bsize } = await statfs(root);
      return bavail * bsize;
    },
  };
}

function missing(key: string): StorageError {
  return new StorageError('missing', `Nothing is kept under ${key}.`);
}

async function openForReading(key: string, file: string, range?: ByteRange): Promise<Readable> {
  // Opened before the stream is returned, so that a missing file is an error here and not half-way through an answer.
  const handle = await open(file, 'r').catch((error: NodeJS.ErrnoException) => {
    throw error.code === 'ENOENT' ? missing(key) : error;
  });
  return handle.createReadStream(range);
}

async function statOrNull(file: string) {
  return stat(file).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return null;
    throw error;
  });
}

async function exists(file: string): Promise<boolean> {
  return (await statOrNull(file)) !== null;
}

async function sameContent(first: string, second: string): Promise<boolean> {
  const [a, b] = await Promise.all([stat(first), stat(second)]);
  return a.size === b.size && (await hashOf(first)) === (await hashOf(second));
}

async function hashOf(file: string): Promise<string> {
  const hash = createHash('sha256');
  await pipeline(createReadStream(file), hash);
  return hash.digest('hex');
}

async function syncFile(file: string): Promise<void> {
  const handle = await open(file, 'r+');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/** The rename itself must survive a power cut too. */
async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

async function renameIfThere(from: string, to: string): Promise<void> {
  await rename(from, to).catch((error: NodeJS.ErrnoException) => {
    if (error.code !== 'ENOENT') throw error;
  });
}

async function moveFile(from: string, to: string): Promise<void> {
  try {
    await rename(from, to);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EXDEV') throw error;
    // Another file system: copy beside the target first, so that a half copy never carries the final name.
    const beside = `${to}.${process.pid}.part`;
    await copyFile(from, beside);
    await syncFile(beside);
    await rename(beside, to);
    await rm(from);
  }
}

async function moveFolder(from: string, to: string): Promise<void> {
  try {
    await rename(from, to);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EXDEV') throw error;
    await mkdir(to, { recursive: true });
    for (const entry of await readdir(from, { withFileTypes: true })) {
      const [source, target] = [path.join(from, entry.name), path.join(to, entry.name)];
      await (entry.isDirectory() ? moveFolder(source, target) : moveFile(source, target));
    }
    await rm(from, { recursive: true });
  }
}
