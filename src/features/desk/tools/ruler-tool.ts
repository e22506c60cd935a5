import type { SheetPx } from '#shared/compute/frames.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { NO_RULER, type Ruler } from '../model/ruler.ts';
import { constrained } from './constrain.ts';
import { keptPoint } from './line-points.ts';
import { reachOf } from './pick.ts';
import { snapAt } from './snap.ts';
import {
  type Modifiers,
  rest,
  stay,
  type ToolContext,
  type ToolEvent,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';

/**
 * Measures on the sheet: a click begins or adds a leg, one on the first place closes the shape, a double click or Enter
 * ends it. Backspace takes the last place back, Escape clears, and lays the ruler down once it is clear.
 */
export function rulerStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  const { ruler } = context;
  switch (event.type) {
    case 'click':
      return event.count > 1 ? show(ended(ruler)) : show(clicked(event.at, event.keys, context));
    case 'finish':
      return show(ended(ruler));
    case 'takeBack':
    case 'remove':
      return show({
        places: ruler.places.slice(0, ruler.closed ? undefined : -1),
        closed: false,
        done: false,
      });
    case 'cancel':
      return ruler.places.length > 0 ? show(NO_RULER) : rest({ do: 'tool', tool: 'select', boundary: null });
    default:
      return stay(state);
  }
}

/** Where the next place of the ruler would be set. */
export function nextRulerPlace(at: SheetPx, keys: Modifiers, context: ToolContext): SheetPx {
  const { places, done } = context.ruler;
  const last = done ? undefined : places.at(-1);
  const snap = snapAt(context, at, keys, null, last ?? null);
  if (snap !== null) return snap.at;
  return keys.shift && last !== undefined ? constrained(context, sheetPx(...last), at) : at;
}

function clicked(at: SheetPx, keys: Modifiers, context: ToolContext): Ruler {
  const { ruler } = context;
  const [first] = ruler.places;
  if (ruler.done || first === undefined)
    return { ...NO_RULER, places: [keptPoint(nextRulerPlace(at, keys, context))] };
  const far = Math.hypot(at[0] - first[0], at[1] - first[1]);
  if (ruler.places.length >= 3 && far <= reachOf(context)) return { ...ruler, closed: true, done: true };
  return { ...ruler, places: [...ruler.places, keptPoint(nextRulerPlace(at, keys, context))] };
}

/** One place alone measures nothing. */
function ended(ruler: Ruler): Ruler {
  return ruler.places.length < 2 ? NO_RULER : { ...ruler, done: true };
}

function show(ruler: Ruler): ToolStep {
  return rest({ do: 'ruler', ruler });
}
