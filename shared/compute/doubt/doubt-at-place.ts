import { type ReadingDoubt, readingDoubt } from '#shared/compute/doubt/point-doubt.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { LieOfPlace } from '#shared/compute/net/lie-of-place.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';

/** A head read at a place, as far as its doubt goes. */
export type ReadPlace = {
  /** Names the place among the causes: places of one tracing share it. */
  readonly id: string;
  /** Working pixels. */
  readonly at: SheetPx;
  readonly lie: Extract<LieOfPlace, { in: 'strip' }>;
  /** True for a place typed in section coordinates. */
  readonly typed: boolean;
  readonly elevationPlusMinus: number | null;
  /** Part of the interval passed from the line before. */
  readonly fraction: number;
  readonly gradient: readonly [number, number];
  readonly totalHead: number;
  readonly pressureHead: number;
};

/** First-order doubt of a head read at a place of a net, cause by cause; see `readingDoubt`. */
export function doubtAtPlace(read: ReadPlace, ground: ReadingGround): ReadingDoubt {
  const { lie, totalHead } = read;
  const { headwater, outHead } = ground.heads;
  const lost = (headwater ?? 0) - (outHead ?? 0);
  return readingDoubt(
    {
      id: read.id,
      at: sheetPx(...ground.toSheet(read.at)),
      typed: read.typed,
      onFreeFace: lie.onFreeFace,
      elevationPlusMinus: read.elevationPlusMinus,
      partLost: lost > 0 ? ((headwater ?? 0) - totalHead) / lost : 0,
      gradient: read.gradient,
      between: { before: lie.before.id, after: lie.after.id, fraction: read.fraction },
      pressureHead: read.pressureHead,
    },
    ground.doubt,
  );
}
