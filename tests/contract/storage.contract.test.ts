import { mkdir, mkdtemp, readdir, readFile, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createLocalDiskStorage } from '#server/storage/local-disk-storage.ts';
import { createMemoryStorage } from '#server/storage/memory-storage.ts';
import { originalKey, thumbnailKey, tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import type { StoragePort } from '#server/storage/storage-port.ts';

const adapters: Array<[string, (folder: string) => StoragePort]> = [
  ['local disk', (folder) => createLocalDiskStorage(path.join(folder, 'store'))],
  ['memory', () => createMemoryStorage()],
];

describe.each(adapters)('storage on %s', (_name, create) => {
  let folder: string;
  let storage: StoragePort;
  let written = 0;

  beforeEach(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'tracehead-storage-'));
    storage = create(folder);
  });
  afterEach(() => rm(folder, { recursive: true, force: true }));

  async function finishedFile(content: string): Promise<string> {
    const file = path.join(folder, `incoming-${written++}`);
    await writeFile(file, content);
    return file;
  }
  async function tileFolder(tiles: Record<string, string>): Promise<string> {
    const root = path.join(folder, `tiles-${written++}`);
    for (const [name, content] of Object.entries(tiles)) {
      await mkdir(path.dirname(path.join(root, name)), { recursive: true });
      await writeFile(path.join(root, name), content);
    }
    return root;
  }
  const text = async (stream: Promise<Readable>) => (await buffer(await stream)).toString();

  it('says that nothing is there for a key never written', async () => {
    expect(await storage.stat('sha256/none')).toBeNull();
    await expect(storage.read('sha256/none')).rejects.toMatchObject({ fault: 'missing' });
    await expect(storage.withLocalFile('sha256/none', async () => 1)).rejects.toMatchObject({
      fault: 'missing',
    });
  });

  it.each([
    '../secret',
    'sha256/../../secret',
    '/etc/passwd',
    'sha256/',
    'sha256//a',
    'sha256/.hidden',
    'sha256/a\\b',
    'sha256/a\0b',
    'sha256/A',
    'plain',
    '',
  ])('refuses the key %j', async (key) => {
    const file = await finishedFile('x');
    await expect(storage.putFile(key, file)).rejects.toMatchObject({ fault: 'bad-key' });
    await expect(storage.read(key)).rejects.toMatchObject({ fault: 'bad-key' });
    await expect(storage.stat(key)).rejects.toMatchObject({ fault: 'bad-key' });
    expect(await readFile(file, 'utf8')).toBe('x');
  });

  it('takes over a finished file and gives back its bytes', async () => {
    const file = await finishedFile('a drawing');
    await storage.putFile(originalKey('abc'), file);
    expect(await text(storage.read('sha256/abc'))).toBe('a drawing');
    expect(await storage.stat('sha256/abc')).toEqual({ byteSize: 9 });
    await expect(stat(file)).rejects.toMatchObject({ code: 'ENOENT' });
  });

  it('gives the inclusive range that was asked for', async () => {
    await storage.putFile('sha256/abc', await finishedFile('0123456789'));
    expect(await text(storage.read('sha256/abc', { start: 2, end: 4 }))).toBe('234');
    expect(await text(storage.read('sha256/abc', { start: 9, end: 9 }))).toBe('9');
  });

  it('accepts the same content again', async () => {
    await storage.putFile('sha256/abc', await finishedFile('same'));
    const again = await finishedFile('same');
    await storage.putFile('sha256/abc', again);
    expect(await text(storage.read('sha256/abc'))).toBe('same');
    await expect(stat(again)).rejects.toMatchObject({ code: 'ENOENT' });
  });

  it.each(['longer content', 'SAME'])('refuses %j over other content and keeps the first', async (other) => {
    await storage.putFile('sha256/abc', await finishedFile('same'));
    await expect(storage.putFile('sha256/abc', await finishedFile(other))).rejects.toMatchObject({
      fault: 'conflict',
    });
    expect(await text(storage.read('sha256/abc'))).toBe('same');
  });

  it('lends a path with the same bytes', async () => {
    await storage.putFile('sha256/abc', await finishedFile('lent'));
    expect(await storage.withLocalFile('sha256/abc', (file) => readFile(file, 'utf8'))).toBe('lent');
  });

  it('takes over a folder of tiles and replaces it whole', async () => {
    const prefix = tilePrefix('sheet-1', 'base');
    await storage.putTree(prefix, await tileFolder({ '0/0_0.png': 'old', '1/1_1.png': 'old' }));
    const second = await tileFolder({ '0/0_0.png': 'new', 'thumbnail.webp': 'small' });
    await storage.putTree(prefix, second);
    expect(await text(storage.read(tileKey(prefix, 0, 0, 0, 'png')))).toBe('new');
    expect(await text(storage.read(thumbnailKey(prefix)))).toBe('small');
    expect(await storage.stat(tileKey(prefix, 1, 1, 1, 'png'))).toBeNull();
    await expect(readdir(second)).rejects.toMatchObject({ code: 'ENOENT' });
  });

  it('lends a folder with all tiles below a prefix, and nothing that lies elsewhere', async () => {
    const prefix = tilePrefix('sheet-1', 'base');
    await storage.putTree(prefix, await tileFolder({ '0/0_0.png': 'small', '1/1_1.png': 'large' }));
    const lent = storage.withLocalTree(prefix, async (folder) => [
      await readFile(path.join(folder, '0', '0_0.png'), 'utf8'),
      await readFile(path.join(folder, '1', '1_1.png'), 'utf8'),
    ]);
    expect(await lent).toEqual(['small', 'large']);
    await expect(storage.withLocalTree('sheets/none', async () => 1)).rejects.toMatchObject({
      fault: 'missing',
    });
    await expect(storage.withLocalTree('sha256', async () => 1)).rejects.toMatchObject({
      fault: 'kept-for-ever',
    });
  });

  it('removes the tiles of one sheet and nothing else', async () => {
    await storage.putTree('sheets/s1/base', await tileFolder({ '0/0_0.png': 'one' }));
    await storage.putTree('sheets/s10/base', await tileFolder({ '0/0_0.png': 'ten' }));
    await storage.deletePrefix('sheets/s1');
    await storage.deletePrefix('sheets/never-there');
    expect(await storage.stat('sheets/s1/base/0/0_0.png')).toBeNull();
    expect(await text(storage.read('sheets/s10/base/0/0_0.png'))).toBe('ten');
  });

  it.each(['sha256', 'sha256/abc', 'sheets', 'sheets/', 'sheets/..', 'sheets/../sha256', ''])(
    'never removes or replaces what lies under %j',
    async (prefix) => {
      await storage.putFile('sha256/abc', await finishedFile('kept'));
      await expect(storage.deletePrefix(prefix)).rejects.toMatchObject({ fault: 'kept-for-ever' });
      await expect(storage.putTree(prefix, folder)).rejects.toMatchObject({ fault: 'kept-for-ever' });
      expect(await text(storage.read('sha256/abc'))).toBe('kept');
    },
  );

  it('tells the free space in bytes', async () => {
    expect(await storage.freeBytes()).toBeGreaterThan(1e6);
  });
});

describe('the memory storage', () => {
  it('fails once when told to and shows its keys', async () => {
    const storage = createMemoryStorage();
    storage.failNext(new Error('no power'));
    await expect(storage.freeBytes()).rejects.toThrow('no power');
    storage.setFreeBytes(5);
    expect(await storage.freeBytes()).toBe(5);
    expect(storage.keys()).toEqual([]);
  });
});
