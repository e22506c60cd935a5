import type { SheetChapter } from './content.ts';

/** Said once. */
export function cautionsChapter(): SheetChapter {
  return {
    id: 'cautions',
    title: 'Cautions',
    blocks: [
      {
        kind: 'paragraph',
        text: 'The figures can be no better than the drawing, the net on it and the values put in. A net drawn for other levels, drains or soils than those found on site does not hold for them. Measured pressures go before read ones. Piping, internal erosion and what happens at cracks, joints and defects are not covered. Local codes and regulations, and the judgement of an engineer licensed for the place, go before this sheet.',
      },
    ],
  };
}
