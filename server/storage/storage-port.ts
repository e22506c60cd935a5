import type { Readable } from 'node:stream';

/** Inclusive byte positions, as in an HTTP Range header. */
export interface ByteRange {
  start: number;
  end: number;
}

/**
 * Where files live: originals and artifacts kept for ever under `sha256/<hash>` and `artifacts/<hash>`, and
 * rebuildable tiles under `sheets/<sheetId>/<rendition>/<z>/<x>_<y>.<ext>`. Keys are made by the server from
 * ids and hashes, never from an uploader's file name; a key outside the grammar throws `bad-key`.
 */
export interface StoragePort {
  /**
   * Takes over a finished local file under `key`, durably (synced before it becomes visible); the local file is
   * gone afterwards. The same content again is no error; other content under a taken key throws `conflict`.
   */
  putFile(key: string, localFile: string): Promise<void>;
  /** Takes over a local folder of tiles below `sheets/…`, replacing an unfinished earlier one whole. */
  putTree(prefix: string, localFolder: string): Promise<void>;
  /** Size in bytes, or null when nothing lies under the key. */
  stat(key: string): Promise<{ byteSize: number } | null>;
  /** The bytes, or the inclusive range of them. @throws StorageError `missing` */
  read(key: string, range?: ByteRange): Promise<Readable>;
  /** Runs `use` with a path under which the file can be read; the path is valid only while it runs. */
  withLocalFile<T>(key: string, use: (path: string) => Promise<T>): Promise<T>;
  /** Runs `use` with a local folder that holds everything below a prefix of tiles; valid only while it runs. */
  withLocalTree<T>(prefix: string, use: (folder: string) => Promise<T>): Promise<T>;
  /** Removes everything below a prefix; only `sheets/…` may be removed, because only tiles can be rebuilt. */
  deletePrefix(prefix: string): Promise<void>;
  /** Bytes still free where files are written. */
  freeBytes(): Promise<number>;
}

export type StorageFault = 'bad-key' | 'missing' | 'conflict' | 'kept-for-ever';

export class StorageError extends Error {
  readonly fault: StorageFault;

  constructor(fault: StorageFault, message: string) {
    super(message);
    this.name = 'StorageError';
    this.fault = fault;
  }
}
