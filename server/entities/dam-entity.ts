import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { DamRole } from '#shared/contract/actions.ts';
import type { CheckListItem } from '#shared/contract/check-list.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { PersonEntity } from './person-entity.ts';

@Entity('dam')
@Check('ck_dam_unit_system', `unit_system IN ('SI', 'US')`)
@Check('ck_dam_gamma_w', 'gamma_w > 0')
export class DamEntity {
  @PrimaryColumn('uuid') id!: string;
  @Column('text') name!: string;
  @Column('text') unitSystem!: UnitSystem;
  @Column('text') datum!: string;
  @Column('double precision', { nullable: true }) fullSupplyLevel!: number | null;
  @Column('double precision') gammaW!: number;
  /** What reviewers of the dam answer; null = the usual list. */
  @Column('jsonb', { nullable: true }) checkList!: CheckListItem[] | null;
  @ForeignKey(() => PersonEntity) @Column('uuid') createdBy!: string;
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
  @Column('timestamptz', { nullable: true }) archivedAt!: Date | null;
}

/** A person's parts on a dam, a set. */
@Entity('membership')
@Check(
  'ck_membership_roles',
  `roles <@ ARRAY['engineer', 'reviewer', 'colleague'] AND array_length(roles, 1) > 0`,
)
export class MembershipEntity {
  @ForeignKey(() => DamEntity) @PrimaryColumn('uuid') damId!: string;
  @ForeignKey(() => PersonEntity) @Index('ix_membership_person_id') @PrimaryColumn('uuid') personId!: string;
  @Column('text', { array: true }) roles!: DamRole[];
  @Column('timestamptz', { default: () => 'now()' }) createdAt!: Date;
}

/** Who did what, when. Append-only: the application's role may insert and read, nothing else. */
@Entity('event')
@Index('ix_event_dam_id_at', ['damId', 'at'])
export class EventEntity {
  @PrimaryColumn('uuid') id!: string;
  @ForeignKey(() => DamEntity) @Column('uuid', { nullable: true }) damId!: string | null;
  @Column('uuid', { nullable: true }) drawingId!: string | null;
  @Column('uuid', { nullable: true }) netId!: string | null;
  @ForeignKey(() => PersonEntity) @Column('uuid', { nullable: true }) personId!: string | null;
  @Column('text') type!: string;
  @Column('text') text!: string;
  @Column('jsonb', { default: {} }) detail!: Record<string, unknown>;
  @Column('timestamptz', { default: () => 'now()' }) at!: Date;
}
