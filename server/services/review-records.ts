import canonicalize from 'canonicalize';
import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import * as z from 'zod/mini';
import type { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { ReviewRecordEntity } from '#server/entities/review-entity.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import { type ReviewRecord, reviewRecord } from '#shared/contract/review.ts';
import { damaged, sha256 } from './revision-payload.ts';

/** What a record says besides who, when and its place in the chain. */
type Said = Says<ReviewRecord>;
type Says<R> = R extends ReviewRecord
  ? Omit<R, 'recordVersion' | 'revisionId' | 'revisionHash' | 'number' | 'previousHash' | 'person' | 'at'>
  : never;

type Chained = Pick<RevisionEntity, 'id' | 'label' | 'netId' | 'payloadHash'>;

/** A record that was held against its hash and its place in the chain. */
export interface OpenedRecord {
  record: ReviewRecord;
  hash: string;
}

/** Adds a record to a revision's chain. Runs under the lock of the revision's net, so that each follows one other. */
export async function appendReviewRecord(
  manager: EntityManager,
  revision: Chained,
  person: PersonRef,
  at: Date,
  said: Said,
): Promise<void> {
  const last = await manager.findOne(ReviewRecordEntity, {
    where: { revisionId: revision.id },
    order: { number: 'DESC' },
  });
  const record = z.parse(reviewRecord, {
    ...said,
    recordVersion: 1,
    revisionId: revision.id,
    revisionHash: revision.payloadHash,
    number: (last?.number ?? 0) + 1,
    previousHash: last?.payloadHash ?? revision.payloadHash,
    person: { id: person.id, name: person.name },
    at: at.toISOString(),
  });
  const payload = canonicalize(record);
  if (payload === undefined) throw new Error('A record has no canonical form.');
  await manager.insert(ReviewRecordEntity, {
    id: uuidv7(),
    revisionId: revision.id,
    number: record.number,
    kind: record.kind,
    personId: person.id,
    at,
    payload,
    payloadHash: sha256(payload),
    previousHash: record.previousHash,
  });
}

/**
 * The records of a revision, oldest first, each held against its hash, its row and the one before it.
 * @throws AppError internal when anything differs
 */
export async function reviewRecordsOf(manager: EntityManager, revision: Chained): Promise<OpenedRecord[]> {
  const rows = await manager.find(ReviewRecordEntity, {
    where: { revisionId: revision.id },
    order: { number: 'ASC' },
  });
  return openReviewRecords(rows, revision);
}

/** @throws AppError internal when a record, or their chain, is not as it was made */
export function openReviewRecords(rows: readonly ReviewRecordEntity[], revision: Chained): OpenedRecord[] {
  let previousHash = revision.payloadHash;
  return rows.map((row, i) => {
    const fault = sha256(row.payload) === row.payloadHash ? null : 'does not match its hash';
    const parsed = fault ? null : z.safeParse(reviewRecord, JSON.parse(row.payload));
    if (!parsed?.success) throw damaged(revision, `record ${i + 1} ${fault ?? 'is none'}`);
    const wrong = differing(row, parsed.data, i + 1, previousHash, revision);
    if (wrong) throw damaged(revision, `record ${i + 1}: the ${wrong} differs from the frozen one`);
    previousHash = row.payloadHash;
    return { record: parsed.data, hash: row.payloadHash };
  });
}

function differing(
  row: ReviewRecordEntity,
  record: ReviewRecord,
  number: number,
  previousHash: string,
  revision: Chained,
): string | null {
  const pairs: Array<[name: string, inRow: unknown, frozen: unknown]> = [
    ['number', row.number, record.number],
    ['place', number, record.number],
    ['kind', row.kind, record.kind],
    ['person', row.personId, record.person.id],
    ['time', row.at.toISOString(), record.at],
    ['revision', revision.id, record.revisionId],
    ['hash of the revision', revision.payloadHash, record.revisionHash],
    ['previous hash', row.previousHash, record.previousHash],
    ['hash of the record before', previousHash, record.previousHash],
  ];
  return pairs.find(([, inRow, frozen]) => inRow !== frozen)?.[0] ?? null;
}
