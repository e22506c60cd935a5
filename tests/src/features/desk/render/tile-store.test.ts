import { describe, expect, it } from 'vitest';
import type { Tile } from '#client/features/desk/render/tile-grid.ts';
import { createTileStore, type TilePicture } from '#client/features/desk/render/tile-store.ts';

const TILE_BYTES = 512 * 512 * 4;
const tile = (x: number): Tile => ({ z: 5, x, y: 0 });

type Asked = { tile: Tile; signal: AbortSignal; answer(): Promise<void>; fail(): Promise<void> };

/** A store whose tiles come when the test lets them. */
function storeOf(tilesKept: number, concurrency = 2) {
  const asked: Asked[] = [];
  const closed: number[] = [];
  let arrivals = 0;
  const store = createTileStore<TilePicture>({
    memoryLimitBytes: tilesKept * TILE_BYTES,
    concurrency,
    onArrival: () => {
      arrivals += 1;
    },
    load: (wanted, signal) =>
      new Promise((resolve, reject) => {
        const settle = async (act: () => void) => {
          act();
          await new Promise((done) => setTimeout(done, 0));
        };
        asked.push({
          tile: wanted,
          signal,
          answer: () =>
            settle(() => resolve({ width: 512, height: 512, close: () => closed.push(wanted.x) })),
          fail: () => settle(() => reject(new Error('no connection'))),
        });
      }),
  });
  return { store, asked, closed, arrivals: () => arrivals };
}

describe('the store of tiles', () => {
  it('asks for the most urgent first and for no more at once than allowed', async () => {
    const { store, asked } = storeOf(10);
    store.want('main', [tile(1), tile(2), tile(3)]);
    expect(asked.map((one) => one.tile.x)).toEqual([1, 2]);
    await asked[0]!.answer();
    expect(asked.map((one) => one.tile.x)).toEqual([1, 2, 3]);
  });

  it('cancels what no view wants any more and keeps what another view wants', () => {
    const { store, asked } = storeOf(10);
    store.want('main', [tile(1)]);
    store.want('magnifier', [tile(2)]);
    store.want('main', [tile(2)]);
    expect(asked[0]!.signal.aborted).toBe(true);
    expect(asked[1]!.signal.aborted).toBe(false);
  });

  it('closes a picture that comes after it was cancelled and shows it to nobody', async () => {
    const { store, asked, closed, arrivals } = storeOf(10);
    store.want('main', [tile(1)]);
    store.want('main', []);
    await asked[0]!.answer();
    expect(closed).toEqual([1]);
    expect(store.get(tile(1))).toBeNull();
    expect(arrivals()).toBe(0);
  });

  it('lets the longest unused go when memory is full, never one that is wanted now', async () => {
    const { store, asked, closed } = storeOf(2, 1);
    for (const x of [1, 2]) {
      store.want('main', [tile(x)]);
      await asked[x - 1]!.answer();
    }
    store.get(tile(1));
    store.want('main', [tile(3)]);
    await asked[2]!.answer();
    expect(closed).toEqual([2]);
    expect(store.bytes()).toBe(2 * TILE_BYTES);
    store.want('main', [tile(1), tile(3), tile(4)]);
    await asked[3]!.answer();
    expect(closed).toEqual([2]);
  });

  it('waits before it asks again for a tile that failed', async () => {
    const { store, asked } = storeOf(10);
    store.want('main', [tile(1)]);
    await asked[0]!.fail();
    store.want('main', [tile(1)]);
    expect(asked).toHaveLength(1);
    expect(store.isWaiting()).toBe(false);
  });
});
