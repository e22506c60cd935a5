import { describe, expect, it } from 'vitest';
import type { GuideTone } from '#client/features/desk/model/guides.ts';
import { LINE_KINDS } from '#client/features/desk/model/sheet-kinds.ts';
import { GRID } from '#client/features/desk/render/grid-layer.ts';
import { guideLineLook, toneColour } from '#client/features/desk/render/guide-look.ts';
import { COLOURS, HALO, lookOf, tracedLook, unfinishedLook } from '#client/features/desk/render/line-look.ts';
import { contrast, mixed } from '#tests/support/contrast.ts';

/** From the black of an inverted or photographed sheet to white paper. */
const SCANS = ['#000000', '#404040', '#808080', '#c0c0c0', '#ffffff'];
const LEAST_OF_A_LINE = 3;
const LEAST_OF_WORDS = 4.5;

const TONES = [
  'strip',
  'way',
  'poorCell',
  'chosenCell',
  'channelLess',
  'channelMore',
  'poorAngle',
  'computedEquipotential',
  'computedFlowLine',
  'computedSurface',
  'above3',
  'below3',
  'before',
] as const satisfies readonly GuideTone[];

describe('what is drawn over the scan, held against its halo (WCAG 2.2, 1.4.11: three to one)', () => {
  const lines = [
    ...LINE_KINDS.flatMap((kind) => [lookOf(kind), unfinishedLook(kind), tracedLook(kind, 'guessed')]),
    ...TONES.map(guideLineLook),
    { colour: COLOURS.ink },
    { colour: COLOURS.point },
  ];

  it.each(SCANS)('is told from the ground by a line of any colour, over %s', (scan) => {
    const ground = mixed(HALO.colour, HALO.alpha, scan);
    for (const { colour } of lines)
      expect(contrast(colour, ground), colour).toBeGreaterThanOrEqual(LEAST_OF_A_LINE);
  });

  it.each(SCANS)('also as the grid, which is paler, over %s', (scan) => {
    const ground = mixed(HALO.colour, HALO.alpha, scan);
    expect(contrast(mixed(GRID.colour, GRID.alpha, ground), ground)).toBeGreaterThanOrEqual(LEAST_OF_A_LINE);
  });

  it('has words that are read on the film they stand on (1.4.3)', () => {
    for (const colour of [
      ...Object.values(COLOURS).filter((each) => each !== COLOURS.film),
      ...TONES.map(toneColour),
    ])
      expect(contrast(colour, COLOURS.film), colour).toBeGreaterThanOrEqual(LEAST_OF_WORDS);
  });
});

describe('the formula of contrast', () => {
  it('gives what WCAG gives: black on white 21, #767676 on white just 4.54', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6);
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  });
});
