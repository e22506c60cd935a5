import type { SheetPoint } from '#shared/contract/document.ts';
import type { Ruler } from '../model/ruler.ts';
import { COLOURS } from './line-look.ts';
import type { SceneItem } from './scene.ts';

const LOOK = { colour: COLOURS.ink, widthPx: 1.6, dashPx: [], end: 'none', hatchPx: 0 } as const;

/** The legs that were measured, and the band to the pointer is drawn as that of any tool. */
export function rulerItems({ places, closed }: Ruler): SceneItem[] {
  const [first] = places;
  if (first === undefined) return [];
  const points: SheetPoint[] = closed ? [...places, first] : [...places];
  return [
    ...(points.length > 1
      ? [{ id: 'ruler', shape: 'line' as const, points, look: LOOK, strong: false }]
      : []),
    ...places.map(
      (at, i): SceneItem => ({
        id: `ruler ${i}`,
        shape: 'cross',
        at,
        text: '',
        colour: COLOURS.ink,
        strong: false,
        offsetPx: [0, 0],
      }),
    ),
  ];
}
