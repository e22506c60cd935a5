import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { CheckListAnswer } from '#shared/contract/check-list.ts';
import type { ReviewKind } from '#shared/contract/review.ts';
import { RevisionEntity } from './ledger-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A record of a revision: what a reviewer opened, read blind, or decided. Insert-only, chained by hash. */
@Entity('review_record')
@Index('uq_review_record_revision_id_number', ['revisionId', 'number'], { unique: true })
@Index('uq_review_record_revision_id_previous_hash', ['revisionId', 'previousHash'], { unique: true })
@Check('ck_review_record_kind', `kind IN ('placesShown', 'figuresOpened', 'blindReading', 'decision')`)
export class ReviewRecordEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => RevisionEntity) @Column('uuid') revisionId!: string;
  /** From 1 on, in the order in which they were made. */
  @Column('integer') number!: number;
  @Column('text') kind!: ReviewKind;
  @ForeignKey(() => PersonEntity) @Column('uuid') personId!: string;
  @Column('timestamptz') at!: Date;
  /** Canonical JSON (RFC 8785). */
  @Column('text') payload!: string;
  @Column('text') payloadHash!: string;
  /** Hash of the record before it; of the first one the revision's. */
  @Column('text') previousHash!: string;
}

/** A reviewer's ticks and answers until the decision freezes them. */
@Entity('check_draft')
export class CheckDraftEntity {
  @ForeignKey(() => RevisionEntity) @PrimaryColumn('uuid') revisionId!: string;
  @ForeignKey(() => PersonEntity) @PrimaryColumn('uuid') personId!: string;
  @Column('text', { array: true, default: {} }) ticks!: string[];
  @Column('jsonb', { default: [] }) answers!: CheckListAnswer[];
  @Column('timestamptz') changedAt!: Date;
}
