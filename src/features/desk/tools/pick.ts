import { type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { nearestOnLines, type PickableLine } from '#shared/compute/geometry/hit-test.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { type DocumentEntity, type EntityOf, entitiesOf } from '#shared/contract/document.ts';
import { isSheetKind, kindOnSheet } from '../model/sheet-kinds.ts';
import type { ToolContext } from './tool-types.ts';

export type Mark = {
  readonly kind: 'readingPoint' | 'knownPoint';
  readonly id: string;
  readonly at: SheetPx;
};
/** What lies under the pointer. */
export type Picked =
  | Mark
  | { readonly kind: 'note'; readonly id: string; readonly at: SheetPx }
  | { readonly kind: 'line'; readonly id: string; readonly at: SheetPx; readonly segment: number }
  | { readonly kind: 'profile'; readonly id: string; readonly at: SheetPx };

/** Marks are drawn some pixels wide, so they are met a little farther out than lines. */
const MARK_EXTRA_PX = 3;

/** Reach on the sheet, sheet pixels. */
export function reachOf(context: ToolContext, extraPx = 0): number {
  return (context.reachPx + extraPx) / context.zoom;
}

type Kinds = Pick<ToolContext, 'hiddenKinds' | 'lockedKinds'>;

/** True where a thing's kind is hidden: it is neither picked nor snapped to. */
export function isHidden({ hiddenKinds }: Kinds, value: DocumentEntity): boolean {
  const kind = kindOnSheet(value);
  return isSheetKind(kind) && hiddenKinds.includes(kind);
}

/** True where a thing's kind is locked: it is shown and snapped to, but neither picked nor changed. */
export function isLocked({ lockedKinds }: Kinds, value: DocumentEntity): boolean {
  const kind = kindOnSheet(value);
  return isSheetKind(kind) && lockedKinds.includes(kind);
}

/** True where a thing can be picked and changed as far as its kind goes. */
export function isFree(kinds: Kinds, value: DocumentEntity): boolean {
  return !isHidden(kinds, value) && !isLocked(kinds, value);
}

/** Lines that can be picked. */
export function freeLines(context: ToolContext): PickableLine[] {
  return entitiesOf(context.document, 'line')
    .filter(({ value }) => isFree(context, value))
    .map(({ id, value }) => ({ id, points: value.points }));
}

/** Where a reading point stands on the sheet; null for a typed one before the section is set out. */
export function placeOf(value: EntityOf<'readingPoint'>, map: SectionMap | null): SheetPx | null {
  const { place } = value;
  if (place.on === 'sheet') return sheetPx(...place.at);
  return map?.toSheet(sectionPt(place.offset, place.elevation)) ?? null;
}

/** Known points and reading points that can be picked. */
export function freeMarks(context: ToolContext): Mark[] {
  const marks: Mark[] = [];
  for (const { id, value } of entitiesOf(context.document, 'readingPoint')) {
    const at = isFree(context, value) ? placeOf(value, context.map) : null;
    if (at !== null) marks.push({ kind: 'readingPoint', id, at });
  }
  for (const { id, value } of entitiesOf(context.document, 'knownPoint')) {
    if (isFree(context, value)) marks.push({ kind: 'knownPoint', id, at: sheetPx(...value.at) });
  }
  return marks;
}

/** The mark under the pointer, of the kinds given; null when there is none. */
export function markAt(context: ToolContext, at: SheetPx, kinds: readonly Mark['kind'][]): Mark | null {
  return nearest(
    freeMarks(context).filter((mark) => kinds.includes(mark.kind)),
    at,
    reachOf(context, MARK_EXTRA_PX),
  );
}

/** What is under the pointer: a note's balloon before a mark before a line before a profile; null for bare sheet. */
export function pickAt(context: ToolContext, at: SheetPx): Picked | null {
  const balloons = context.hiddenKinds.includes('note') ? [] : context.balloons;
  const balloon = nearest(balloons, at, reachOf(context, MARK_EXTRA_PX));
  if (balloon !== null) return { kind: 'note', id: balloon.id, at: balloon.at };
  const mark = markAt(context, at, ['readingPoint', 'knownPoint']);
  if (mark !== null) return mark;
  const hit = nearestOnLines(freeLines(context), at, reachOf(context));
  if (hit !== null)
    return { kind: 'line', id: hit.id, at: sheetPx(hit.at[0], hit.at[1]), segment: hit.segment };
  const profile = nearestOnLines(freeProfiles(context), at, reachOf(context));
  return profile === null
    ? null
    : { kind: 'profile', id: profile.id, at: sheetPx(profile.at[0], profile.at[1]) };
}

/** Profiles as lines on the sheet; a grid is none. */
function freeProfiles(context: ToolContext): PickableLine[] {
  return entitiesOf(context.document, 'profile').flatMap(({ id, value }): PickableLine[] => {
    const { place } = value;
    if (!isFree(context, value)) return [];
    if (place.on === 'sheet') return [{ id, points: place.points }];
    const { map } = context;
    if (place.on === 'grid' || map === null) return [];
    return [{ id, points: place.points.map((point) => map.toSheet(sectionPt(...point))) }];
  });
}

function nearest<T extends { readonly at: SheetPx }>(
  things: readonly T[],
  at: SheetPx,
  reach: number,
): T | null {
  let best: T | null = null;
  let bestDistance = reach;
  for (const thing of things) {
    const distance = Math.hypot(thing.at[0] - at[0], thing.at[1] - at[1]);
    if (distance <= bestDistance) {
      best = thing;
      bestDistance = distance;
    }
  }
  return best;
}
