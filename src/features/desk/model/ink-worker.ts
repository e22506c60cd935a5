import {
  createInkFollower,
  type FollowedPath,
  type FollowQuestion,
} from '#shared/compute/ink/follow-over-sheet.ts';
import { greyTileLoader, type InkTiles, inkSheetOf } from './ink-tiles.ts';

export type InkQuestion = FollowQuestion & { readonly number: number; readonly sheet: InkTiles };
/** `path` is null where the scan could not be read. */
export type InkAnswer = { readonly number: number; readonly path: FollowedPath | null };

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
let follower: ReturnType<typeof createInkFollower> | null = null;

// A worker belongs to one sheet, whose tiles it keeps.
scope.onmessage = async ({ data }: MessageEvent<InkQuestion>) => {
  follower ??= createInkFollower(inkSheetOf(data.sheet, greyTileLoader(data.sheet)));
  const path = await follower.follow(data).catch(() => null);
  const answer: InkAnswer = { number: data.number, path };
  scope.postMessage(answer);
};
