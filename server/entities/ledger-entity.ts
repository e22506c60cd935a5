import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { DecisionKind } from '#shared/contract/revisions.ts';
import { NetEntity } from './net-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A frozen net. Insert-only: status is derived from the decisions. */
@Entity('revision')
@Index('uq_revision_net_id_number', ['netId', 'number'], { unique: true })
@Index('uq_revision_net_id_previous_hash', ['netId', 'previousHash'], { unique: true })
export class RevisionEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NetEntity) @Column('uuid') netId!: string;
  @Column('integer') number!: number;
  @Column('text') label!: string;
  /** The net's change number at freezing: what came later is not in the payload. */
  @Column('bigint') changeNumber!: string;
  /** Canonical JSON (RFC 8785) of the payload; text, because jsonb would lose the sign of zero. */
  @Column('text') payload!: string;
  @Column('text') payloadHash!: string;
  @Column('text', { nullable: true }) previousHash!: string | null;
  @Column('text') engineVersion!: string;
  @Column('uuid', { array: true }) drawnBy!: string[];
  @ForeignKey(() => PersonEntity) @Column('uuid') sentBy!: string;
  @ForeignKey(() => PersonEntity) @Index('ix_revision_reviewer_id') @Column('uuid') reviewerId!: string;
  /** All whom it was sent to, the first of them `reviewerId`. It is accepted when each of them has accepted. */
  @Column('uuid', { array: true }) reviewerIds!: string[];
  /** The day by which the check is wanted. */
  @Column('date', { nullable: true }) dueOn!: string | null;
  @Column('text', { default: '' }) message!: string;
  /** Whether a blind reading was asked for; null for what was sent before there was one. */
  @Column('boolean', { nullable: true }) blindFirst!: boolean | null;
  @Column('timestamptz') sentAt!: Date;
}

/** A record of what became of a revision: a decision, or that it or its acceptance was withdrawn. Insert-only. */
@Entity('decision')
@Index('ix_decision_revision_id', ['revisionId'])
@Check(
  'ck_decision_decision',
  `decision IN ('accepted', 'acceptedWithNotes', 'returned', 'acceptanceWithdrawn', 'sendingWithdrawn')`,
)
export class DecisionEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => RevisionEntity) @Column('uuid') revisionId!: string;
  @Column('text') decision!: DecisionKind;
  @ForeignKey(() => PersonEntity) @Column('uuid') decidedBy!: string;
  @Column('text', { default: '' }) note!: string;
  /** Name and capacity as signed; empty where records were not signed yet, and where an engineer withdrew a sending. */
  @Column('text', { default: '' }) signedName!: string;
  @Column('text', { default: '' }) capacity!: string;
  @Column('timestamptz') decidedAt!: Date;
}

/** A mail that reminds the reviewers of a revision, once: on the day before it is due, or when that day has passed. */
@Entity('review_reminder')
@Index('uq_review_reminder_revision_id_kind', ['revisionId', 'kind'], { unique: true })
@Check('ck_review_reminder_kind', `kind IN ('dayBefore', 'overdue')`)
export class ReviewReminderEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => RevisionEntity) @Column('uuid') revisionId!: string;
  @Column('text') kind!: 'dayBefore' | 'overdue';
  @Column('timestamptz') at!: Date;
  /** When it was mailed, or found to be needless. */
  @Column('timestamptz', { nullable: true }) doneAt!: Date | null;
}

/** A file made from a revision, kept in storage by its hash. Insert-only. */
@Entity('artifact')
@Index('ix_artifact_revision_id', ['revisionId'])
export class ArtifactEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => RevisionEntity) @Column('uuid') revisionId!: string;
  @Column('text') kind!: string;
  @Column('text') storageKey!: string;
  @Column('text') sha256!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}
