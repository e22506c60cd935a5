import { In } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { DecisionEntity, RevisionEntity } from '#server/entities/ledger-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { AppError, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { decidedMail } from '#server/mail/templates/checking-mails.ts';
import type { DecisionRefusal } from '#server/policies/revision-policy.ts';
import type { decisionInput, RevisionPayload } from '#shared/contract/revisions.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { revisionFacts } from './checking-letters.ts';
import { writeEvent } from './event-writer.ts';
import { queueMail } from './mail-service.ts';
import { refuseUnanswered } from './must-answer.ts';
import { lockNet } from './net-locks.ts';
import { placeOfNet, refusePutAway } from './net-place.ts';
import { personState } from './person-state.ts';
import { decisionRefusalFor, openRevision } from './revision-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

type DecisionInput = z.output<typeof decisionInput>;
export type RevisionServiceDeps = Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs' | 'config'>;

/** The reviewer's decision on a revision. Runs in a transaction of the caller under the net's lock. */
export function createRevisionService(deps: RevisionServiceDeps) {
  const { manager, clock, live, config } = deps;

  async function decide(revisionId: string, input: DecisionInput, actor: Actor): Promise<void> {
    await lockNetOf(revisionId);
    // Nobody accepts a damaged record: opening it holds it against its hash first.
    const { row, payload } = await openRevision(manager, revisionId);
    const refusal = await decisionRefusalFor(manager, row, actor.id);
    if (refusal) throw refused(refusal);
    refusePutAway(await placeOfNet(manager, row.netId));
    if (input.decision !== 'returned') await refuseUnanswered(manager, row.netId);
    if (input.decision === 'returned' && input.note === '')
      throw invalidInput([
        { path: 'note', message: 'Say what has to be changed; a revision is returned with a note.' },
      ]);
    await manager.insert(DecisionEntity, {
      id: uuidv7(),
      revisionId,
      decision: input.decision,
      decidedBy: actor.id,
      note: input.note,
      decidedAt: clock.now(),
    });
    await mailDecision(payload, input, actor);
    await announce(payload, input, actor);
  }

  async function lockNetOf(revisionId: string): Promise<void> {
    const row = await manager.findOne(RevisionEntity, {
      select: { id: true, netId: true },
      where: { id: revisionId },
    });
    if (!row) throw notFound();
    await lockNet(manager, row.netId);
  }

  async function mailDecision(payload: RevisionPayload, input: DecisionInput, actor: Actor): Promise<void> {
    const letter = decidedMail({
      ...revisionFacts(payload),
      ...input,
      decidedBy: actor.name,
      url: `${config.publicUrl}/revisions/${payload.revisionId}`,
    });
    for (const person of await concerned(payload, actor))
      await queueMail(deps, { ...letter, personId: person.id, to: person.email });
  }

  /** The sender and those who drew, as far as they still belong to the dam and can sign in. */
  async function concerned(payload: RevisionPayload, actor: Actor): Promise<PersonEntity[]> {
    const ids = new Set([payload.sentBy.id, ...payload.drawnBy.map((person) => person.id)]);
    ids.delete(actor.id);
    const members = await manager.findBy(MembershipEntity, {
      damId: payload.dam.id,
      personId: In([...ids]),
    });
    const people = await manager.findBy(PersonEntity, { id: In(members.map((each) => each.personId)) });
    return people.filter((person) => personState(person) === 'active');
  }

  async function announce(
    payload: RevisionPayload,
    { decision }: DecisionInput,
    actor: Actor,
  ): Promise<void> {
    const { netId, dam, drawing, section, netName, label, revisionId } = payload;
    await writeEvent(manager, {
      damId: dam.id,
      drawingId: drawing.id,
      netId,
      personId: actor.id,
      type: `revision.${decision}`,
      text: `${decision} revision ${label} of ${sectionTitle(section.name)}, ${netName}`,
      detail: { revisionId },
    });
    await live.publish(manager, { type: 'revisions', damId: dam.id, netId });
  }

  return { decide };
}

const STATUS_OF: Partial<Record<DecisionRefusal['code'], number>> = { 'own-work': 403, forbidden: 403 };

const refused = ({ code, text }: DecisionRefusal) =>
  new AppError(code, STATUS_OF[code] ?? 409, 'You cannot decide on this revision', text);
