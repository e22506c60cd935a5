import { type Tile, tileKey } from './tile-grid.ts';

/** What is kept of a picture: it is drawn, measured and let go. */
export type TilePicture = { readonly width: number; readonly height: number; close(): void };

export type TileStoreOptions<P extends TilePicture> = {
  load(tile: Tile, signal: AbortSignal): Promise<P>;
  /** Bytes of decoded pictures kept; the longest unused go first. */
  memoryLimitBytes: number;
  /** Requests at once: a browser opens six connections to a server and the desk needs some itself. */
  concurrency: number;
  onArrival(): void;
};

export type TileStore<P extends TilePicture> = {
  /** The picture of a tile when it is there. */
  get(tile: Tile): P | null;
  /** Says what one view wants now, in order of urgency; what no view wants any more is cancelled. */
  want(view: string, tiles: readonly Tile[]): void;
  /** True while something wanted is still on its way. */
  isWaiting(): boolean;
  bytes(): number;
  close(): void;
};

const BYTES_PER_PIXEL = 4;
const TRIES = 3;
const RETRY_MS = 800;

/** Keeps tiles in memory and fetches the wanted ones, the most urgent first. */
export function createTileStore<P extends TilePicture>(options: TileStoreOptions<P>): TileStore<P> {
  // A Map remembers the order of insertion: the first key is the longest unused.
  const kept = new Map<string, P>();
  const wanted = new Map<string, readonly Tile[]>();
  const loading = new Map<string, AbortController>();
  const failures = new Map<string, number>();
  const timers = new Set<ReturnType<typeof setTimeout>>();
  let bytes = 0;
  let closed = false;

  function missing(): Tile[] {
    const open: Tile[] = [];
    for (const tiles of wanted.values()) {
      for (const tile of tiles) {
        const key = tileKey(tile);
        if (!kept.has(key) && !loading.has(key) && (failures.get(key) ?? 0) < TRIES) open.push(tile);
      }
    }
    return open;
  }

  function pump(): void {
    if (closed) return;
    for (const tile of missing()) {
      if (loading.size >= options.concurrency) return;
      void load(tile);
    }
  }

  async function load(tile: Tile): Promise<void> {
    const key = tileKey(tile);
    if (loading.has(key)) return;
    const controller = new AbortController();
    loading.set(key, controller);
    try {
      const picture = await options.load(tile, controller.signal);
      if (closed || controller.signal.aborted) picture.close();
      else keep(key, picture);
    } catch {
      if (!controller.signal.aborted && !closed) retryLater(key);
    } finally {
      // After a cancel the same tile may be under way again: only this request's own mark goes.
      if (loading.get(key) === controller) loading.delete(key);
    }
    pump();
  }

  function keep(key: string, picture: P): void {
    kept.set(key, picture);
    bytes += sizeOf(picture);
    failures.delete(key);
    const needed = new Set([...wanted.values()].flat().map(tileKey));
    for (const [oldest, old] of kept) {
      if (bytes <= options.memoryLimitBytes) break;
      if (needed.has(oldest)) continue;
      kept.delete(oldest);
      bytes -= sizeOf(old);
      old.close();
    }
    options.onArrival();
  }

  /** A tile that failed is left alone for a while, so that a lost connection is not hammered. */
  function retryLater(key: string): void {
    const tries = (failures.get(key) ?? 0) + 1;
    failures.set(key, TRIES);
    const timer = setTimeout(
      () => {
        timers.delete(timer);
        failures.set(key, Math.min(tries, TRIES - 1));
        pump();
      },
      RETRY_MS * 2 ** tries,
    );
    timers.add(timer);
  }

  return {
    get(tile) {
      const key = tileKey(tile);
      const picture = kept.get(key);
      if (picture === undefined) return null;
      kept.delete(key);
      kept.set(key, picture);
      return picture;
    },
    want(view, tiles) {
      wanted.set(view, tiles);
      const needed = new Set([...wanted.values()].flat().map(tileKey));
      for (const [key, controller] of loading) {
        if (needed.has(key)) continue;
        controller.abort();
        loading.delete(key);
      }
      pump();
    },
    isWaiting: () => loading.size > 0 || missing().length > 0,
    bytes: () => bytes,
    close() {
      closed = true;
      for (const controller of loading.values()) controller.abort();
      for (const timer of timers) clearTimeout(timer);
      for (const picture of kept.values()) picture.close();
      kept.clear();
      wanted.clear();
    },
  };
}

function sizeOf(picture: TilePicture): number {
  return picture.width * picture.height * BYTES_PER_PIXEL;
}
