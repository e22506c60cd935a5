import type { SheetPoint } from '#shared/contract/document.ts';
import type { DeskStore } from './desk-state.ts';
import type { DrawingWay } from './drawing-way.ts';

/** A place that was clicked on a line, and the way in which the piece that leads to it was drawn; null at a beginning. */
export type ClickedPlace = { readonly at: SheetPoint; readonly way: DrawingWay | null };

/**
 * Where lines were clicked in this visit, by line. The document keeps the vertices only; what was clicked is told again
 * from those that are still there, whatever was undone, moved or turned round meanwhile.
 */
export type ClickedPlaces = {
  /** A place from which a line is only gone on keeps the way that it is known with. */
  remember(lineId: string, places: readonly ClickedPlace[]): void;
  /** Vertices of a line that were clicked, by index; empty for a line drawn in another visit. */
  among(lineId: string, points: readonly SheetPoint[]): ReadonlyMap<number, ClickedPlace>;
};

export function createClickedPlaces(): ClickedPlaces {
  const byLine = new Map<string, Map<string, ClickedPlace>>();
  return {
    remember(lineId, places) {
      const known = byLine.get(lineId) ?? new Map<string, ClickedPlace>();
      for (const place of places) {
        if (place.way !== null || !known.has(keyOf(place.at))) known.set(keyOf(place.at), place);
      }
      byLine.set(lineId, known);
    },
    among(lineId, points) {
      const known = byLine.get(lineId);
      const found = new Map<number, ClickedPlace>();
      if (known === undefined) return found;
      points.forEach((point, i) => {
        const place = known.get(keyOf(point));
        if (place !== undefined) found.set(i, place);
      });
      return found;
    },
  };
}

/** The way in which the piece was drawn that a vertex lies in: that of the next clicked place; null where it is not known. */
export function wayOfPiece(clicked: ReadonlyMap<number, ClickedPlace>, index: number): ClickedPlace['way'] {
  let next = Number.POSITIVE_INFINITY;
  for (const i of clicked.keys()) if (i >= index && i < next) next = i;
  return clicked.get(next)?.way ?? null;
}

const ofStores = new WeakMap<DeskStore, ClickedPlaces>();

/** The clicked places of one open net, for as long as it is open. */
export function clickedPlacesOf(store: DeskStore): ClickedPlaces {
  const known = ofStores.get(store) ?? createClickedPlaces();
  ofStores.set(store, known);
  return known;
}

function keyOf([x, y]: SheetPoint): string {
  return `${x} ${y}`;
}
