import { soilText as text } from '#client/text/desk-forms.ts';
import {
  type EntityOf,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
  singleOf,
  UNSAID,
} from '#shared/contract/document.ts';
import type { Edit } from './schedule-edits.ts';

type Soil = EntityOf<'soil'>;

/** A soil under the first name that is free, with the section's unit of permeability and nothing else said of it. */
export function addSoil(id: string, document: FlowNetDocument): Edit {
  const used = new Set(entitiesOf(document, 'soil').map(({ value }) => value.name));
  let n = 1;
  while (used.has(text.freeName(n))) n += 1;
  const name = text.freeName(n);
  const unit = singleOf(document, 'permeability')?.value.unit;
  const value: Soil = {
    kind: 'soil',
    name,
    places: [],
    ...UNSAID.soil,
    k: null,
    unit: unit ?? (document.unitSystem === 'SI' ? 'm/s' : 'ft/day'),
    factor: null,
    source: '',
  };
  return { label: text.labels.added(name), ops: [{ op: 'put', entityId: id, value }] };
}

/** Takes a soil away; channels that were counted in it are again counted in the soil of the section. */
export function removeSoil(id: string, document: FlowNetDocument): Edit | null {
  const value = document.entities[id]?.value;
  if (value?.kind !== 'soil') return null;
  const count = singleOf(document, 'netCount');
  const counted = count?.value.countedIn === id ? count : null;
  return {
    label: text.labels.removed(value.name),
    ops: [
      ...(counted
        ? [{ op: 'put' as const, entityId: counted.id, value: { ...counted.value, countedIn: null } }]
        : []),
      { op: 'remove', entityId: id },
    ],
  };
}

/** Marks one more place of a soil; null when it is marked already. */
export function addPlace(id: string, soil: Soil, place: SheetPoint): Edit | null {
  if (soil.places.some(([x, y]) => x === place[0] && y === place[1])) return null;
  const value = { ...soil, places: [...soil.places, place] };
  return { label: text.labels.placed(soil.name), ops: [{ op: 'put', entityId: id, value }] };
}

export function removePlace(id: string, soil: Soil, place: SheetPoint): Edit {
  const value = { ...soil, places: soil.places.filter((each) => each !== place) };
  return { label: text.labels.placeRemoved(soil.name), ops: [{ op: 'put', entityId: id, value }] };
}
