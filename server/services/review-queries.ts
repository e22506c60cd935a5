import type { EntityManager } from 'typeorm';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { DecisionEntity, type RevisionEntity } from '#server/entities/ledger-entity.ts';
import { CheckDraftEntity } from '#server/entities/review-entity.ts';
import type { CheckListItem } from '#shared/contract/check-list.ts';
import type { CheckDraft, ReviewDto, ReviewRecord } from '#shared/contract/review.ts';
import { checkListOf } from '#shared/text/default-check-list.ts';
import { type OpenedRecord, reviewRecordsOf } from './review-records.ts';
import { damaged } from './revision-payload.ts';

type Of<K extends ReviewRecord['kind']> = Extract<ReviewRecord, { kind: K }>;

/**
 * What reviewers did on a revision, as recorded. Decisions made before they were chained have no record here.
 * @throws AppError internal when a record is damaged, or a decision differs from its record
 */
export async function reviewOf(manager: EntityManager, row: RevisionEntity): Promise<ReviewDto> {
  const records = await reviewRecordsOf(manager, row);
  const decided = await manager.findBy(DecisionEntity, { revisionId: row.id });
  const decisions = ofKind(records, 'decision');
  for (const { record } of decisions) holdAgainstDecision(row, record, decided);
  return {
    openings: ofKind(records, 'figuresOpened').map(facts),
    blindReadings: ofKind(records, 'blindReading').map((each) => ({
      ...facts(each),
      reading: each.record.reading,
    })),
    checks: decisions.map((each) => ({
      ...facts(each),
      decisionId: each.record.decisionId,
      decision: each.record.decision,
      check: each.record.check,
    })),
  };
}

const ofKind = <K extends ReviewRecord['kind']>(records: readonly OpenedRecord[], kind: K) =>
  records.filter((each): each is OpenedRecord & { record: Of<K> } => each.record.kind === kind);

const facts = ({ record, hash }: OpenedRecord) => ({ person: record.person, at: record.at, hash });

/** The row of a decision must say what its record froze. */
function holdAgainstDecision(
  revision: RevisionEntity,
  record: Of<'decision'>,
  decided: readonly DecisionEntity[],
): void {
  const row = decided.find(({ id }) => id === record.decisionId);
  const same =
    row !== undefined &&
    row.decision === record.decision &&
    row.note === record.note &&
    row.signedName === record.signedName &&
    row.capacity === record.capacity &&
    row.decidedBy === record.person.id &&
    row.decidedAt.toISOString() === record.at;
  if (!same) throw damaged(revision, `the decision of record ${record.number} is not as it was frozen`);
}

/** The check list of a dam as it stands. */
export async function checkListOfDam(
  manager: EntityManager,
  damId: string,
): Promise<readonly CheckListItem[]> {
  const { checkList } = await manager.findOneOrFail(DamEntity, {
    select: { id: true, checkList: true },
    where: { id: damId },
  });
  return checkListOf(checkList);
}

/** A reviewer's ticks and answers so far. */
export async function checkDraftOf(
  manager: EntityManager,
  revisionId: string,
  personId: string,
): Promise<CheckDraft> {
  const draft = await manager.findOneBy(CheckDraftEntity, { revisionId, personId });
  return { ticks: draft?.ticks ?? [], answers: draft?.answers ?? [] };
}
