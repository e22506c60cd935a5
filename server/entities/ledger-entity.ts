import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
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
  @Column('text', { default: '' }) message!: string;
  @Column('timestamptz') sentAt!: Date;
}

/** What the reviewer decided. Insert-only. */
@Entity('decision')
@Index('ix_decision_revision_id', ['revisionId'])
@Check('ck_decision_decision', `decision IN ('accepted', 'returned')`)
export class DecisionEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => RevisionEntity) @Column('uuid') revisionId!: string;
  @Column('text') decision!: 'accepted' | 'returned';
  @ForeignKey(() => PersonEntity) @Column('uuid') decidedBy!: string;
  @Column('text', { default: '' }) note!: string;
  @Column('timestamptz') decidedAt!: Date;
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
