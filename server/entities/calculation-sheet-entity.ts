import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { RevisionEntity } from './ledger-entity.ts';
import { NetEntity } from './net-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A calculation sheet that was asked for; the truth about its making. The file lies in storage by its hash. */
@Entity('calculation_sheet')
@Index('ix_calculation_sheet_net_id_asked_at', ['netId', 'askedAt'])
@Check('ck_calculation_sheet_paper', `paper IN ('A4', 'A3')`)
@Check('ck_calculation_sheet_state', `state IN ('waiting', 'done', 'failed')`)
export class CalculationSheetEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => NetEntity) @Column('uuid') netId!: string;
  /** Null for a draft. */
  @ForeignKey(() => RevisionEntity) @Column('uuid', { nullable: true }) revisionId!: string | null;
  @Column('text') paper!: 'A4' | 'A3';
  @Column('text', { default: '' }) jobNumber!: string;
  @Column('text', { default: 'waiting' }) state!: 'waiting' | 'done' | 'failed';
  @Column('text', { default: '' }) message!: string;
  @Column('integer', { default: 0 }) attempts!: number;
  @Column('text', { nullable: true }) storageKey!: string | null;
  @Column('text', { nullable: true }) sha256!: string | null;
  @Column('integer', { nullable: true }) byteSize!: number | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') askedBy!: string;
  @Column('timestamptz') askedAt!: Date;
  @Column('timestamptz', { nullable: true }) finishedAt!: Date | null;
}
