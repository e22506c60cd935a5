import { crossingOnSheet } from '#shared/compute/ink/crossing-over-sheet.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { greyTileLoader, type InkTiles, inkSheetOf } from './ink-tiles.ts';

export type CrossingQuestion = {
  readonly number: number;
  readonly sheet: InkTiles;
  readonly about: SheetPoint;
  /** How far off a crossing may be, sheet pixels. */
  readonly reach: number;
};
/** `at` is null where no two drawn lines cross near, and where the scan could not be read. */
export type CrossingAnswer = { readonly number: number; readonly at: SheetPoint | null };

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
let scan: ReturnType<typeof inkSheetOf> | null = null;

// A worker belongs to one sheet, whose tiles it keeps.
scope.onmessage = async ({ data }: MessageEvent<CrossingQuestion>) => {
  scan ??= inkSheetOf(data.sheet, greyTileLoader(data.sheet));
  const found = await crossingOnSheet(scan, data.about, data.reach).catch(() => null);
  const answer: CrossingAnswer = { number: data.number, at: found === null ? null : [...found.at] };
  scope.postMessage(answer);
};
