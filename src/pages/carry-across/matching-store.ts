import { v7 as newUuid } from 'uuid';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import {
  entitiesOf,
  FLOW_NET_FORMAT,
  FLOW_NET_VERSION,
  type FlowNetDocument,
  type SheetPoint,
} from '#shared/contract/document.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/** A desk on which nothing but places can be marked, and of which nothing is kept. */
export function createMatchingStore(sheet: SheetDto): DeskStore {
  const store = createDeskStore({ document: emptyDocument(sheet) });
  store.setTool('knownPoint');
  // Escape and the keys of other tools lay the tool down; here there is no other.
  store.subscribe((state) => state.tool !== 'knownPoint' && store.setTool('knownPoint'));
  return store;
}

function emptyDocument({ widthPx, heightPx, dpi }: SheetDto): FlowNetDocument {
  return {
    format: FLOW_NET_FORMAT,
    version: FLOW_NET_VERSION,
    id: newUuid(),
    name: '',
    unitSystem: 'SI',
    datum: '',
    sheet: { widthPx, heightPx, dpi },
    entities: {},
  };
}

/** A place marked on one sheet or on both; `null` where it is still to be marked. */
export type MarkedPlace = {
  readonly name: string;
  readonly from: SheetPoint | null;
  readonly to: SheetPoint | null;
};

/** The places by their names, in the order of making on the sheet that has them first. */
export function markedPlaces(from: FlowNetDocument, to: FlowNetDocument | null): MarkedPlace[] {
  const there = placesByName(from);
  const here = to === null ? new Map<string, SheetPoint>() : placesByName(to);
  const names = [...new Set([...there.keys(), ...here.keys()])].sort((a, b) =>
    a.localeCompare(b, 'en', { numeric: true }),
  );
  return names.map((name) => ({ name, from: there.get(name) ?? null, to: here.get(name) ?? null }));
}

function placesByName(document: FlowNetDocument): Map<string, SheetPoint> {
  return new Map(entitiesOf(document, 'knownPoint').map(({ value }) => [value.name, value.at]));
}

/** Takes a place off a sheet, as one step that can be taken back. */
export function removePlace(store: DeskStore, name: string, label: string): void {
  const found = entitiesOf(store.getState().document, 'knownPoint').find(({ value }) => value.name === name);
  if (found) store.run(label, [{ op: 'remove', entityId: found.id }]);
}
