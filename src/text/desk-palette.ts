import type { BoundaryKind, ToolId } from '#client/features/desk/model/tool-choice.ts';
import { inLanguage } from './language.ts';

export type PaletteTool = ToolId | 'waterLevels';

/** The offer of a first guess of the phreatic line. */
const enFirstGuessText = {
  offer: 'Not on the drawing? Start from a guess by the geometry and adjust it.',
  draw: 'Draw a first guess',
  drew: 'drew a first guess of the phreatic line',
} as const;
export const firstGuessText = inLanguage({ en: enFirstGuessText });

/** Words of the tool palette. */
const enDeskPaletteText = {
  title: 'Drawing tools',
  setOut: 'Set out',
  trace: 'Trace',
  read: 'Read',
  undo: 'Undo',
  redo: 'Redo',
  undoTitle: (label: string | null) => (label === null ? 'Nothing to take back' : `Take back: ${label}`),
  redoTitle: (label: string | null) => (label === null ? 'Nothing to do again' : `Do again: ${label}`),
  readOnly: 'This net can be looked at but not changed here.',
  tools: {
    select: 'Choose and change',
    knownPoint: 'Known points',
    waterLevels: 'Water levels',
    equipotential: 'Equipotential',
    flowLine: 'Flow line',
    phreaticLine: 'Phreatic line',
    boundary: 'Boundary',
    readingPoint: 'Reading point',
    profile: 'Profile',
    soilPlace: 'Place of a soil',
    ruler: 'Ruler',
    note: 'Note',
  } satisfies Record<PaletteTool, string>,
  boundaries: {
    headwaterFace: 'Face under headwater',
    tailwaterFace: 'Face under tailwater',
    outflowFace: 'Face of free outflow',
    drain: 'Drain',
    impervious: 'Impervious',
    ground: 'Ground',
    soilBoundary: 'Soil boundary',
  } satisfies Record<BoundaryKind, string>,
  boundaryKinds: 'Kind of boundary',
  hints: {
    select:
      'Click a line or a point to choose it. Drag its vertices or the line itself, Shift and click chooses several, double-click a segment to put one in, Delete removes what is chosen.',
    knownPoint:
      'Click a place whose offset or elevation is printed on the drawing; it goes to the crossing of drawn lines, Alt stops that. Two set the section out, more check it.',
    equipotential:
      'Click along the line. It snaps to lines and ends; Alt or Ctrl stops that, Shift keeps level, plumb or 45°.',
    flowLine:
      'Click along the line, from boundary to boundary. Alt or Ctrl stops snapping, Shift keeps level, plumb or 45°.',
    phreaticLine: 'Click along the top of the flow, from the headwater face to the outlet.',
    boundary:
      'Click along the boundary. The net needs one under headwater and an outlet: tailwater, drain or free outflow.',
    readingPoint: 'Click where the pressure is wanted, or type its offset and elevation in the schedule.',
    profile:
      'Click along a base, a slip surface, a filter boundary or a borehole. It snaps to traced lines; Ctrl stops that, Shift keeps level, plumb or 45°.',
    soilPlace: 'Click inside each region of the soil. Backspace takes the last place back, Escape ends it.',
    note: 'Click a point, a line or a place to write a note about it.',
    ruler:
      'Click from place to place to measure. It snaps to traced lines; Ctrl stops that, Shift keeps level, plumb or 45°. Enter ends, Escape clears.',
  } satisfies Record<ToolId, string>,
  tracing: (kind: string, points: number) =>
    `Tracing: ${kind}, ${points} ${points === 1 ? 'point' : 'points'}.`,
  tracingKeys: 'Enter finishes the line, Backspace takes back the last point.',
  unfinishedLine: (kind: string) => `This ${kind} is unfinished. Enter goes on with it.`,
  chosenLine: (kind: string) => `Chosen: ${kind}.`,
  chosenDrops: (drops: string) => `${drops} ${drops === '1' ? 'drop' : 'drops'} down.`,
  chosenHead: (head: string, unit: string) => `Head ${head} ${unit}.`,
  chosenKeys: 'Drag a vertex to move it, double-click a segment to put one in, Delete removes.',
} as const;
export const deskPaletteText = inLanguage({ en: enDeskPaletteText });
