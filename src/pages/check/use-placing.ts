import { useCallback, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { NEW_POINT, type TypedReading } from '#client/features/revisions/components/blind-typed.ts';
import { enteredText } from '#client/lib/figures.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { BlindView } from '#shared/contract/review.ts';

/** Places a point by the next press on the sheet: the calibration gives its offset and elevation, to be typed over. */
export function usePlacing(
  store: DeskStore,
  view: BlindView,
  typed: TypedReading,
  onType: (typed: TypedReading) => void,
) {
  const [pointId, setPointId] = useState<string | null>(null);
  const tool = useStore(store, (state) => state.tool);
  const begin = useCallback(
    (id: string | null) => {
      setPointId(id);
      store.setTool(id === null ? 'select' : 'note');
    },
    [store],
  );
  // Escape puts the tool away.
  useEffect(() => {
    if (tool !== 'note') setPointId(null);
  }, [tool]);
  const take = useRef<(at: SheetPoint) => void>(() => undefined);
  take.current = (at) => {
    if (pointId === null) return;
    onType({
      ...typed,
      points: {
        ...typed.points,
        [pointId]: { ...(typed.points[pointId] ?? NEW_POINT), sheetAt: at, ...placeTyped(view, at) },
      },
    });
    begin(null);
  };
  useEffect(
    () =>
      store.onIntent((intent) => {
        if (intent.type === 'writeNote' && 'at' in intent.anchor) take.current(intent.anchor.at);
      }),
    [store],
  );
  const placed = view.points.find(({ id }) => id === pointId);
  return { pointId, name: placed ? placed.name || text.unnamed : null, begin };
}

function placeTyped({ document }: BlindView, at: SheetPoint) {
  const map = fittedMap(document);
  if (map === null) return {};
  const [offset, elevation] = map.toSection(sheetPx(...at));
  return { offset: enteredText(rounded(offset)), elevation: enteredText(rounded(elevation)) };
}

const rounded = (value: number) => Number(value.toFixed(2));
