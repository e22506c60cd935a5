import { soilText as text } from '#client/text/desk-forms.ts';
import type { EntityOf, SheetPoint } from '#shared/contract/document.ts';
import { keptPoint } from './line-points.ts';
import { rest, stay, type ToolContext, type ToolEvent, type ToolState, type ToolStep } from './tool-types.ts';

/** Places of one soil; beyond these a drawing has no regions. */
const MOST_PLACES = 50;

/**
 * Marks places of the soil that is chosen: a click sets one inside a region, taking back removes the newest. Without a
 * chosen soil there is nothing to mark, and the tool is laid down.
 */
export function soilPlaceStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  const laidDown = rest({ do: 'tool', tool: 'select', boundary: null });
  const soil = chosenSoil(context);
  if (context.readOnly || soil === null || event.type === 'cancel' || event.type === 'finish') {
    return event.type === 'move' ? stay(state) : laidDown;
  }
  const { places } = soil.value;
  if (event.type === 'takeBack' || event.type === 'remove') {
    return places.length === 0 ? rest() : changed(soil, places.slice(0, -1), text.labels.placeRemoved);
  }
  if (event.type !== 'click' || event.count > 1 || places.length >= MOST_PLACES) return stay(state);
  const at = keptPoint(event.at);
  const isThere = places.some(([x, y]) => x === at[0] && y === at[1]);
  return isThere ? rest() : changed(soil, [...places, at], text.labels.placed);
}

interface ChosenSoil {
  id: string;
  value: EntityOf<'soil'>;
}

function chosenSoil({ selection, document }: ToolContext): ChosenSoil | null {
  const id = selection.kind === 'soil' ? selection.ids[0] : undefined;
  const value = id === undefined ? undefined : document.entities[id]?.value;
  return id !== undefined && value?.kind === 'soil' ? { id, value } : null;
}

function changed({ id, value }: ChosenSoil, places: SheetPoint[], label: (name: string) => string): ToolStep {
  return rest({
    do: 'run',
    label: label(value.name),
    ops: [{ op: 'put', entityId: id, value: { ...value, places } }],
  });
}
