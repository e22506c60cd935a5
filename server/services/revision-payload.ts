import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import * as z from 'zod/mini';
import type { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { AppError } from '#server/errors/app-error.ts';
import { type RevisionPayload, revisionPayload } from '#shared/contract/revisions.ts';

const sha256 = (text: string) => createHash('sha256').update(text, 'utf8').digest('hex');

/** The payload as canonical JSON (RFC 8785) and the SHA-256 of it, which is the revision's hash on every page. */
export function freezePayload(payload: RevisionPayload): { text: string; hash: string } {
  const text = canonicalize(z.parse(revisionPayload, payload));
  if (text === undefined) throw new Error('A payload has no canonical form.');
  return { text, hash: sha256(text) };
}

/**
 * The payload of a stored revision, after it has been held against its hash, its row and the revision before it.
 * @throws AppError internal when anything differs; a damaged record is never shown as a good one
 */
export function openPayload(row: RevisionEntity, previousHash: string | null): RevisionPayload {
  const fault = faultOfText(row) ?? faultOfRow(row, previousHash);
  if (fault) throw damaged(row, fault);
  return z.parse(revisionPayload, JSON.parse(row.payload));
}

function faultOfText(row: RevisionEntity): string | null {
  if (sha256(row.payload) !== row.payloadHash) return 'the payload does not match its hash';
  const parsed = z.safeParse(revisionPayload, JSON.parse(row.payload));
  return parsed.success ? null : 'the payload is no revision payload';
}

function faultOfRow(row: RevisionEntity, previousHash: string | null): string | null {
  const payload = z.parse(revisionPayload, JSON.parse(row.payload));
  const pairs: Array<[name: string, inRow: unknown, frozen: unknown]> = [
    ['id', row.id, payload.revisionId],
    ['net', row.netId, payload.netId],
    ['label', row.label, payload.label],
    ['sender', row.sentBy, payload.sentBy.id],
    ['reviewer', row.reviewerId, payload.reviewer.id],
    ['time of sending', row.sentAt.toISOString(), payload.sentAt],
    ['engine version', row.engineVersion, payload.engineVersion],
    ['drawers', row.drawnBy.join(), payload.drawnBy.map((person) => person.id).join()],
    ['previous hash', row.previousHash, payload.previousHash],
    ['hash of the revision before', previousHash, payload.previousHash],
  ];
  const differing = pairs.find(([, inRow, frozen]) => inRow !== frozen);
  return differing ? `the ${differing[0]} differs from the frozen one` : null;
}

function damaged(row: RevisionEntity, fault: string): AppError {
  return new AppError(
    'internal',
    500,
    'This record is damaged',
    `The stored record of revision ${row.label} is not as it was frozen, so it is not shown. Tell the administrator the request number; the record has to be restored from a backup.`,
    { cause: new Error(`Revision ${row.id} of net ${row.netId} is damaged: ${fault}.`) },
  );
}
