import { inLanguage } from './language.ts';

/** Words of the desk as a page. */
const en = {
  drawingRevision: (number: string, revision: string) =>
    revision === '' ? number : `${number} rev ${revision}`,
  untitledDrawing: 'Drawing',
  sheetLabel: (section: string, drawing: string) => `${section} on drawing ${drawing}`,
  skipToSheet: 'Go to the sheet',
  panes: { sheet: 'Sheet', schedule: 'Schedule', notes: 'Notes', block: 'Title block' },
  formPane: 'Form',
  panesLabel: 'Parts of the desk',
  noticeClose: 'Close',
  loadCase: {
    title: 'Load case',
    name: 'Name of the load case',
    rename: 'Rename',
    renamed: 'The load case has a new name.',
    drawingLead: 'Section and sheet are changed on the page of the drawing.',
    drawing: 'Go to the drawing',
    copyTitle: 'Copy for another load case',
    copyLead: 'Traces, reading points and figures are copied; the known points are shared.',
    copyName: 'Name of the copy',
    copy: 'Copy and open',
    keepTitle: 'Keep a copy of the file',
    keepLead: 'The whole net as one file, with everything that was entered.',
    keep: 'Download the net',
    namingNeeded: 'Give it a name.',
  },
} as const;
export const deskPageText = inLanguage({ en });
