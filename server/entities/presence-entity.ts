import { Column, Entity, ForeignKey, PrimaryColumn } from 'typeorm';
import { NetEntity } from './net-entity.ts';
import { PersonEntity } from './person-entity.ts';

/** A desk that is open on a net, for as long as it gives signs of life. Nothing refers to it and nothing is lost with it. */
@Entity('net_presence')
export class NetPresenceEntity {
  @ForeignKey(() => NetEntity) @PrimaryColumn('uuid') netId!: string;
  @PrimaryColumn('uuid') clientId!: string;
  @ForeignKey(() => PersonEntity) @Column('uuid') personId!: string;
  @Column('text') tool!: string;
  @Column('uuid', { nullable: true }) entityId!: string | null;
  @Column('timestamptz', { default: () => 'now()' }) seenAt!: Date;
}
