import type { NoteDto } from '#shared/contract/notes.ts';
import { DECISION_WORDS } from '#shared/text/decision-words.ts';
import type { SheetChapter, SheetDecision, SheetSource } from './content.ts';
import { momentText } from './words.ts';

/** The notes on the net with their answers. Null without notes. */
export function notesChapter({ notes }: SheetSource): SheetChapter | null {
  if (notes.length === 0) return null;
  return {
    id: 'notes',
    title: 'Notes and answers',
    blocks: notes.flatMap((note) => [
      { kind: 'paragraph', text: `Note ${note.number}, ${note.state}` } as const,
      { kind: 'list', items: note.entries.map(entryText) } as const,
    ]),
  };
}

const entryText = ({ author, at, text }: NoteDto['entries'][number]) =>
  `${author.name}, ${momentText(at)}: ${text}`;

/** Who drew, sent and decided, and by what the record is known. */
export function recordChapter({ status, engineVersion, drawnBy }: SheetSource): SheetChapter {
  const drawn = { label: 'Drawn by', value: drawnBy.join(', ') || 'nobody named' };
  const engine = { label: 'Reading engine', value: engineVersion };
  if (status.kind === 'draft')
    return {
      id: 'record',
      title: 'Decision and signatures',
      blocks: [
        { kind: 'facts', rows: [drawn, engine] },
        { kind: 'paragraph', text: 'A draft: not sent for checking, not checked, not signed.' },
      ],
    };
  return {
    id: 'record',
    title: 'Decision and signatures',
    blocks: [
      {
        kind: 'facts',
        rows: [
          drawn,
          { label: 'Sent by', value: `${status.sentBy}, ${momentText(status.sentAt)}` },
          { label: 'Sent to', value: status.reviewer },
          ...(status.message === '' ? [] : [{ label: 'Message', value: status.message }]),
          ...recordFacts(status),
          { label: 'SHA-256 of the record', value: status.hash },
          { label: 'SHA-256 of the one before', value: status.previousHash ?? 'none: the first revision' },
          engine,
        ],
      },
      {
        kind: 'boxes',
        boxes: [
          { label: 'Drawn: signature, date', value: '' },
          { label: 'Checked: signature, date', value: '' },
        ],
      },
    ],
  };
}

/** Each record with its signature and note, and that the decision is still wanted where it is. */
function recordFacts({ decision, records, reviewer }: Extract<SheetSource['status'], { kind: 'revision' }>) {
  const facts = records.flatMap((record) => [
    { label: 'Decision', value: signedText(record) },
    ...(record.note ? [{ label: noteLabel(record), value: record.note }] : []),
  ]);
  if (decision !== null) return facts;
  const none = records.length === 0 ? 'none yet, ' : '';
  return [...facts, { label: 'Decision', value: `${none}waiting for ${reviewer}` }];
}

function signedText({ decision, by, capacity, at }: SheetDecision): string {
  const { state } = DECISION_WORDS[decision];
  const who = [by, capacity].filter(Boolean).join(', ');
  return `${state} by ${who}, ${momentText(at)}${capacity ? ', signed by password' : ''}`;
}

const noteLabel = ({ decision }: SheetDecision) =>
  decision === 'sendingWithdrawn' || decision === 'acceptanceWithdrawn' ? 'Reason' : 'Note of the reviewer';

/**
 * The notes as they stood at a moment: what was written or closed later is left out, so that a decided revision gives
 * the same sheet for ever.
 */
export function notesUntil(notes: readonly NoteDto[], moment: string): NoteDto[] {
  return notes
    .filter((note) => note.createdAt <= moment)
    .map((note) => {
      const entries = note.entries.filter((entry) => entry.at <= moment);
      if (note.closedAt !== null && note.closedAt <= moment) return { ...note, entries };
      const state = entries.length > 1 ? 'answered' : 'open';
      return { ...note, entries, state, closedBy: null, closedAt: null } as const;
    });
}
