import type { SheetChapter, SheetSource } from './content.ts';

/** What was open when the revision was sent, each with the engineer's reason. Null for a draft and where nothing was. */
export function stayedOpenChapter({ status }: SheetSource): SheetChapter | null {
  if (status.kind === 'draft' || status.stayedOpen === null) return null;
  if (status.stayedOpen.length === 0) return null;
  return {
    id: 'stayed-open',
    title: 'Left open when it was sent',
    blocks: [
      {
        kind: 'table',
        caption: 'What the checks and the inputs left open, and why it stays',
        columns: [
          { label: 'Open', align: 'left', weight: 1 },
          { label: 'Reason of the engineer', align: 'left', weight: 1 },
        ],
        rows: status.stayedOpen.map(({ text, reason }) => [text, reason]),
      },
    ],
  };
}
