import type { EntityManager } from 'typeorm';
import { DecisionEntity, RevisionEntity } from '#server/entities/ledger-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor, DamScope } from '#server/http/route-record.ts';
import { allowsOnDam } from '#server/policies/dam-policy.ts';
import { decisionRefusal } from '#server/policies/revision-policy.ts';
import type { RevisionDto, RevisionSummary } from '#shared/contract/revisions.ts';
import { netActionsFor } from './net-actions.ts';
import { placeOfNet, putAwayRefusal } from './net-place.ts';
import { notesOfNet } from './note-queries.ts';
import { openPayload } from './revision-payload.ts';
import { presentSheet } from './sheet-presenter.ts';

interface SummaryRow {
  id: string;
  label: string;
  sent_at: Date;
  payload_hash: string;
  sent_by: string;
  sender: string;
  reviewer_id: string;
  reviewer: string;
  decision: 'accepted' | 'returned' | null;
  decided_by: string | null;
  decider: string | null;
  note: string | null;
  decided_at: Date | null;
}

const SUMMARIES = `
  SELECT r.id, r.label, r.sent_at, r.payload_hash, r.sent_by, s.name AS sender, r.reviewer_id, v.name AS reviewer,
    d.decision, d.decided_by, p.name AS decider, d.note, d.decided_at
  FROM revision r
  JOIN person s ON s.id = r.sent_by
  JOIN person v ON v.id = r.reviewer_id
  LEFT JOIN LATERAL (SELECT * FROM decision c WHERE c.revision_id = r.id ORDER BY c.decided_at LIMIT 1) d ON true
  LEFT JOIN person p ON p.id = d.decided_by`;

function toSummary(row: SummaryRow): RevisionSummary {
  const { decision, decided_by, decider, note, decided_at } = row;
  return {
    id: row.id,
    label: row.label,
    sentBy: { id: row.sent_by, name: row.sender },
    sentAt: row.sent_at.toISOString(),
    reviewer: { id: row.reviewer_id, name: row.reviewer },
    hash: row.payload_hash,
    decision:
      decision && decided_by && decided_at
        ? {
            decision,
            decidedBy: { id: decided_by, name: decider ?? '' },
            note: note ?? '',
            decidedAt: decided_at.toISOString(),
          }
        : null,
  };
}

/** The revisions of a net, newest first. */
export async function revisionsOfNet(manager: EntityManager, netId: string): Promise<RevisionSummary[]> {
  const rows: SummaryRow[] = await manager.query(`${SUMMARIES} WHERE r.net_id = $1 ORDER BY r.number DESC`, [
    netId,
  ]);
  return rows.map(toSummary);
}

/** One revision as lists show it. @throws AppError not-found */
export async function revisionSummaryOf(
  manager: EntityManager,
  revisionId: string,
): Promise<RevisionSummary> {
  const rows: SummaryRow[] = await manager.query(`${SUMMARIES} WHERE r.id = $1`, [revisionId]);
  const row = rows[0];
  if (!row) throw notFound();
  return toSummary(row);
}

/**
 * A revision's row with its payload, held against hash, row and chain.
 * @throws AppError not-found, or internal when the record is damaged
 */
export async function openRevision(manager: EntityManager, revisionId: string) {
  const row = await manager.findOneBy(RevisionEntity, { id: revisionId });
  if (!row) throw notFound();
  const previous = await manager.findOne(RevisionEntity, {
    select: { id: true, payloadHash: true },
    where: { netId: row.netId, number: row.number - 1 },
  });
  return { row, payload: openPayload(row, previous?.payloadHash ?? null) };
}

/** All the check page shows. @throws AppError not-found, or internal when the record is damaged */
export async function revisionDetail(
  manager: EntityManager,
  revisionId: string,
  actor: Actor,
  scope: DamScope,
): Promise<RevisionDto> {
  const { row, payload } = await openRevision(manager, revisionId);
  const place = await placeOfNet(manager, row.netId);
  return {
    summary: await revisionSummaryOf(manager, revisionId),
    payload,
    sheet: presentSheet(place.sheet),
    notes: await notesOfNet(manager, row.netId),
    can: netActionsFor(place, scope),
    decideRefusal: !allowsOnDam('revision.decide', scope)
      ? 'Only a reviewer of this dam decides on a revision.'
      : ((await decisionRefusalFor(manager, row, actor.id))?.text ?? putAwayRefusal(place)?.detail ?? null),
  };
}

/** What stands in the way of this person's decision; null when nothing does. */
export async function decisionRefusalFor(manager: EntityManager, row: RevisionEntity, personId: string) {
  const newest = await manager.findOneOrFail(RevisionEntity, {
    select: { id: true, label: true },
    where: { netId: row.netId },
    order: { number: 'DESC' },
  });
  return decisionRefusal({
    personId,
    reviewerId: row.reviewerId,
    drawnBy: row.drawnBy,
    sentBy: row.sentBy,
    decided: await manager.existsBy(DecisionEntity, { revisionId: row.id }),
    supersededBy: newest.id === row.id ? null : newest.label,
  });
}
