import type { DrawingWay } from '#client/features/desk/model/drawing-way.ts';
import { inLanguage } from './language.ts';

/** Words of the ways in which a line is drawn. */
const enDrawingWay = {
  title: 'Way of drawing',
  names: {
    straight: 'Straight',
    smooth: 'Curve',
    freehand: 'Freehand',
    ink: 'Follow ink',
  } satisfies Record<DrawingWay, string>,
  hints: {
    straight: 'Straight from click to click. D changes the way of drawing.',
    smooth: 'A curve through the clicks. D changes the way of drawing.',
    freehand: 'Hold and draw; letting go keeps the stroke without its tremor. D changes the way of drawing.',
    ink: 'Follows the drawn line from click to click. D changes the way of drawing.',
  } satisfies Record<DrawingWay, string>,
  /** Steps, as undo lists them. */
  drewFreehand: (line: string) => `drew freehand: ${line}`,
  followedInk: (line: string) => `followed the ink: ${line}`,
  noInk: 'No drawn line was found between the two clicks: they are joined straight.',
  scanUnread: 'The scan could not be read here: the two clicks are joined straight.',
} as const;

export const drawingWayText = inLanguage({ en: enDrawingWay });
