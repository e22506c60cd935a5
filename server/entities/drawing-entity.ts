import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { DamEntity } from './dam-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** One uploaded file; its bytes stay in storage under `sha256/<hash>` for ever. */
@Entity('drawing')
@Index('ix_drawing_dam_id_sha256', ['damId', 'sha256'])
@Check('ck_drawing_stage', `stage IS NULL OR stage IN ('asBuilt', 'design')`)
export class DrawingEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => DamEntity) @Column('uuid') damId!: string;
  @Column('text') sha256!: string;
  @Column('text') fileName!: string;
  @Column('text') mediaType!: string;
  @Column('bigint') byteSize!: string;
  @Column('text', { default: '' }) number!: string;
  @Column('text', { default: '' }) title!: string;
  @Column('text', { default: '' }) revision!: string;
  @Column('text', { default: '' }) drawnOn!: string;
  @Column('text', { nullable: true }) stage!: 'asBuilt' | 'design' | null;
  @Column('text', { default: '' }) source!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') uploadedBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) uploadedAt!: Date;
  @Column('timestamptz', { nullable: true }) archivedAt!: Date | null;
}

/** One page of a drawing, rendered to a base raster of fixed size and a tile pyramid. */
@Entity('sheet')
@Index('uq_sheet_drawing_id_page_number', ['drawingId', 'pageNumber'], { unique: true })
export class SheetEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => DrawingEntity) @Column('uuid') drawingId!: string;
  @Column('integer') pageNumber!: number;
  @Column('integer') widthPx!: number;
  @Column('integer') heightPx!: number;
  @Column('double precision', { nullable: true }) dpi!: number | null;
  @Column('text') rendition!: string;
  @Column('integer') tileSizePx!: number;
  @Column('integer') maxZoom!: number;
  @Column('text') tileFormat!: 'png' | 'jpeg' | 'webp';
  /** Finest level there is while the first view stands in for the sheet; null when all levels are there. */
  @Column('integer', { nullable: true }) readyZoom!: number | null;
  /** A page of vectors, drawn at a resolution that could have been another. */
  @Column('boolean', { default: false }) isDrawn!: boolean;
  @Column('text', { default: '' }) note!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}

/** The truth about rendering a drawing; the queue's payload is only this row's id. */
@Entity('render_job')
@Index('uq_render_job_drawing_id', ['drawingId'], { unique: true })
@Check('ck_render_job_state', `state IN ('waiting', 'running', 'done', 'refused', 'failed')`)
export class RenderJobEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => DrawingEntity) @Column('uuid') drawingId!: string;
  @Column('text', { default: 'waiting' }) state!: 'waiting' | 'running' | 'done' | 'refused' | 'failed';
  @Column('integer', { nullable: true }) pagesTotal!: number | null;
  @Column('integer', { default: 0 }) pagesDone!: number;
  @Column('double precision', { default: 0 }) pageProgress!: number;
  @Column('text', { default: '' }) message!: string;
  @Column('integer', { default: 0 }) attempts!: number;
  /** Dots per inch that was chosen for the pages of vectors this run draws; null = the usual. */
  @Column('integer', { nullable: true }) askedDpi!: number | null;
  /** While running: the run that holds the job, and until when it is believed alive. */
  @Column('uuid', { nullable: true }) runId!: string | null;
  @Column('timestamptz', { nullable: true }) leaseUntil!: Date | null;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) finishedAt!: Date | null;
}
