import { inLanguage } from './language.ts';

/** What one wants to do with a key: the order in which the list of keys tells them. */
const GROUPS = {
  about: 'Get about',
  tools: 'Take up a tool',
  crosshair: 'Point without a mouse',
  draw: 'Draw and place',
  chosen: 'Change what is chosen',
  view: 'See the sheet',
} as const;

/** What each key does; the records of the keys name one of these each. */
const DOES = {
  listKeys: 'Show this list',
  nextPart: 'Go to the next part of the desk: tools, sheet, schedule, margin',
  previousPart: 'Go to the part before',
  linesTable: 'Lines and points as a table',
  listLines: 'What is on the sheet by kind: hide and lock',
  nextOpenNote: 'Go to the next open note',
  tellPlace: 'Tell what stands at the crosshair or the pointer',
  waterLevels: 'Water levels',
  knownPoint: 'Known points',
  equipotential: 'Equipotential',
  flowLine: 'Flow line',
  phreaticLine: 'Phreatic line',
  boundary: 'Boundary',
  readingPoint: 'Reading point',
  profile: 'Profile',
  soilPlace: 'Place of a soil',
  ruler: 'Ruler',
  note: 'Note',
  select: 'Lay the tool down: choose and move',
  crosshair: 'Show the crosshair, or put it away',
  typePlace: 'Type the place of the crosshair',
  stepCrosshair: 'Move the crosshair one pixel of the screen; with a tool in hand they show it first',
  strideCrosshair: 'Move the crosshair ten pixels',
  fineCrosshair: 'Move the crosshair a tenth of a pixel of the sheet; it then snaps to nothing',
  click: 'Set a point, choose, or take hold of what is chosen; again to let go',
  clickMore: 'Choose more, or begin a frame around what is to be chosen',
  clickFree: 'Set a point without snapping',
  insertVertex: 'Put a point into the chosen line at the crosshair',
  leaveHold: 'Leave what the crosshair holds where it was; else put the crosshair away',
  finish: 'Finish the line; go on with a chosen unfinished one; let go',
  takeBack: 'Take back the last point; remove what is chosen',
  cancel: 'Cancel; lay the tool down',
  leaveEdit: 'Leave what is asked for',
  drawingWay: 'Next way of drawing: straight, curve, freehand, along the ink',
  nudge: 'Move what is chosen one pixel of the sheet, while no crosshair is shown',
  nudgeFar: 'Move what is chosen ten pixels',
  remove: 'Remove the chosen point of a line, or what is chosen',
  split: 'Split the chosen line',
  join: 'Join it to another',
  trim: 'Trim it',
  extend: 'Extend it',
  reverse: 'Turn it round',
  smooth: 'Smooth it',
  chooseAll: 'Choose everything that is shown',
  copy: 'Copy what is chosen',
  paste: 'Paste it',
  duplicate: 'Copy and paste in one',
  undo: 'Undo',
  redo: 'Redo',
  pan: 'Move the sheet, with nothing chosen and no tool in hand',
  panFar: 'Move the sheet far',
  holdSheet: 'Held down, with the mouse: drag the sheet',
  zoomIn: 'Zoom in',
  zoomOut: 'Zoom out',
  fit: 'Show the whole section',
  grid: 'Show or hide the grid of offsets and elevations',
} as const;

const en = {
  title: 'Keys',
  open: 'Keys',
  close: 'Close',
  lead: 'Letters work anywhere on the desk but in a field; arrow keys, Space and Enter where the sheet has the focus.',
  groups: GROUPS,
  does: DOES,
  names: {
    ' ': 'Space',
    Escape: 'Esc',
  } as Readonly<Record<string, string>>,
  arrows: 'Arrow keys',
  ctrl: 'Ctrl',
  alt: 'Alt',
  shift: 'Shift',
  or: 'or',
} as const;
export const keysText = inLanguage({ en });

export type KeyGroup = keyof typeof GROUPS;
export type KeyId = keyof typeof DOES;

const enCrosshair = {
  title: 'Crosshair',
  shown:
    'Crosshair shown. Arrow keys move it, Space clicks, Q tells what is there, question mark lists all keys.',
  holds: 'Held. Arrow keys move it, Space lets go, Escape leaves it where it was.',
  hint: 'Arrow keys move it, Space clicks',
  holdHint: 'Arrow keys move what is held, Space lets go',
  x: 'x, px',
  y: 'y, px',
  offset: (unit: string) => `Offset, ${unit}`,
  elevation: (unit: string) => `Elevation, ${unit}`,
  go: 'Go there',
  putAway: 'Put away',
  oneNeeded: 'Type at least one of the two figures.',
  offSheet: 'That place lies off the sheet.',
  onLine: (line: string, point: number | null, count: number) =>
    point === null ? `On ${line}` : `Point ${point} of ${count} of ${line}`,
  onMark: (name: string) => `At ${name}`,
} as const;
export const crosshairText = inLanguage({ en: enCrosshair });
