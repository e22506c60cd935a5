import type { NoteAnchor } from '#shared/contract/notes.ts';

/** What the canvas asks of the panels around it: to open a form or to begin a note. */
export type DeskIntent =
  | { type: 'writeNote'; anchor: NoteAnchor }
  | { type: 'openNote'; noteId: string }
  | { type: 'nextOpenNote' }
  | { type: 'openKnownPoint'; id: string }
  | { type: 'openReadingPoint'; id: string }
  | { type: 'openMeasured'; id: string }
  | { type: 'openReading'; id: string }
  | { type: 'openLine'; id: string }
  | { type: 'openWaterLevels' }
  /** A line of the computed net was clicked, by its guide. */
  | { type: 'pickComputedLine'; guideId: string }
  | { type: 'showLines' }
  | { type: 'tellPlace' }
  /** Shows the crosshair or puts it away; or lets its place be typed. */
  | { type: 'crosshair'; wants: 'toggle' | 'place' }
  | { type: 'listKeys' }
  | { type: 'openTable' };
