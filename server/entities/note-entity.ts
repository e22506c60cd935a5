import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import { NetEntity } from './net-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A thread anchored to something on a net. */
@Entity('note')
@Index('uq_note_net_id_number', ['netId', 'number'], { unique: true })
@Check('ck_note_state', `state IN ('open', 'answered', 'closed')`)
export class NoteEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NetEntity) @Column('uuid') netId!: string;
  @Column('integer') number!: number;
  @Column('jsonb') anchor!: NoteAnchor;
  @Column('text', { default: 'open' }) state!: 'open' | 'answered' | 'closed';
  @ForeignKey(() => PersonEntity) @Column('uuid') createdBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) closedBy!: string | null;
  @Column('timestamptz', { nullable: true }) closedAt!: Date | null;
}

/** The first text of a note or an answer to it. */
@Entity('note_entry')
export class NoteEntryEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NoteEntity) @Index('ix_note_entry_note_id') @Column('uuid') noteId!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') authorId!: string;
  @Column('text') text!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}
