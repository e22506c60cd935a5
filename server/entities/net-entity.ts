import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { DocumentEntity, EntityKind, UnitSystem } from '#shared/contract/document.ts';
import { SheetEntity } from './drawing-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A region of a sheet with a calibration of its own. */
@Entity('section')
export class SectionEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => SheetEntity) @Index('ix_section_sheet_id') @Column('uuid') sheetId!: string;
  @Column('text') name!: string;
  @Column('text', { default: '' }) chainage!: string;
  /** `[left, top, width, height]` in base-raster pixels; null = the whole sheet. */
  @Column('double precision', { array: true, nullable: true }) frame!: number[] | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') createdBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) archivedAt!: Date | null;
}

/** One reading of one section for one load case. */
@Entity('net')
@Check('ck_net_unit_system', `unit_system IN ('SI', 'US')`)
export class NetEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => SectionEntity) @Index('ix_net_section_id') @Column('uuid') sectionId!: string;
  @Column('text') name!: string;
  @Column('text') unitSystem!: UnitSystem;
  /** Incremented under the row's lock by every change; it numbers live events without gaps. */
  @Column('bigint', { default: 0 }) changeNumber!: string;
  /** The net this one is a copy of: who drew that one drew this one too. */
  @ForeignKey(() => NetEntity) @Column('uuid', { nullable: true }) copiedFrom!: string | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') createdBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { default: () => 'now()' }) updatedAt!: Date;
  @Column('timestamptz', { nullable: true }) archivedAt!: Date | null;
}

/**
 * One entity of a document. The owner is a net, or a section for what all its nets share. A removed entity stays
 * as a tombstone, so that a stale change of it is told as a conflict.
 */
@Entity('document_entity')
@Check('ck_document_entity_owner', `(net_id IS NULL) <> (section_id IS NULL)`)
@Check('ck_document_entity_version', 'version > 0')
export class DocumentEntityRow {
  @PrimaryColumn('uuid') ownerId!: string;
  @PrimaryColumn('uuid') entityId!: string;
  @ForeignKey(() => NetEntity)
  @Index('ix_document_entity_net_id')
  @Column('uuid', { nullable: true })
  netId!: string | null;
  @ForeignKey(() => SectionEntity)
  @Index('ix_document_entity_section_id')
  @Column('uuid', { nullable: true })
  sectionId!: string | null;
  @Column('text') kind!: EntityKind;
  @Column('integer') version!: number;
  @Column('jsonb') value!: DocumentEntity;
  @Column('boolean', { default: false }) removed!: boolean;
  /** The net's change number (of the net through which it was changed) and the browser that sent it. */
  @Column('bigint', { default: 0 }) changeNumber!: string;
  @Column('uuid', { nullable: true }) clientId!: string | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') changedBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) changedAt!: Date;
}

/** A batch of commands that was applied, with its answer, so that a repeat is answered and not applied again. */
@Entity('command_batch')
@Index('ix_command_batch_net_id_person_id', ['netId', 'personId'])
export class CommandBatchEntity {
  @ForeignKey(() => NetEntity) @PrimaryColumn('uuid') netId!: string;
  @PrimaryColumn('uuid') clientId!: string;
  @PrimaryColumn('integer') seq!: number;
  @ForeignKey(() => PersonEntity) @Column('uuid') personId!: string;
  @Column('bigint') changeNumber!: string;
  @Column('text', { default: '' }) label!: string;
  @Column('jsonb') result!: unknown;
  @Column('timestamptz', { default: () => 'now()' }) receivedAt!: Date;
}
