import { inLanguage } from './language.ts';

/** Words of the desk's model: what is said when a step cannot be taken, and how steps taken back are named. */
const en = {
  readOnly: 'This net can be looked at but not changed here.',
  inConflict:
    'Someone else changed this meanwhile. Compare the two versions and choose one before you change it again.',
  nothingToUndo: 'There is nothing to take back.',
  nothingToRedo: 'There is nothing to do again.',
  changedSince: (label: string) =>
    `Cannot take back “${label}”: it was changed since, by someone else or in another window. The step before it can be taken back next.`,
  severalRefused: (more: number, first: string) =>
    `${first} So it was with ${more} more ${more === 1 ? 'step' : 'steps'}.`,
  undone: (label: string) => `Took back: ${label}`,
  redone: (label: string) => `Did again: ${label}`,
  keptMine: 'Put my version on top',
} as const;
export const deskCanvasText = inLanguage({ en });
