import { fixedText } from '#client/lib/figures.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { inLanguage } from './language.ts';

export type PointerWords = {
  readonly offset: number;
  readonly elevation: number;
  readonly side: 'upstream' | 'downstream' | null;
  readonly decimals: number;
  readonly unitSystem: UnitSystem;
  readonly datum: string;
};

/** Words on and around the sheet. */
const en = {
  sheetRole: 'drawing',
  keysHelp:
    'Question mark lists all keys. C shows a crosshair that arrow keys move and Space clicks; with a tool in hand arrow keys show it by themselves. Without it arrow keys move the sheet, plus and minus zoom, zero shows it whole. Letters choose tools: K known points, E equipotential, F flow line, P phreatic line, B boundary, R reading point, L profile, M ruler, N note. Enter finishes a line, Backspace takes back its last point, Escape cancels. Q tells what stands at the crosshair, Shift and H opens lines and points as a table, F6 goes to the next part of the desk.',
  zoomIn: 'Zoom in',
  zoomOut: 'Zoom out',
  fit: 'Fit',
  fitTitle: 'Show the whole section',
  zoomBar: 'Zoom',
  zoomShown: (zoom: number) => {
    const percent = zoom * 100;
    return `${fixedText(percent, percent < 9.95 ? 1 : 0)} %`;
  },
  pixels: (x: number, y: number) => `x ${fixedText(x, 1)}, y ${fixedText(y, 1)} px`,
  offset: (words: PointerWords) => {
    const { length } = unitNames(words.unitSystem);
    if (words.side === null) return `Offset ${fixedText(words.offset, words.decimals)} ${length}`;
    return `Offset ${fixedText(Math.abs(words.offset), words.decimals)} ${length} ${words.side}`;
  },
  elevation: (words: PointerWords) =>
    `Elevation ${fixedText(words.elevation, words.decimals)} ${elevationUnit(words.unitSystem, words.datum)}`,
  magnifier:
    'Magnified eight times. Drag to place to a tenth of a pixel, or use the arrow keys; with Shift a whole pixel.',
  magnified: '8 ×',
  finishLine: 'Finish line',
  takeBackPoint: 'Take back point',
  cancelLine: 'Cancel line',
  dismiss: 'Dismiss',
  lineActions: 'Line being drawn',
  lastStep: 'Last step',
} as const;
export const deskViewText = inLanguage({ en });
