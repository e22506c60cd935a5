import { useStore } from 'zustand';
import { fixedText } from '#client/lib/figures.ts';
import { rulerText as text } from '#client/text/set-out.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { rulerFigures } from '#shared/compute/ruler.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { rulerOf } from '../model/ruler.ts';
import type { ViewStore } from '../model/view-store.ts';
import { toScreen } from '../model/viewport.ts';
import { useSection } from './ruler-panel.tsx';

const AWAY_PX = 16;
/** About what the words take up, so that they stay in sight. */
const ROOM_PX = [220, 40] as const;

/** Length, slope and angle of the leg under way, beside the pointer. */
export function RulerAtPointer({ store, views }: { store: DeskStore; views: ViewStore }) {
  const inHand = useStore(store, (state) => state.tool === 'ruler');
  return inHand ? <LegUnderWay store={store} views={views} /> : null;
}

function LegUnderWay({ store, views }: { store: DeskStore; views: ViewStore }) {
  const document = useStore(store, (state) => state.document);
  const pointer = useStore(store, (state) => state.pointerAt);
  const view = useStore(views, (state) => state.view);
  const { places, done } = useStore(rulerOf(store));
  const { map, unit, decimals } = useSection(document);
  const last = places.at(-1);
  if (pointer === null || last === undefined || done) return null;
  const [leg] = rulerFigures([last, pointer], false, map).legs;
  if (leg === undefined || !(leg.lengthPx > 0)) return null;
  const length = leg.length === null ? fixedText(leg.lengthPx, 1) : fixedText(leg.length, decimals);
  const [x, y] = toScreen(view, sheetPx(...pointer));
  return (
    <span
      aria-hidden="true"
      className="pointer-events-none absolute whitespace-nowrap rounded-sheet border border-rule bg-film px-1.5 text-sm tabular-nums"
      style={{
        left: Math.max(0, Math.min(x + AWAY_PX, view.widthPx - ROOM_PX[0])),
        top: Math.max(0, Math.min(y + AWAY_PX, view.heightPx - ROOM_PX[1])),
      }}
    >
      {text.near(length, leg.length === null ? text.lengthPx : unit, leg.slope, fixedText(leg.angleDeg, 1))}
    </span>
  );
}
