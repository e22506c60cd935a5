import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import * as z from 'zod/mini';
import type { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { AppError } from '#server/errors/app-error.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';
import { completeReading } from '#shared/contract/reading-versions.ts';
import { type RevisionPayload, revisionPayload } from '#shared/contract/revisions.ts';

export const sha256 = (text: string) => createHash('sha256').update(text, 'utf8').digest('hex');

/** The payload as canonical JSON (RFC 8785) and the SHA-256 of it, which is the revision's hash on every page. */
export function freezePayload(payload: RevisionPayload): { text: string; hash: string } {
  const text = canonicalize(z.parse(revisionPayload, payload));
  if (text === undefined) throw new Error('A payload has no canonical form.');
  return { text, hash: sha256(text) };
}

/**
 * The payload of a stored revision, after it has been held against its hash, its row and the revision before it. One
 * frozen by an earlier version of the product is completed for display; its figures stay as they were frozen.
 * @throws AppError internal when anything differs; a damaged record is never shown as a good one
 */
export function openPayload(row: RevisionEntity, previousHash: string | null): RevisionPayload {
  if (sha256(row.payload) !== row.payloadHash) throw damaged(row, 'the payload does not match its hash');
  const parsed = z.safeParse(revisionPayload, completedPayload(JSON.parse(row.payload)));
  if (!parsed.success) throw damaged(row, 'the payload is no revision payload');
  const fault = faultOfRow(row, parsed.data, previousHash);
  if (fault) throw damaged(row, fault);
  return parsed.data;
}

/** A payload in the present version's terms; what is no payload is left for the schema to refuse. */
function completedPayload(json: unknown): unknown {
  if (typeof json !== 'object' || json === null) return json;
  const { document, reading, reviewer } = json as Record<string, unknown>;
  return {
    ...ADDED,
    reviewers: [reviewer],
    ...json,
    document: upgradeDocument(document),
    reading: completeReading(reading),
  };
}

/** What payloads of earlier versions do not hold: it was not asked for then. */
const ADDED = { stayedOpen: null, dueOn: null, blindFirst: null } satisfies Partial<RevisionPayload>;

function faultOfRow(
  row: RevisionEntity,
  payload: RevisionPayload,
  previousHash: string | null,
): string | null {
  const pairs: Array<[name: string, inRow: unknown, frozen: unknown]> = [
    ['id', row.id, payload.revisionId],
    ['net', row.netId, payload.netId],
    ['label', row.label, payload.label],
    ['sender', row.sentBy, payload.sentBy.id],
    ['reviewer', row.reviewerId, payload.reviewer.id],
    ['reviewers', row.reviewerIds.join(), payload.reviewers.map((person) => person.id).join()],
    ['day it is due', row.dueOn, payload.dueOn],
    ['time of sending', row.sentAt.toISOString(), payload.sentAt],
    ['engine version', row.engineVersion, payload.engineVersion],
    ['drawers', row.drawnBy.join(), payload.drawnBy.map((person) => person.id).join()],
    ['blind reading', row.blindFirst ?? null, payload.blindFirst],
    ['previous hash', row.previousHash, payload.previousHash],
    ['hash of the revision before', previousHash, payload.previousHash],
  ];
  const differing = pairs.find(([, inRow, frozen]) => inRow !== frozen);
  return differing ? `the ${differing[0]} differs from the frozen one` : null;
}

export function damaged(row: Pick<RevisionEntity, 'id' | 'label' | 'netId'>, fault: string): AppError {
  return new AppError(
    'internal',
    500,
    'This record is damaged',
    `The stored record of revision ${row.label} is not as it was frozen, so it is not shown. Tell the administrator the request number; the record has to be restored from a backup.`,
    { cause: new Error(`Revision ${row.id} of net ${row.netId} is damaged: ${fault}.`) },
  );
}
