import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DecisionEntity, RevisionEntity } from '#server/entities/ledger-entity.ts';
import { AppError, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import {
  acceptanceWithdrawalRefusal,
  type DecisionRefusal,
  decisionRefusal,
  sendingWithdrawalRefusal,
} from '#server/policies/revision-policy.ts';
import type { FrozenCheck } from '#shared/contract/review.ts';
import type {
  acceptanceWithdrawalInput,
  DecisionKind,
  decisionInput,
  sendingWithdrawalInput,
} from '#shared/contract/revisions.ts';
import { createCheckDraftService } from './check-draft-service.ts';
import { refuseUnanswered } from './must-answer.ts';
import { lockNet } from './net-locks.ts';
import { placeOfNet, refusePutAway } from './net-place.ts';
import { appendReviewRecord } from './review-records.ts';
import { announceDecision, mailDecision, mailSendingWithdrawn } from './revision-announcements.ts';
import { decisionFacts, openRevision } from './revision-queries.ts';
import type { ServiceDeps } from './service-deps.ts';
import { wellFormed } from './well-formed.ts';

type DecisionInput = z.output<typeof decisionInput>;
type AcceptanceWithdrawal = z.output<typeof acceptanceWithdrawalInput>;
type SendingWithdrawal = z.output<typeof sendingWithdrawalInput>;
export type RevisionServiceDeps = Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs' | 'config'>;

/**
 * What becomes of a revision: the reviewers' decisions, and the records by which an acceptance or a sending is withdrawn.
 * Nothing is ever changed or erased. Whoever signs has proved who they are before. Runs in a transaction of the caller,
 * under the net's lock.
 */
export function createRevisionService(deps: RevisionServiceDeps) {
  const { manager, clock } = deps;

  async function decide(revisionId: string, input: DecisionInput, actor: Actor): Promise<void> {
    const { row, payload, facts } = await opened(revisionId, actor);
    refuseFor(decisionRefusal(facts));
    refusePutAway(await placeOfNet(manager, row.netId));
    const { decision, note, capacity } = input;
    if (decision !== 'accepted' && note === '') throw noteNeeded(decision);
    if (decision !== 'returned') await refuseUnanswered(manager, row.netId);
    const check = await createCheckDraftService(deps).freeze(payload, decision, actor);
    await insertRecord(row, actor, { decision, note, signedName: actor.name, capacity }, check);
    const told = { decision, note, capacity };
    await mailDecision(deps, payload, told, actor);
    await announceDecision(deps, payload, decision, actor);
  }

  /** Corrects a wrong acceptance by a record that says so and why; the acceptance stays to be read. */
  async function withdrawAcceptance(
    revisionId: string,
    { reason, capacity }: AcceptanceWithdrawal,
    actor: Actor,
  ): Promise<void> {
    const { row, payload, facts } = await opened(revisionId, actor);
    refuseFor(acceptanceWithdrawalRefusal(facts));
    const decision = 'acceptanceWithdrawn';
    await insertRecord(row, actor, { decision, note: reason, signedName: actor.name, capacity });
    await mailDecision(deps, payload, { decision, note: reason, capacity }, actor);
    await announceDecision(deps, payload, decision, actor);
  }

  /** Takes a revision back from checking before it is decided; its letter stays used. */
  async function withdrawSending(
    revisionId: string,
    { reason }: SendingWithdrawal,
    actor: Actor,
  ): Promise<void> {
    const { row, payload, facts } = await opened(revisionId, actor);
    refuseFor(sendingWithdrawalRefusal(facts.state));
    refusePutAway(await placeOfNet(manager, row.netId));
    const decision = 'sendingWithdrawn';
    await insertRecord(row, actor, { decision, note: reason, signedName: '', capacity: '' });
    await mailSendingWithdrawn(deps, payload, reason, actor);
    await announceDecision(deps, payload, decision, actor);
  }

  /** Nobody signs a damaged record: opening it holds it against its hash first. */
  async function opened(revisionId: string, actor: Actor) {
    const held = await manager.findOne(RevisionEntity, {
      select: { id: true, netId: true },
      where: { id: revisionId },
    });
    if (!held) throw notFound();
    await lockNet(manager, held.netId);
    const { row, payload } = await openRevision(manager, revisionId);
    return { row, payload, facts: await decisionFacts(manager, row, actor.id) };
  }

  async function insertRecord(
    row: RevisionEntity,
    actor: Actor,
    said: Pick<DecisionEntity, 'decision' | 'note' | 'signedName' | 'capacity'>,
    check: FrozenCheck | null = null,
  ): Promise<void> {
    const [decisionId, at] = [uuidv7(), clock.now()];
    const record = { ...said, note: wellFormed(said.note), capacity: wellFormed(said.capacity) };
    await manager.insert(DecisionEntity, {
      id: decisionId,
      revisionId: row.id,
      decidedBy: actor.id,
      decidedAt: at,
      ...record,
    });
    await appendReviewRecord(manager, row, actor, at, { kind: 'decision', decisionId, ...record, check });
  }

  return { decide, withdrawAcceptance, withdrawSending };
}

const STATUS_OF: Partial<Record<DecisionRefusal['code'], number>> = { 'own-work': 403, forbidden: 403 };

function refuseFor(refusal: DecisionRefusal | null): void {
  if (refusal === null) return;
  const { code, text } = refusal;
  throw new AppError(code, STATUS_OF[code] ?? 409, 'You cannot decide on this revision', text);
}

const noteNeeded = (decision: DecisionKind) =>
  invalidInput([
    {
      path: 'note',
      message:
        decision === 'returned'
          ? 'Say what has to be changed; a revision is returned with a note.'
          : 'Write the notes with which it is accepted.',
    },
  ]);
