import { inLanguage } from './language.ts';

/** Words of the panes about the sheet, and of finding one's way in a long schedule. */
const en = {
  panes: {
    size: {
      tools: 'Width of the tools',
      figures: 'Height of the tables',
      margin: 'Width of the margin',
    },
    help: 'Drag to resize, double-click for the usual size. Keys: arrows, Home and End, Enter folds.',
    sizeOf: (px: number) => `${px} pixels`,
    folded: 'folded',
    fold: { tools: 'Fold the tools', figures: 'Fold the tables', margin: 'Fold the margin' },
    unfold: { tools: 'Show the tools', figures: 'Show the tables', margin: 'Show the margin' },
  },
  schedule: {
    filter: 'Find a point',
    filterHelp: 'Enter shows the first on the sheet',
    found: (shown: number, all: number) => `${shown} of ${all}`,
    none: 'No point has this in its name.',
    clear: 'Show all',
    columns: 'Columns',
    columnsTitle: 'Columns shown',
    allColumns: 'Show all columns',
    showOnSheet: (name: string) => `Show ${name} on the sheet`,
  },
} as const;

export const { panes: panesText, schedule: scheduleViewText } = inLanguage({ en });
