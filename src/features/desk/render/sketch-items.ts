import type { Sketch } from '../model/tool-overlay.ts';
import { COLOURS, type LineLook } from './line-look.ts';
import type { SceneItem } from './scene.ts';

const WRONG = '#a3261d';

/** What an edit would do, told apart by dash as well as by colour: what comes is dashed, what goes is thick and dotted. */
const LOOKS: Record<Exclude<Sketch['kind'], 'place'>, LineLook> = {
  gained: { colour: COLOURS.ink, widthPx: 2, dashPx: [7, 4], end: 'none', hatchPx: 0 },
  lost: { colour: WRONG, widthPx: 4, dashPx: [2, 4], end: 'bar', hatchPx: 0 },
  frame: { colour: COLOURS.ink, widthPx: 1.2, dashPx: [4, 3], end: 'none', hatchPx: 0 },
};

/** What the edit asked for would do at the pointer, and the rectangle drawn about what is to be chosen. */
export function sketchItems(sketches: readonly Sketch[]): SceneItem[] {
  return sketches.flatMap(({ kind, points }, i): SceneItem[] => {
    const id = `sketch ${kind} ${i}`;
    if (kind !== 'place') return [{ id, shape: 'line', points, look: LOOKS[kind], strong: false }];
    const [at] = points;
    if (at === undefined) return [];
    return [{ id, shape: 'cross', at, text: '', colour: COLOURS.ink, strong: false, offsetPx: [0, 0] }];
  });
}
