import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { MailTiming } from '#shared/contract/mails.ts';

/** Someone who signs in. Without a password hash the person is invited and has not accepted yet. */
@Entity('person')
@Index('uq_person_email', ['email'], { unique: true })
@Check('ck_person_email_lower', 'email = lower(email)')
@Check('ck_person_mail_timing', `mail_timing IN ('atOnce', 'daily', 'off')`)
export class PersonEntity {
  @PrimaryColumn('uuid') id!: string;
  @Column('text') email!: string;
  @Column('text') name!: string;
  @Column('text', { nullable: true }) passwordHash!: string | null;
  @Column('boolean', { default: false }) admin!: boolean;
  @Column('timestamptz', { nullable: true }) deactivatedAt!: Date | null;
  /** How notices that may wait are mailed. */
  @Column('text', { default: 'atOnce' }) mailTiming!: MailTiming;
  /** IANA name; the daily digest is made by its clock. */
  @Column('text', { default: 'UTC' }) timeZone!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}

/** A single-use token of an invitation or a password reset; only its SHA-256 is kept. */
@Entity('person_token')
@Index('uq_person_token_hash', ['tokenHash'], { unique: true })
@Check('ck_person_token_purpose', `purpose IN ('invitation', 'reset')`)
export class PersonTokenEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => PersonEntity) @Index('ix_person_token_person_id') @Column('uuid') personId!: string;
  @Column('text') purpose!: 'invitation' | 'reset';
  @Column('text') tokenHash!: string;
  /** The dam the invitation was written for, to name it on the page; null for others. */
  @Column('uuid', { nullable: true }) damId!: string | null;
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) issuedBy!: string | null;
  @Column('timestamptz') expiresAt!: Date;
  @Column('timestamptz', { nullable: true }) usedAt!: Date | null;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}

/** Sessions as connect-pg-simple keeps them. */
@Entity('session')
@Index('ix_session_expire', ['expire'])
export class SessionEntity {
  @PrimaryColumn('varchar') sid!: string;
  @Column('json') sess!: unknown;
  @Column('timestamp', { precision: 6 }) expire!: Date;
}

/** Points taken by wrong passwords, as rate-limiter-flexible keeps them; rows live for a quarter of an hour. */
@Entity('sign_in_failure')
export class SignInFailureEntity {
  @PrimaryColumn('varchar', { length: 255 }) key!: string;
  @Column('integer', { default: 0 }) points!: number;
  /** Milliseconds since 1970. */
  @Column('bigint', { nullable: true }) expire!: string | null;
}
