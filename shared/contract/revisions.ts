import * as z from 'zod/mini';
import { damAction } from './actions.ts';
import { openItem, openReason, stayedOpen } from './before-sending.ts';
import { checkListItem } from './check-list.ts';
import { id, personRef, timestamp } from './common.ts';
import { decisionKind } from './decision-kind.ts';
import { flowNetDocument } from './document.ts';
import { sheetDto } from './drawings.ts';
import { MAX_NOTE_LENGTH, MAX_OPEN_REASONS, MAX_PASSWORD_LENGTH } from './limits.ts';
import { noteDto } from './notes.ts';
import { finding, netReading } from './reading.ts';
import { checkDraftDto, reviewDto } from './review.ts';

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

export { type DecisionKind, decisionKind } from './decision-kind.ts';

export const MAX_REVIEWERS = 10;

export const sendInput = z.object({
  id,
  /** One or several; the revision is accepted when each of them has accepted, and returned when one returns it. */
  reviewerIds: z.array(id).check(z.minLength(1), z.maxLength(MAX_REVIEWERS)),
  /** The day by which the check is wanted, YYYY-MM-DD. */
  dueOn: z._default(z.nullable(z.iso.date()), null),
  message: z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH)),
  /** A reason for each item that is still open; one that is open without a reason is asked for. */
  reasons: z._default(z.array(openReason).check(z.maxLength(MAX_OPEN_REASONS)), []),
  /** Asks the reviewers to read points on the net alone first: the mail then tells no figures. */
  blindFirst: z._default(z.boolean(), false),
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
  /** Whom it was sent to for checking, the first of them also by itself. */
  reviewer: personRef,
  reviewers: z.array(personRef),
  /** The day by which the check was wanted; null where none was named. */
  dueOn: z.nullable(z.string()),
  sentAt: timestamp,
  message: z.string(),
  /** Whether a blind reading was asked for; null where there was none yet, and the figures were never kept back. */
  blindFirst: z.nullable(z.boolean()),
  /** What was open when it was sent, with the engineer's reasons; null where nobody was asked, before that was kept. */
  stayedOpen: z.nullable(z.array(stayedOpen)),
  /** Hash of the revision before it in the same net; null for the first. */
  previousHash: z.nullable(z.string()),
});
export type RevisionPayload = z.infer<typeof revisionPayload>;

/** What the records of a revision come to. */
export const revisionState = z.enum([
  'waiting',
  'accepted',
  'acceptedWithNotes',
  'returned',
  'acceptanceWithdrawn',
  'withdrawn',
]);
export type RevisionState = z.infer<typeof revisionState>;

export const decisionDto = z.object({
  id,
  decision: decisionKind,
  decidedBy: personRef,
  /** As signed; empty where it was not signed. */
  signedName: z.string(),
  capacity: z.string(),
  note: z.string(),
  decidedAt: timestamp,
});
export type DecisionDto = z.infer<typeof decisionDto>;

export const revisionSummary = z.object({
  id,
  label: z.string(),
  sentBy: personRef,
  sentAt: timestamp,
  reviewer: personRef,
  reviewers: z.array(personRef),
  dueOn: z.nullable(z.string()),
  state: revisionState,
  /** The record that settled the state; null while it waits. */
  decision: z.nullable(decisionDto),
  /** All records, oldest first. */
  decisions: z.array(decisionDto),
  /** Label of the accepted revision that took the place of this accepted one; null for one that is not superseded. */
  supersededBy: z.nullable(z.string()),
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
  /** Whether the reader may withdraw the acceptance, or the sending. */
  canWithdrawAcceptance: z.boolean(),
  canWithdrawSending: z.boolean(),
  /** Who opened the figures when, blind readings, and what the decisions froze of the check. */
  review: reviewDto,
  /** The check list and the reader's own ticks and answers; null for who may not decide. */
  checking: z.nullable(z.object({ checkList: z.array(checkListItem), draft: checkDraftDto })),
});
export type RevisionDto = z.infer<typeof revisionDto>;

const signature = {
  /** The signer's password, entered again; it is checked and not kept. */
  password: z.string().check(z.maxLength(MAX_PASSWORD_LENGTH)),
  /** In what capacity the signer signs: "Senior dam engineer, CEng". */
  capacity: z.string().check(z.trim(), z.minLength(1), z.maxLength(200)),
};

export const decisionInput = z.object({
  decision: z.enum(['accepted', 'acceptedWithNotes', 'returned']),
  note: z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH)),
  ...signature,
});

const withdrawalReason = z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_NOTE_LENGTH));
export const acceptanceWithdrawalInput = z.object({ reason: withdrawalReason, ...signature });
export const sendingWithdrawalInput = z.object({ reason: withdrawalReason });
