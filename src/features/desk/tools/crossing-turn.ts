import type { SheetPx } from '#shared/compute/frames.ts';
import type { CrossingClient } from '../model/crossing-client.ts';
import type { ToolEvent } from './tool-types.ts';

/** About which place of the sheet, and how far around it, a crossing of drawn lines has to be known. */
export type SoughtCrossing = { readonly about: SheetPx; readonly reach: number };

export type CrossingTurn<View> = {
  /** True when an event is kept until it is known whether drawn lines cross there. */
  holds(event: ToolEvent, view: View): boolean;
  /** Does at once what is being held: something else happens. */
  flush(): void;
};

/**
 * A hand is often quicker than the search over the scan: what it sets meanwhile waits for the answer, so that a quick
 * click goes to the same crossing as a slow one. Only the click of the same press waits behind it; whatever else
 * happens has it done at once.
 */
export function createCrossingTurn<View>(
  crossings: CrossingClient | null,
  desk: {
    /** What has to be known before an event can be carried out; null when nothing has. */
    sought(event: ToolEvent, view: View): SoughtCrossing | null;
    step(event: ToolEvent, view: View): void;
  },
): CrossingTurn<View> {
  let waiting: Array<readonly [ToolEvent, View]> | null = null;

  function flush(): void {
    const own = waiting ?? [];
    waiting = null;
    for (const [event, view] of own) desk.step(event, view);
  }

  return {
    holds(event, view) {
      if (waiting !== null && event.type === 'click') {
        waiting.push([event, view]);
        return true;
      }
      flush();
      const sought = crossings === null ? null : desk.sought(event, view);
      if (crossings === null || sought === null) return false;
      const own: Array<readonly [ToolEvent, View]> = [[event, view]];
      waiting = own;
      void crossings.ask(sought.about, sought.reach).then(() => waiting === own && flush());
      return true;
    },
    flush,
  };
}
