import { profileText as text } from '#client/text/profiles.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import {
  type EntityOf,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
} from '#shared/contract/document.ts';
import type { LocalOp } from './document-ops.ts';

export type Profile = EntityOf<'profile'>;
export type ProfileEdit = { readonly label: string; readonly ops: LocalOp[] };

/** A profile just made is read at about so many places; the engineer sets the spacing that is wanted. */
const FIRST_STEPS = 20;

/** A profile at a place, last in the list and under the first name that is free. */
export function newProfile(document: FlowNetDocument, place: Profile['place'], finished: boolean): Profile {
  const held = entitiesOf(document, 'profile').map(({ value }) => value);
  const used = new Set(held.map(({ name }) => name));
  let n = 1;
  while (used.has(text.freeName(n))) n += 1;
  const order = 1 + held.reduce((last, { order }) => Math.max(last, order), 0);
  return { kind: 'profile', name: text.freeName(n), use: 'other', place, spacing: null, finished, order };
}

/** Adds a list of places as they are, or a grid. */
export function addProfile(
  id: string,
  document: FlowNetDocument,
  place: Extract<Profile['place'], { on: 'section' | 'grid' }>,
): ProfileEdit {
  const value = newProfile(document, place, true);
  const label = place.on === 'grid' ? text.labels.typedGrid(value.name) : text.labels.pasted(value.name);
  return { label, ops: [{ op: 'put', entityId: id, value }] };
}

export function changeProfile(id: string, profile: Profile, changes: Partial<Profile>): ProfileEdit {
  const label =
    changes.name !== undefined
      ? text.labels.renamed(profile.name, changes.name)
      : changes.use !== undefined
        ? text.labels.used(profile.name)
        : text.labels.spaced(profile.name);
  return { label, ops: [{ op: 'put', entityId: id, value: { ...profile, ...changes } }] };
}

export function removeProfile(id: string, name: string): ProfileEdit {
  return { label: text.labels.removed(name), ops: [{ op: 'remove', entityId: id }] };
}

/**
 * The spacing a line just drawn begins with: a twentieth of its length, rounded down to 1, 2 or 5 times a power of ten.
 * Null, which reads its own points, before the section is set out and for a line without length.
 */
export function firstSpacing(points: readonly SheetPoint[], map: SectionMap | null): number | null {
  if (map === null) return null;
  const places = points.map((point) => map.toSection(sheetPx(...point)));
  const length = places
    .slice(1)
    .reduce((sum, [x, z], i) => sum + Math.hypot(x - places[i]![0], z - places[i]![1]), 0);
  if (!(length > 0)) return null;
  const step = length / FIRST_STEPS;
  const power = 10 ** Math.floor(Math.log10(step));
  const round = [5, 2, 1].find((digit) => digit * power <= step * (1 + 1e-9)) ?? 1;
  return Number((round * power).toPrecision(1));
}
