import * as z from 'zod/mini';
import { damAction } from './actions.ts';
import { openItem, openReason, stayedOpen } from './before-sending.ts';
import { id, personRef, timestamp } from './common.ts';
import { flowNetDocument } from './document.ts';
import { sheetDto } from './drawings.ts';
import { MAX_NOTE_LENGTH, MAX_OPEN_REASONS } from './limits.ts';
import { noteDto } from './notes.ts';
import { finding, netReading } from './reading.ts';

/** `GET /nets/:netId/sending`: what to know before sending for checking. */
export const sendingDto = z.object({
  reviewers: z.array(z.object({ person: personRef, email: z.string(), drew: z.boolean() })),
  /** What withholds the figures of an unfinished net; empty for one that can be sent. */
  findings: z.array(finding),
  /** What is still open on a finished net: each needs a reason if it stays. */
  open: z.array(openItem),
  /** Null when it may be sent; otherwise the sentence that says what stands in the way. */
  refusal: z.nullable(z.string()),
  nextLabel: z.string(),
});
export type SendingDto = z.infer<typeof sendingDto>;

export const sendInput = z.object({
  id,
  reviewerId: id,
  message: z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH)),
  /** A reason for each item that is still open; one that is open without a reason is asked for. */
  reasons: z._default(z.array(openReason).check(z.maxLength(MAX_OPEN_REASONS)), []),
  /** Newest change the sender saw; a later one by someone else is a conflict and nothing is sent. */
  changeNumber: z.number(),
});

/** Frozen content of a revision, stored as canonical JSON (RFC 8785). Shown as frozen, never recomputed. */
export const revisionPayload = z.object({
  payloadVersion: z.literal(1),
  revisionId: id,
  netId: id,
  netName: z.string(),
  label: z.string(),
  dam: z.object({ id, name: z.string(), datum: z.string() }),
  drawing: z.object({ id, number: z.string(), title: z.string(), revision: z.string(), sha256: z.string() }),
  section: z.object({ id, name: z.string(), chainage: z.string() }),
  sheet: z.object({ id, pageNumber: z.number() }),
  document: flowNetDocument,
  reading: netReading,
  engineVersion: z.string(),
  drawnBy: z.array(personRef),
  sentBy: personRef,
  /** Whom it was sent to for checking. */
  reviewer: personRef,
  sentAt: timestamp,
  message: z.string(),
  /** What was open when it was sent, with the engineer's reasons; null where nobody was asked, before that was kept. */
  stayedOpen: z.nullable(z.array(stayedOpen)),
  /** Hash of the revision before it in the same net; null for the first. */
  previousHash: z.nullable(z.string()),
});
export type RevisionPayload = z.infer<typeof revisionPayload>;

export const decisionDto = z.object({
  decision: z.enum(['accepted', 'returned']),
  decidedBy: personRef,
  note: z.string(),
  decidedAt: timestamp,
});

export const revisionSummary = z.object({
  id,
  label: z.string(),
  sentBy: personRef,
  sentAt: timestamp,
  reviewer: personRef,
  decision: z.nullable(decisionDto),
  hash: z.string(),
});
export type RevisionSummary = z.infer<typeof revisionSummary>;
export const revisionListDto = z.object({ items: z.array(revisionSummary) });

export const revisionDto = z.object({
  summary: revisionSummary,
  payload: revisionPayload,
  sheet: sheetDto,
  notes: z.array(noteDto),
  can: z.array(damAction),
  /** Null when the reader may decide; otherwise the sentence that says why not. */
  decideRefusal: z.nullable(z.string()),
});
export type RevisionDto = z.infer<typeof revisionDto>;

export const decisionInput = z.object({
  decision: z.enum(['accepted', 'returned']),
  note: z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH)),
});
