import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { PersonEntity } from './person-entity.ts';

/** A mail to be sent, written in the transaction of what it announces. */
@Entity('outbox_mail')
@Index('ix_outbox_mail_state_next_attempt_at', ['state', 'nextAttemptAt'])
@Check('ck_outbox_mail_state', `state IN ('waiting', 'sent', 'failed')`)
export class OutboxMailEntity {
  @PrimaryColumn('uuid') id!: string;
  /** Fixed before the first try, so that a repeat after a crash is recognised as the same mail. */
  @Column('text') messageId!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) personId!: string | null;
  @Column('text') toAddress!: string;
  @Column('text') subject!: string;
  @Column('text') text!: string;
  @Column('text') html!: string;
  @Column('text', { default: 'waiting' }) state!: 'waiting' | 'sent' | 'failed';
  @Column('integer', { default: 0 }) attempts!: number;
  @Column('timestamptz', { default: () => 'now()' }) nextAttemptAt!: Date;
  @Column('timestamptz', { nullable: true }) leaseUntil!: Date | null;
  @Column('text', { default: '' }) lastError!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) sentAt!: Date | null;
}
