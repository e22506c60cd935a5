import type { EntityManager } from 'typeorm';
import { DecisionEntity, RevisionEntity } from '#server/entities/ledger-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor, DamScope } from '#server/http/route-record.ts';
import { allowsOnDam } from '#server/policies/dam-policy.ts';
import {
  acceptanceWithdrawalRefusal,
  type DecisionFacts,
  decisionRefusal,
  sendingWithdrawalRefusal,
} from '#server/policies/revision-policy.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { DecisionDto, RevisionDto, RevisionState, RevisionSummary } from '#shared/contract/revisions.ts';
import { netActionsFor } from './net-actions.ts';
import { placeOfNet, putAwayRefusal } from './net-place.ts';
import { notesOfNet } from './note-queries.ts';
import { checkDraftOf, checkListOfDam, reviewOf } from './review-queries.ts';
import { openPayload } from './revision-payload.ts';
import { presentSheet } from './sheet-presenter.ts';

interface SummaryRow {
  id: string;
  label: string;
  sent_at: Date;
  payload_hash: string;
  sent_by: string;
  sender: string;
  reviewers: PersonRef[];
  due_on: string | null;
  state: RevisionState;
  superseded_by: string | null;
  decisions: DecisionDto[];
}

const isAccepted = (state: string) => `${state} IN ('accepted', 'acceptedWithNotes')`;

const SUMMARIES = `
  SELECT r.id, r.label, r.sent_at, r.payload_hash, r.sent_by, s.name AS sender, r.due_on::text, t.state,
    (SELECT json_agg(json_build_object('id', v.id, 'name', v.name) ORDER BY array_position(r.reviewer_ids, v.id))
      FROM person v WHERE v.id = ANY (r.reviewer_ids)) AS reviewers,
    (SELECT coalesce(json_agg(json_build_object('id', d.id, 'decision', d.decision,
        'decidedBy', json_build_object('id', p.id, 'name', p.name), 'signedName', d.signed_name,
        'capacity', d.capacity, 'note', d.note, 'decidedAt', d.decided_at) ORDER BY d.decided_at, d.id), '[]')
      FROM decision d JOIN person p ON p.id = d.decided_by WHERE d.revision_id = r.id) AS decisions,
    (SELECT n.label FROM revision n WHERE n.net_id = r.net_id AND n.number > r.number
      AND ${isAccepted('t.state')} AND ${isAccepted('revision_state(n.id)')}
      ORDER BY n.number LIMIT 1) AS superseded_by
  FROM revision r
  JOIN person s ON s.id = r.sent_by
  CROSS JOIN LATERAL (SELECT revision_state(r.id) AS state) t`;

function toSummary(row: SummaryRow): RevisionSummary {
  const { reviewers, state } = row;
  const decisions = row.decisions.map((each) => ({
    ...each,
    decidedAt: new Date(each.decidedAt).toISOString(),
  }));
  const [reviewer] = reviewers;
  if (!reviewer) throw new Error(`Revision ${row.id} has no reviewer.`);
  return {
    id: row.id,
    label: row.label,
    sentBy: { id: row.sent_by, name: row.sender },
    sentAt: row.sent_at.toISOString(),
    reviewer,
    reviewers,
    dueOn: row.due_on,
    hash: row.payload_hash,
    state,
    // Whatever settles the state is the last record: after it only the withdrawal of an acceptance is taken.
    decision: state === 'waiting' ? null : (decisions.at(-1) ?? null),
    decisions,
    supersededBy: row.superseded_by,
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
  const facts = await decisionFacts(manager, row, actor.id);
  const inUse = putAwayRefusal(place);
  const isReviewer = allowsOnDam('revision.decide', scope);
  const decideRefusal = isReviewer
    ? (decisionRefusal(facts)?.text ?? inUse?.detail ?? null)
    : 'Only a reviewer of this dam decides on a revision.';
  return {
    summary: await revisionSummaryOf(manager, revisionId),
    payload,
    sheet: presentSheet(place.sheet),
    notes: await notesOfNet(manager, row.netId, actor.id),
    can: netActionsFor(place, scope),
    decideRefusal,
    canWithdrawAcceptance: isReviewer && acceptanceWithdrawalRefusal(facts) === null,
    canWithdrawSending:
      allowsOnDam('net.send', scope) && inUse === null && sendingWithdrawalRefusal(facts.state) === null,
    review: await reviewOf(manager, row),
    checking:
      decideRefusal === null
        ? {
            checkList: [...(await checkListOfDam(manager, payload.dam.id))],
            draft: await checkDraftOf(manager, revisionId, actor.id),
          }
        : null,
  };
}

/** What the policy needs to know of a revision and a person. */
export async function decisionFacts(
  manager: EntityManager,
  row: RevisionEntity,
  personId: string,
): Promise<DecisionFacts> {
  const newest = await manager.findOneOrFail(RevisionEntity, {
    select: { id: true, label: true },
    where: { netId: row.netId },
    order: { number: 'DESC' },
  });
  const decisions = await manager.findBy(DecisionEntity, { revisionId: row.id });
  return {
    personId,
    reviewerIds: row.reviewerIds,
    drawnBy: row.drawnBy,
    sentBy: row.sentBy,
    state: await revisionStateOf(manager, row.id),
    decidedBy: decisions.map((each) => each.decidedBy),
    supersededBy: newest.id === row.id ? null : newest.label,
  };
}

/** What the records of a revision come to. */
export async function revisionStateOf(manager: EntityManager, revisionId: string): Promise<RevisionState> {
  const [row] = await manager.query('SELECT revision_state($1) AS state', [revisionId]);
  return row.state;
}
