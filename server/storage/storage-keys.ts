import { StorageError } from './storage-port.ts';

// Lower-case names without dots, one extension at most: no key can climb out of the folder, hide itself or
// collide on a file system that ignores case.
const SEGMENT = '[a-z0-9][a-z0-9_-]{0,127}';
const KEY = new RegExp(`^${SEGMENT}(/${SEGMENT})+(\\.[a-z0-9]{1,8})?$`);
const REBUILDABLE = new RegExp(`^sheets/${SEGMENT}(/${SEGMENT})*$`);

/** The key itself. @throws StorageError `bad-key` */
export function checkedKey(key: string): string {
  if (!KEY.test(key))
    throw new StorageError('bad-key', `Not a storage key: ${JSON.stringify(key.slice(0, 80))}`);
  return key;
}

/** The prefix itself, when it names rebuildable tiles. @throws StorageError `kept-for-ever` */
export function checkedTilePrefix(prefix: string): string {
  if (REBUILDABLE.test(prefix)) return prefix;
  throw new StorageError(
    'kept-for-ever',
    `Only tiles may be replaced: ${JSON.stringify(prefix.slice(0, 80))}`,
  );
}

export function originalKey(sha256: string): string {
  return checkedKey(`sha256/${sha256}`);
}

export function artifactKey(sha256: string): string {
  return checkedKey(`artifacts/${sha256}`);
}

export function tilePrefix(sheetId: string, rendition: string): string {
  return checkedTilePrefix(`sheets/${sheetId}/${rendition}`);
}

export function tileKey(prefix: string, z: number, x: number, y: number, extension: string): string {
  return checkedKey(`${prefix}/${z}/${x}_${y}.${extension}`);
}

export function thumbnailKey(prefix: string): string {
  return checkedKey(`${prefix}/thumbnail.webp`);
}
