import { type InkClient, type InkReach, isSameReach } from '../../model/ink-client.ts';
import type { FollowedEvent, ToolCommand, ToolEvent } from '../tool-types.ts';

type Follow = Extract<ToolCommand, { do: 'follow' }>;

/** What is done on the sheet while the ink of a click is still being followed waits for it. */
const WAITS: ReadonlySet<ToolEvent['type']> = new Set(['click', 'finish', 'takeBack']);

export type InkTurn<View> = {
  /** True when an event is kept until the ink has been followed. */
  holds(event: ToolEvent, view: View): boolean;
  follow(command: Follow, view: View): void;
  /** Looks where the ink would run to a place under the pointer. */
  look(reach: InkReach): void;
};

/**
 * Has the ink followed for clicks, one after the other: what is clicked meanwhile comes after it, Escape gives it up.
 * `isUnderWay`: whether a line is still the one being drawn.
 */
export function createInkTurn<View>(
  ink: InkClient | null,
  desk: {
    step(event: FollowedEvent, view: View): void;
    handle(event: ToolEvent, view: View): void;
    isUnderWay(lineId: string): boolean;
  },
): InkTurn<View> {
  let waiting: Array<readonly [ToolEvent, View]> | null = null;
  let looked: InkReach | null = null;

  return {
    holds(event, view) {
      if (event.type === 'cancel') waiting = null;
      if (waiting === null || !WAITS.has(event.type)) return false;
      waiting.push([event, view]);
      return true;
    },
    follow({ lineId, reach, fixed }, view) {
      const own: Array<readonly [ToolEvent, View]> = [];
      waiting = own;
      const answered = ink === null ? Promise.resolve(null) : ink.follow(reach);
      void answered.then((path) => {
        if (waiting !== own) return;
        waiting = null;
        if (!desk.isUnderWay(lineId)) return;
        desk.step({ type: 'followed', lineId, ...reach, fixed, path }, view);
        for (const [event, at] of own) desk.handle(event, at);
      });
    },
    look(reach) {
      if (looked !== null && isSameReach(looked, reach)) return;
      looked = reach;
      ink?.look(reach);
    },
  };
}
