import 'reflect-metadata';
import { DataSource } from 'typeorm';
import { migrations } from '#server/migrations/index.ts';
import { CalculationSheetEntity } from './calculation-sheet-entity.ts';
import { DamEntity, EventEntity, MembershipEntity } from './dam-entity.ts';
import { DrawingEntity, RenderJobEntity, SheetEntity } from './drawing-entity.ts';
import { ArtifactEntity, DecisionEntity, ReviewReminderEntity, RevisionEntity } from './ledger-entity.ts';
import { MailDigestEntity, OutboxMailEntity } from './mail-entity.ts';
import { SnakeNamingStrategy } from './naming-strategy.ts';
import { CommandBatchEntity, DocumentEntityRow, NetEntity, SectionEntity } from './net-entity.ts';
import {
  NoteEntity,
  NoteEntryEarlierEntity,
  NoteEntryEntity,
  NoteFileEntity,
  NoteReadEntity,
} from './note-entity.ts';
import { PersonEntity, PersonTokenEntity, SessionEntity, SignInFailureEntity } from './person-entity.ts';
import { NetPresenceEntity } from './presence-entity.ts';
import { RenditionEntity } from './rendition-entity.ts';
import { CheckDraftEntity, ReviewRecordEntity } from './review-entity.ts';

export const entities = [
  PersonEntity,
  PersonTokenEntity,
  SessionEntity,
  SignInFailureEntity,
  DamEntity,
  MembershipEntity,
  EventEntity,
  DrawingEntity,
  SheetEntity,
  RenderJobEntity,
  RenditionEntity,
  SectionEntity,
  NetEntity,
  DocumentEntityRow,
  CommandBatchEntity,
  NoteEntity,
  NoteEntryEntity,
  NoteEntryEarlierEntity,
  NoteFileEntity,
  NoteReadEntity,
  RevisionEntity,
  DecisionEntity,
  ReviewReminderEntity,
  ReviewRecordEntity,
  CheckDraftEntity,
  ArtifactEntity,
  CalculationSheetEntity,
  MailDigestEntity,
  OutboxMailEntity,
  NetPresenceEntity,
];

export interface DataSourceOptions {
  url: string;
  /** Role taken at the start of each connection, for a database where one login serves both purposes. */
  role?: string;
  poolSize?: number;
}

/**
 * A data source that is not yet connected. Migrations run as the owner, the application connects as the role
 * `tracehead_app`, which cannot change or empty the ledger.
 */
export function createDataSource({ url, role, poolSize = 10 }: DataSourceOptions): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities,
    migrations,
    migrationsTableName: 'migration',
    namingStrategy: new SnakeNamingStrategy(),
    synchronize: false,
    poolSize,
    extra: role ? { options: `-c role=${role}` } : {},
  });
}
