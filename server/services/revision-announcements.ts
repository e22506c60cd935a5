import { In } from 'typeorm';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { Actor } from '#server/http/route-record.ts';
import {
  type DecidedData,
  decidedMail,
  sendingWithdrawnMail,
} from '#server/mail/templates/checking-mails.ts';
import type { Letter } from '#server/mail/templates/letter.ts';
import type { DecisionKind, RevisionPayload } from '#shared/contract/revisions.ts';
import { DECISION_WORDS } from '#shared/text/decision-words.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { revisionFacts } from './checking-letters.ts';
import { writeEvent } from './event-writer.ts';
import { inLockingOrder, queueMail } from './mail-service.ts';
import { personState } from './person-state.ts';
import type { ServiceDeps } from './service-deps.ts';

type Deps = Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs' | 'config'>;

const urlOf = ({ config }: Deps, { revisionId }: RevisionPayload) =>
  `${config.publicUrl}/revisions/${revisionId}`;

/** Tells the sender, who drew and the other reviewers of a decision or of a withdrawn acceptance. */
export async function mailDecision(
  deps: Deps,
  payload: RevisionPayload,
  told: Pick<DecidedData, 'decision' | 'note' | 'capacity'>,
  actor: Actor,
): Promise<void> {
  const letter = decidedMail({
    ...revisionFacts(payload),
    ...told,
    decidedBy: actor.name,
    url: urlOf(deps, payload),
  });
  await mailTo(deps, payload, letter, [payload.sentBy, ...payload.drawnBy, ...payload.reviewers], actor);
}

/** Tells the reviewers that the revision needs no check any more. */
export async function mailSendingWithdrawn(
  deps: Deps,
  payload: RevisionPayload,
  reason: string,
  actor: Actor,
): Promise<void> {
  const letter = sendingWithdrawnMail({
    ...revisionFacts(payload),
    withdrawnBy: actor.name,
    reason,
    url: urlOf(deps, payload),
  });
  await mailTo(deps, payload, letter, [payload.sentBy, ...payload.reviewers], actor);
}

/** To those of the people who still belong to the dam and can sign in, once each; the actor knows already. */
async function mailTo(
  deps: Deps,
  payload: RevisionPayload,
  letter: Letter,
  people: ReadonlyArray<{ id: string }>,
  actor: Actor,
): Promise<void> {
  const { manager } = deps;
  const ids = new Set(people.map(({ id }) => id));
  ids.delete(actor.id);
  const members = await manager.findBy(MembershipEntity, { damId: payload.dam.id, personId: In([...ids]) });
  const found = await manager.findBy(PersonEntity, { id: In(members.map((each) => each.personId)) });
  for (const person of inLockingOrder(found.filter((each) => personState(each) === 'active')))
    await queueMail(deps, { ...letter, personId: person.id, to: person.email, damId: payload.dam.id });
}

/** The event of a record on a revision, and what others should fetch again. */
export async function announceDecision(
  { manager, live }: Deps,
  { netId, dam, drawing, section, netName, label, revisionId }: RevisionPayload,
  decision: DecisionKind,
  actor: Actor,
): Promise<void> {
  await writeEvent(manager, {
    damId: dam.id,
    drawingId: drawing.id,
    netId,
    personId: actor.id,
    type: `revision.${decision}`,
    text: `${DECISION_WORDS[decision].did} revision ${label} of ${sectionTitle(section.name)}, ${netName}`,
    detail: { revisionId },
  });
  await live.publish(manager, { type: 'revisions', damId: dam.id, netId });
}
