import { bendsOf } from '#shared/compute/geometry/reshape.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { clickedIndexes, type Growing } from './growing.ts';
import { joined, smoothEnd } from './smooth-way.ts';

/**
 * The points of a line without what the last click added, which may be many vertices. Where the line was drawn in
 * another visit its clicks are not known: then it goes back to its last bend.
 */
export function withoutLastClick(growing: Growing): SheetPoint[] {
  const { points, clicked } = growing;
  const last = points.length - 1;
  const known = clickedIndexes(growing).at(-2) ?? -1;
  const bends = clicked.has(last) && known >= 0 ? [] : [...bendsOf(points)].filter((i) => i < last);
  const to = Math.max(known, ...bends);
  const shorter = points.slice(0, Math.max(0, to) + 1);
  const before = { ...growing, points: shorter, clicked: onlyUpTo(clicked, to) };
  return before.clicked.get(to)?.way === 'smooth' ? joined(smoothEnd(before, null)) : shorter;
}

function onlyUpTo<T>(clicked: ReadonlyMap<number, T>, last: number): ReadonlyMap<number, T> {
  return new Map([...clicked].filter(([i]) => i <= last));
}
