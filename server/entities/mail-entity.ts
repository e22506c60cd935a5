import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { MailKind, MailState } from '#shared/contract/mails.ts';
import { DamEntity } from './dam-entity.ts';
import { RevisionEntity } from './ledger-entity.ts';
import { PersonEntity } from './person-entity.ts';

/**
 * A daily digest that is being gathered, or was made. A person has at most one that is open; whoever makes it closes
 * it in the transaction that writes the digest's mail, so that each notice is told once.
 */
@Entity('mail_digest')
@Index('uq_mail_digest_person_id_open', ['personId'], { unique: true, where: 'done_at IS NULL' })
export class MailDigestEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') personId!: string;
  @Column('timestamptz') dueAt!: Date;
  @Column('timestamptz', { nullable: true }) doneAt!: Date | null;
}

/** A mail to be sent, written in the transaction of what it announces. */
@Entity('outbox_mail')
@Index('ix_outbox_mail_state_next_attempt_at', ['state', 'nextAttemptAt'])
@Check('ck_outbox_mail_state', `state IN ('waiting', 'sent', 'failed', 'held', 'inDigest', 'dropped')`)
export class OutboxMailEntity {
  @PrimaryColumn('uuid') id!: string;
  /** Fixed before the first try, so that a repeat after a crash is recognised as the same mail. */
  @Column('text') messageId!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) personId!: string | null;
  @Column('text') toAddress!: string;
  /** Empty for mails written before kinds were kept. */
  @Column('text', { default: '' }) kind!: MailKind | '';
  /** The dam it tells of, which a reader of a later digest must still belong to. */
  @ForeignKey(() => DamEntity) @Column('uuid', { nullable: true }) damId!: string | null;
  /** The revision whose section is shown in it as a picture, which is made when the mail is sent. */
  @ForeignKey(() => RevisionEntity) @Column('uuid', { nullable: true }) revisionId!: string | null;
  /** What a digest says of it. */
  @Column('text', { default: '' }) brief!: string;
  /** Where a digest leads for it; kept only with mails that may wait, which carry no link that works once. */
  @Column('text', { default: '' }) link!: string;
  /** The digest that it waits for or went out with; of a digest's own mail, that digest. */
  @ForeignKey(() => MailDigestEntity)
  @Index('ix_outbox_mail_digest_id')
  @Column('uuid', { nullable: true })
  digestId!: string | null;
  @Column('text') subject!: string;
  @Column('text') text!: string;
  @Column('text') html!: string;
  @Column('text', { default: 'waiting' }) state!: MailState;
  @Column('integer', { default: 0 }) attempts!: number;
  @Column('timestamptz', { default: () => 'now()' }) nextAttemptAt!: Date;
  @Column('timestamptz', { nullable: true }) leaseUntil!: Date | null;
  @Column('text', { default: '' }) lastError!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) sentAt!: Date | null;
}
