import type { StayedOpen } from '#shared/contract/before-sending.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { ReviewDto } from '#shared/contract/review.ts';
import type { DecisionKind } from '#shared/contract/revisions.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { cautionsChapter } from './cautions.ts';
import { checkChapter } from './check.ts';
import { doubtChapter } from './doubt.ts';
import { inputsChapter } from './inputs.ts';
import { methodChapter } from './method.ts';
import { netCheckChapter } from './net-check.ts';
import { exitsChapter, profilesChapter } from './profiles.ts';
import { notesChapter, recordChapter } from './record.ts';
import { resultsChapter } from './results.ts';
import { type SectionFigure, sectionFigure } from './section-figure.ts';
import { stayedOpenChapter } from './stayed-open.ts';
import { titleBlock } from './title-block.ts';
import { validityChapter } from './validity.ts';

/** What a reviewer decided, or a withdrawal, as the sheet prints it. */
export interface SheetDecision {
  decision: DecisionKind;
  by: string;
  /** In what capacity it was signed; empty for what was not signed. */
  capacity: string;
  note: string;
  at: string;
}

/** Where the figures come from: a frozen revision, or the net as it stood at a moment. */
export type SheetStatus =
  | { kind: 'draft'; at: string }
  | {
      kind: 'revision';
      label: string;
      hash: string;
      previousHash: string | null;
      sentAt: string;
      sentBy: string;
      reviewer: string;
      message: string;
      /** Null for a revision that was sent before it was asked for. */
      stayedOpen: readonly StayedOpen[] | null;
      /** What settled the revision; null while it waits. */
      decision: SheetDecision | null;
      /** All records, oldest first: of several reviewers, and of what was withdrawn. */
      records: readonly SheetDecision[];
      /** What the reviewers did before they decided; nothing of what was sent before it was recorded. */
      review: ReviewDto;
    };

/** Everything that a calculation sheet is made from. Nothing is worked out anew: all figures are the reading's. */
export interface SheetSource {
  status: SheetStatus;
  jobNumber: string;
  dam: { name: string };
  drawing: { number: string; title: string; revision: string; sha256: string };
  section: { name: string; chainage: string };
  pageNumber: number;
  netName: string;
  document: FlowNetDocument;
  reading: NetReading;
  engineVersion: string;
  drawnBy: readonly string[];
  notes: readonly NoteDto[];
}

export interface SheetFact {
  label: string;
  value: string;
}
export interface SheetColumn {
  label: string;
  align: 'left' | 'right';
  /** Share of the width beside the other columns. */
  weight: number;
}
/** A curve over a distance; null parts it where nothing is read. */
export interface SheetDiagram {
  caption: string;
  across: string;
  up: string;
  points: ReadonlyArray<readonly [across: number, up: number | null]>;
}
/** A part of a chapter. Texts may hold raised and lowered runs, see `rich-text.ts`. */
export type SheetBlock =
  | { kind: 'paragraph'; text: string }
  | { kind: 'list'; items: readonly string[] }
  | { kind: 'facts'; rows: readonly SheetFact[] }
  | {
      kind: 'table';
      caption: string;
      columns: readonly SheetColumn[];
      rows: ReadonlyArray<readonly string[]>;
    }
  | { kind: 'diagram'; diagram: SheetDiagram }
  | { kind: 'boxes'; boxes: readonly SheetFact[] };

export interface SheetChapter {
  id: string;
  title: string;
  blocks: readonly SheetBlock[];
}

/** The calculation sheet as it is printed and shown: one content for the PDF and for the screen. */
export interface SheetContent {
  title: string;
  subject: string;
  author: string;
  language: string;
  isDraft: boolean;
  /** At the foot of every page, before "page n of m": revision and hash. */
  foot: string;
  figure: SectionFigure | null;
  titleBlock: readonly SheetFact[];
  chapters: readonly SheetChapter[];
}

/** Makes the content of a calculation sheet. The same source gives the same content. */
export function sheetContent(source: SheetSource): SheetContent {
  const { status, dam, section, drawing, netName } = source;
  const place = sectionLabel(section);
  const chapters = [
    validityChapter,
    resultsChapter,
    inputsChapter,
    methodChapter,
    doubtChapter,
    netCheckChapter,
    profilesChapter,
    exitsChapter,
    stayedOpenChapter,
    notesChapter,
    checkChapter,
    recordChapter,
    cautionsChapter,
  ];
  return {
    title: `Calculation sheet, ${dam.name}, ${place}, ${netName}`,
    subject: ['Flow net', drawing.number, drawing.title].filter(Boolean).join(', '),
    author: source.drawnBy.join(', '),
    language: 'en-GB',
    isDraft: status.kind === 'draft',
    foot:
      status.kind === 'draft'
        ? 'DRAFT, not a revision, no hash'
        : `Revision ${status.label}, SHA-256 ${status.hash}`,
    figure: sectionFigure(source.document, source.reading),
    titleBlock: titleBlock(source),
    chapters: chapters.map((chapter) => chapter(source)).filter((chapter) => chapter !== null),
  };
}
