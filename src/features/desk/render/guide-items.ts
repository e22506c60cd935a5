import type { GuidesByOwner, GuideTone } from '../model/guides.ts';
import { areaLook, guideLineLook, toneColour } from './guide-look.ts';
import type { SceneItem } from './scene.ts';

const OVER_THE_NET: readonly GuideTone[] = ['way'];

/** The guides as items of the picture: tints and computed lines lie under the net, ways and words over it. */
export function guideItems(guides: GuidesByOwner): { under: SceneItem[]; over: SceneItem[] } {
  const shown = Object.entries(guides);
  const areas = shown.flatMap(([owner, each]) =>
    each.areas.map(
      ({ id, tone, outlines }): SceneItem => ({
        id: `${owner} area ${id}`,
        shape: 'area',
        outlines,
        look: areaLook(tone),
        strong: false,
      }),
    ),
  );
  const lines = (over: boolean) =>
    shown.flatMap(([owner, each]) =>
      each.lines
        .filter(({ tone }) => OVER_THE_NET.includes(tone) === over)
        .map(
          ({ id, tone, points }): SceneItem => ({
            id: `${owner} line ${id}`,
            shape: 'line',
            points,
            look: guideLineLook(tone),
            strong: false,
          }),
        ),
    );
  const marks = shown.flatMap(([owner, each]) =>
    each.marks.map(
      ({ id, tone, at, text }): SceneItem => ({
        id: `${owner} mark ${id}`,
        shape: 'callout',
        at,
        text,
        colour: toneColour(tone),
        strong: false,
        offsetPx: [0, 0],
      }),
    ),
  );
  return { under: [...areas, ...lines(false)], over: [...lines(true), ...marks] };
}
