import type { NoteDto } from '#shared/contract/notes.ts';
import type { RevisionPayload, RevisionSummary } from '#shared/contract/revisions.ts';
import type { SheetSource } from './content.ts';
import { notesUntil } from './record.ts';

/** What a revision's sheet is made from: the frozen payload, the decision, and the notes up to it. */
export function revisionSource({
  payload,
  hash,
  decision,
  notes,
  jobNumber,
}: {
  payload: RevisionPayload;
  hash: string;
  decision: RevisionSummary['decision'];
  notes: readonly NoteDto[];
  jobNumber: string;
}): SheetSource {
  const { dam, drawing, section, netName, document, reading, engineVersion } = payload;
  return {
    status: {
      kind: 'revision',
      label: payload.label,
      hash,
      previousHash: payload.previousHash,
      sentAt: payload.sentAt,
      sentBy: payload.sentBy.name,
      reviewer: payload.reviewer.name,
      message: payload.message,
      stayedOpen: payload.stayedOpen,
      decision: decision && {
        decision: decision.decision,
        by: decision.decidedBy.name,
        note: decision.note,
        at: decision.decidedAt,
      },
    },
    jobNumber,
    dam,
    drawing,
    section,
    pageNumber: payload.sheet.pageNumber,
    netName,
    document,
    reading,
    engineVersion,
    drawnBy: payload.drawnBy.map((person) => person.name),
    notes: decision === null ? notes : notesUntil(notes, decision.decidedAt),
  };
}
