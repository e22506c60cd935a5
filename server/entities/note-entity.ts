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
  /** The reviewer who wants it answered before anything is accepted; null for a note that does not hold anything up. */
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) mustAnswerBy!: string | null;
  @Column('timestamptz', { nullable: true }) mustAnswerAt!: Date | null;
}

/** The first text of a note or an answer to it. */
@Entity('note_entry')
export class NoteEntryEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NoteEntity) @Index('ix_note_entry_note_id') @Column('uuid') noteId!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') authorId!: string;
  @Column('text') text!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) editedAt!: Date | null;
  /** Those named with @ in it. */
  @Column('uuid', { array: true, default: () => "'{}'" }) named!: string[];
}

/** What an entry said before it was changed; insert-only. */
@Entity('note_entry_earlier')
export class NoteEntryEarlierEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NoteEntryEntity)
  @Index('ix_note_entry_earlier_entry_id')
  @Column('uuid')
  entryId!: string;
  @Column('text') text!: string;
  @Column('timestamptz') replacedAt!: Date;
}

/** A photograph or file of an entry; without one, uploaded for an entry that is not written yet. */
@Entity('note_file')
export class NoteFileEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NetEntity) @Column('uuid') netId!: string;
  @ForeignKey(() => NoteEntryEntity)
  @Index('ix_note_file_entry_id')
  @Column('uuid', { nullable: true })
  entryId!: string | null;
  @Column('text') fileName!: string;
  @Column('text') mediaType!: string;
  @Column('bigint') byteSize!: string;
  @Column('text') sha256!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') uploadedBy!: string;
  @Column('timestamptz') uploadedAt!: Date;
}

/** How many entries of a note, counted from its first, a person has read. */
@Entity('note_read')
export class NoteReadEntity {
  @ForeignKey(() => NoteEntity) @PrimaryColumn('uuid') noteId!: string;
  @ForeignKey(() => PersonEntity) @PrimaryColumn('uuid') personId!: string;
  @Column('integer') entries!: number;
}
