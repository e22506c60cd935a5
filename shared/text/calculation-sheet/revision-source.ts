import type { NoteDto } from '#shared/contract/notes.ts';
import type { ReviewDto } from '#shared/contract/review.ts';
import type { DecisionDto, RevisionPayload, RevisionSummary } from '#shared/contract/revisions.ts';
import { namesText } from '#shared/text/names-text.ts';
import type { SheetDecision, SheetSource } from './content.ts';
import { notesUntil } from './record.ts';

/** What a revision's sheet is made from: the frozen payload, the decision, and the notes up to it. */
export function revisionSource({
  payload,
  hash,
  summary: { decision, decisions },
  review,
  notes,
  jobNumber,
}: {
  payload: RevisionPayload;
  hash: string;
  summary: Pick<RevisionSummary, 'decision' | 'decisions'>;
  review: ReviewDto;
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
      reviewer: namesText(payload.reviewers),
      message: payload.message,
      stayedOpen: payload.stayedOpen,
      decision: decision && sheetDecision(decision),
      records: decisions.map(sheetDecision),
      review,
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

/** Under the name that was signed with, which later changes of the person's name leave as it is. */
const sheetDecision = ({
  decision,
  decidedBy,
  signedName,
  capacity,
  note,
  decidedAt,
}: DecisionDto): SheetDecision => ({
  decision,
  by: signedName || decidedBy.name,
  capacity,
  note,
  at: decidedAt,
});
