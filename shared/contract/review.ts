import * as z from 'zod/mini';
import { answeredItem, checkListAnswer, MAX_CHECK_LIST_ITEMS } from './check-list.ts';
import { id, personRef, timestamp } from './common.ts';
import { decisionKind } from './decision-kind.ts';
import { flowNetDocument, sheetPoint } from './document.ts';
import { sheetDto } from './drawings.ts';
import { MAX_FIGURE, MAX_NOTE_LENGTH } from './limits.ts';
import { setOutReading } from './reading.ts';

/**
 * What a reviewer does on a revision before deciding: reads points on the net alone, ticks figures, answers the check
 * list. What is sealed is a record of the revision, insert-only and chained; ticks and answers are kept as a draft
 * until the decision freezes them.
 */

/** Points of one blind reading: a schedule has some dozens. */
export const MAX_BLIND_POINTS = 500;
/** Ticks that one change may set or take away: "tick all" of a long schedule with its profiles. */
export const MAX_TICKS = 5000;

const remark = z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH));

/** A reviewer's ticks and answers while checking, as the server keeps them. */
export const checkDraftDto = z.object({ ticks: z.array(z.string()), answers: z.array(checkListAnswer) });
export type CheckDraft = z.infer<typeof checkDraftDto>;

const tickKeys = z._default(z.array(z.string().check(z.maxLength(200))).check(z.maxLength(MAX_TICKS)), []);
/** A change of the draft: only what it names is changed, so that two windows do not undo one another. */
export const checkDraftPatch = z.object({
  ticked: tickKeys,
  unticked: tickKeys,
  answers: z._default(z.array(checkListAnswer).check(z.maxLength(MAX_CHECK_LIST_ITEMS)), []),
});

/** What the decision froze of the check. `ticked`: the reviewer ticked the figure. */
export const checkedFigure = z.object({
  key: z.string(),
  /** What it is a figure of: a point, the title block, a profile. */
  of: z.string(),
  what: z.string(),
  value: z.string(),
  ticked: z.boolean(),
});
export type CheckedFigure = z.infer<typeof checkedFigure>;
export const frozenCheck = z.object({ figures: z.array(checkedFigure), checkList: z.array(answeredItem) });
export type FrozenCheck = z.infer<typeof frozenCheck>;

const figure = z.number().check(z.gte(-MAX_FIGURE), z.lte(MAX_FIGURE));
const positive = z.number().check(z.positive(), z.lte(MAX_FIGURE));

/** One point as the reviewer read it: the drops counted, or the head, one of the two. */
export const blindPointInput = z.object({
  pointId: id,
  /** Where the reviewer placed it on the sheet, base-raster pixels; null when it was typed. */
  sheetAt: z.nullable(sheetPoint),
  offset: z.nullable(figure),
  elevation: figure,
  dropsLost: z.nullable(figure),
  totalHead: z.nullable(figure),
  remark,
});
export type BlindPointInput = z.infer<typeof blindPointInput>;

export const blindReadingInput = z.object({
  /** Drops Nd of the whole net, by the reviewer's own count; null where every head was read itself. */
  drops: z.nullable(positive),
  /** Head at the outlet to which they were counted: the tailwater, or what the reviewer takes where there is none. */
  outletHead: z.nullable(figure),
  points: z.array(blindPointInput).check(z.minLength(1), z.maxLength(MAX_BLIND_POINTS)),
});

export const blindPoint = z.object({
  pointId: id,
  name: z.string(),
  sheetAt: z.nullable(sheetPoint),
  offset: z.nullable(z.number()),
  elevation: z.number(),
  dropsLost: z.nullable(z.number()),
  totalHead: z.number(),
  porePressure: z.number(),
  remark: z.string(),
});
export type BlindPoint = z.infer<typeof blindPoint>;

/** A sealed blind reading. Heads in the document's length unit, pressures in kPa or lb/ft². */
export const blindReading = z.object({
  /** When the reviewer asked to see where the engineer's points lie; null when they were placed without. */
  placesShownAt: z.nullable(timestamp),
  /** Whether the mail about the revision told the main figures, so that the reviewer may have read them there. */
  figuresMailed: z.boolean(),
  drops: z.nullable(z.number()),
  headwater: z.nullable(z.number()),
  outletHead: z.nullable(z.number()),
  gammaW: z.number(),
  points: z.array(blindPoint),
});
export type BlindReading = z.infer<typeof blindReading>;

const recordBase = {
  recordVersion: z.literal(1),
  revisionId: id,
  /** Hash of the revision's payload. */
  revisionHash: z.string(),
  number: z.number(),
  /** Hash of the record before it; of the first record the revision's own. */
  previousHash: z.string(),
  person: personRef,
  at: timestamp,
};

/** A record of a revision besides its payload, stored as canonical JSON (RFC 8785). */
export const reviewRecord = z.discriminatedUnion('kind', [
  /** The reviewer asked to see where the engineer's points lie, without their figures. */
  z.object({ ...recordBase, kind: z.literal('placesShown') }),
  /** The reviewer opened the figures without reading blind. */
  z.object({ ...recordBase, kind: z.literal('figuresOpened') }),
  z.object({ ...recordBase, kind: z.literal('blindReading'), reading: blindReading }),
  z.object({
    ...recordBase,
    kind: z.literal('decision'),
    decisionId: id,
    decision: decisionKind,
    note: z.string(),
    signedName: z.string(),
    capacity: z.string(),
    /** Null for a withdrawal, which checks nothing. */
    check: z.nullable(frozenCheck),
  }),
]);
export type ReviewRecord = z.infer<typeof reviewRecord>;
export type ReviewKind = ReviewRecord['kind'];

const recorded = { person: personRef, at: timestamp, hash: z.string() };
/** The records of a revision as its page shows them, oldest first. */
export const reviewDto = z.object({
  openings: z.array(z.object(recorded)),
  blindReadings: z.array(z.object({ ...recorded, reading: blindReading })),
  checks: z.array(
    z.object({ ...recorded, decisionId: id, decision: decisionKind, check: z.nullable(frozenCheck) }),
  ),
});
export type ReviewDto = z.infer<typeof reviewDto>;

/** What is shown to who reads blind: lines, calibration and levels, no figure of the engineer's. */
export const blindView = z.object({
  revisionId: id,
  label: z.string(),
  netId: id,
  netName: z.string(),
  dam: z.object({ id, name: z.string() }),
  drawing: z.object({ id, number: z.string(), revision: z.string() }),
  section: z.object({ name: z.string(), chainage: z.string() }),
  pageNumber: z.number(),
  sentBy: personRef,
  sentAt: timestamp,
  sheet: sheetDto,
  document: flowNetDocument,
  setOut: setOutReading,
  /** The engineer's points by name; their places only once they were asked for. */
  points: z.array(z.object({ id, name: z.string(), at: z.nullable(sheetPoint) })),
  placesShown: z.boolean(),
  levels: z.object({
    headwater: z.nullable(z.number()),
    tailwater: z.nullable(z.number()),
    gammaW: z.number(),
  }),
  /** The engineer asked for a blind reading. */
  asked: z.boolean(),
  figuresMailed: z.boolean(),
});
export type BlindView = z.infer<typeof blindView>;

/** `GET /revisions/:revisionId/blind`: whether the figures are kept back from the reader, and what is shown meanwhile. */
export const blindDto = z.object({ view: z.nullable(blindView) });
