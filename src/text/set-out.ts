import { fixedText, plainText, signedText } from '#client/lib/figures.ts';
import { inLanguage } from './language.ts';

/** Words of placing known points finely and of what the known points tell of themselves. */
const enPlacing = {
  takesCrossings: 'Go to the crossing of drawn lines',
  takesCrossingsHint:
    'A known point set near two drawn lines goes to where they cross, to a fraction of a pixel. Alt sets it freely.',
  place: (x: number, y: number) => `x ${fixedText(x, 1)}, y ${fixedText(y, 1)} px`,
  onCrossing: 'crossing of drawn lines',
  across: 'Place across, px',
  down: 'Place down, px',
  offSheet: (greatest: number) =>
    `That place lies off the sheet, which goes from 0 to ${plainText(greatest)} px.`,
  movedPlace: (name: string) => `typed the place of ${name}`,
  offsetOnly: 'gives its offset only',
  elevationOnly: 'gives its elevation only',
  scaleBarEnd: 'end of the scale bar',
  unfinished: 'Nothing is typed yet: type its offset, its elevation or both.',
  oneIsEnough:
    'One of the two is enough where the drawing gives no more, as at the foot or the side of a long profile.',
  residualOf: (axis: 'offset' | 'elevation', off: number, unit: string, px: number) =>
    `${signedText(off, 3)} ${unit} in ${axis} (${signedText(px, 1)} px)`,
  offBy: (parts: readonly string[]) => `Off by ${parts.join(', ')}`,
  suspect: 'Suspect: it alone spoils the fit.',
  tooFewToSuspect: (more: number) =>
    `With ${more} more typed ${more === 1 ? 'figure' : 'figures'} a point that alone spoils the fit could be told from the others.`,
  noneSuspect: 'No point alone spoils the fit (w-test, bound 3.3).',
  scaleBar: (unit: string) => `Length of the scale bar, ${unit}`,
  scaleBarHint: (from: string, to: string) =>
    `${from} and ${to} give neither offset nor elevation. If they are the ends of a scale bar, its length checks the fit.`,
  scaleBarFits: (fitted: string, part: string) => `By the fit it is ${fitted}, ${part} %`,
  endsOf: (from: string, to: string, unit: string) => `Length from ${from} to ${to}, ${unit}`,
  endsUnmarked: 'Mark the two ends of the known length, as of a scale bar, and let them set the scale.',
  usesOfLength: { fit: 'end of the length', check: 'gives the level or the offset' },
  turnFromSheet:
    'The points do not tell how the sheet is turned: its own edge is taken for level, and what that is off is not in the ±.',
  levelsOfPoints: { line: 'as the points say', sheet: 'the edge of the sheet' },
  twoScales: (along: string, up: string, times: string) =>
    `Scale ${along} along, ${up} upwards: stretched ${times} times`,
  doubtTitle: 'What the known points leave to a place, ± (95 %)',
  doubtMiddle: 'in the middle',
  doubtCorner: 'at the worst corner',
  doubtOf: (where: string, offset: string, elevation: string, unit: string) =>
    `${where}: offset ± ${offset}, elevation ± ${elevation} ${unit}`,
  doubtWhy:
    'Of the box about all that is marked and traced. From the accuracy of the known points, or their residuals where these are greater.',
} as const;
export const placingText = inLanguage({ en: enPlacing });

/** Words of the grid of offsets and elevations over the sheet. */
const enGrid = {
  name: 'Grid',
  title: 'Lines of equal offset and elevation over the sheet (G)',
  waiting: 'The grid needs a section that is set out',
  offset: (value: number, decimals: number) => fixedText(value, decimals),
  elevation: (value: number, decimals: number) => fixedText(value, decimals),
} as const;
export const gridText = inLanguage({ en: enGrid });

const slopeText = (slope: number | null) =>
  slope === null ? 'level' : slope < 0.005 ? 'upright' : `1 : ${plainText(slope, 3)}`;

/** Words of the ruler. */
const enRuler = {
  title: 'Ruler',
  leg: 'Leg',
  legNumber: (n: number) => String(n),
  length: (unit: string) => `Length, ${unit}`,
  lengthPx: 'px',
  slope: 'Slope',
  angle: 'Angle, °',
  corner: 'Corner, °',
  whole: 'Whole',
  area: (figure: string, unit: string) => `Area ${figure} ${unit}²`,
  slopeOf: slopeText,
  near: (length: string, unit: string, slope: number | null, angle: string) =>
    `${length} ${unit}, ${slopeText(slope)}, ${angle}°`,
  empty: 'Click where to measure from. A click on the first place closes the shape.',
  hint: 'Enter ends, Backspace takes the last place back, Escape clears.',
  copy: 'Copy',
  copied: 'Copied',
  clear: 'Clear',
  notSetOut: 'Not set out yet: lengths are pixels of the sheet, slopes and angles those on it.',
  exaggerated: 'True lengths, slopes and angles: the stretch of the drawing is taken out.',
} as const;
export const rulerText = inLanguage({ en: enRuler });
