import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { RenditionSettings } from '#shared/contract/renditions.ts';
import { SheetEntity } from './drawing-entity.ts';
import { PersonEntity } from './person-entity.ts';

/**
 * A cleaned-up picture of a sheet, made of its base raster and kept beside it; also the truth about the job that makes
 * it. The one that is `shown` stands for the sheet on the desk; without one the sheet is shown as it was scanned.
 */
@Entity('rendition')
@Index('ix_rendition_sheet_id_made_at', ['sheetId', 'madeAt'])
@Index('uq_rendition_shown', ['sheetId'], { unique: true, where: 'shown' })
@Check('ck_rendition_state', `state IN ('waiting', 'running', 'done', 'refused', 'failed')`)
export class RenditionEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => SheetEntity) @Column('uuid') sheetId!: string;
  @Column('jsonb') settings!: RenditionSettings;
  @Column('integer') widthPx!: number;
  @Column('integer') heightPx!: number;
  /** Projective map row by row, from pixels of this picture to those of the base raster. */
  @Column('double precision', { array: true }) toBase!: number[];
  @Column('integer', { nullable: true }) tileSizePx!: number | null;
  @Column('integer', { nullable: true }) maxZoom!: number | null;
  @Column('text', { nullable: true }) tileFormat!: 'png' | 'jpeg' | 'webp' | null;
  @Column('boolean', { default: false }) shown!: boolean;
  @Column('text', { default: 'waiting' }) state!: 'waiting' | 'running' | 'done' | 'refused' | 'failed';
  @Column('double precision', { default: 0 }) progress!: number;
  @Column('text', { default: '' }) message!: string;
  @Column('integer', { default: 0 }) attempts!: number;
  /** While running: the run that holds it, and until when it is believed alive. */
  @Column('uuid', { nullable: true }) runId!: string | null;
  @Column('timestamptz', { nullable: true }) leaseUntil!: Date | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') madeBy!: string;
  @Column('timestamptz') madeAt!: Date;
  @Column('timestamptz', { nullable: true }) finishedAt!: Date | null;
}
