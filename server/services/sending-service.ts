import type * as z from 'zod/mini';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { AppError, conflict, invalidInput } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { sentForCheckingMail } from '#server/mail/templates/checking-mails.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { OpenItem, StayedOpen } from '#shared/contract/before-sending.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { RevisionPayload, RevisionSummary, sendInput } from '#shared/contract/revisions.ts';
import { namesText } from '#shared/text/names-text.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { changesSinceRevision } from './changes-since.ts';
import { revisionFacts, scheduleFigures } from './checking-letters.ts';
import { writeEvent } from './event-writer.ts';
import { queueMail } from './mail-service.ts';
import { readDocument } from './net-document.ts';
import { drawersOfNet } from './net-drawers.ts';
import { lockNet } from './net-locks.ts';
import { type NetPlace, placeOfNet } from './net-place.ts';
import { refuseTakenId } from './new-id.ts';
import { readInThread } from './reading-threads.ts';
import { DAY_MS, planReminders } from './review-reminders.ts';
import { revisionLabel } from './revision-label.ts';
import { freezePayload } from './revision-payload.ts';
import { revisionSummaryOf } from './revision-queries.ts';
import {
  newestRevision,
  openItemsOf,
  type Reviewer,
  reviewersOfDam,
  sendingRefusal,
} from './sending-queries.ts';
import type { ServiceDeps } from './service-deps.ts';
import { wellFormed } from './well-formed.ts';

type SendInput = z.output<typeof sendInput>;
export type SendingDeps = Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs' | 'config'>;

/**
 * Freezes a net as a revision and tells its reviewer. Runs in a transaction of the caller under the net's lock: the
 * revision, its mail and its event exist together or not at all, and two senders follow one another.
 */
export function createSendingService(deps: SendingDeps) {
  const { manager, clock, live, config } = deps;

  async function send(netId: string, input: SendInput, actor: Actor): Promise<RevisionSummary> {
    const { changeNumber } = await lockNet(manager, netId);
    const isRepeat = await manager.existsBy(RevisionEntity, { id: input.id, netId, sentBy: actor.id });
    if (isRepeat) return revisionSummaryOf(manager, input.id);
    await refuseTakenId(manager, RevisionEntity, input.id, 'revision');
    if (changeNumber !== input.changeNumber) throw changedMeanwhile(changeNumber);
    const place = await placeOfNet(manager, netId);
    const previous = await newestRevision(manager, netId);
    const { payload, reviewers } = await draw(place, previous, input, actor);
    const hash = await insertRevision(payload, numberAfter(previous), changeNumber);
    await planReminders(deps, { revisionId: input.id, dueOn: input.dueOn });
    await tell({ payload, hash, previous }, place, reviewers, actor);
    return revisionSummaryOf(manager, input.id);
  }

  /** What is to be frozen, once nothing stands in its way, and whom it goes to. */
  async function draw(place: NetPlace, previous: RevisionEntity | null, input: SendInput, actor: Actor) {
    const document = await readDocument(manager, place);
    const reading = await readInThread(document);
    const onDam = await reviewersOfDam(manager, place.dam.id);
    const refusal = await sendingRefusal(manager, place, reading, previous, onDam);
    if (refusal) throw refusal;
    const drawnBy = await drawersOfNet(manager, place.net.id);
    const reviewers = input.reviewerIds.map((id) => chooseReviewer(onDam, id, drawnBy, actor));
    const [first] = reviewers;
    if (!first || new Set(input.reviewerIds).size < reviewers.length) throw reviewersNamedTwice();
    refuseDayGone(input.dueOn, clock.now());
    const payload: RevisionPayload = {
      ...placeFacts(place),
      payloadVersion: 1,
      revisionId: input.id,
      label: revisionLabel(numberAfter(previous)),
      document,
      reading,
      engineVersion: ENGINE_VERSION,
      drawnBy,
      sentBy: { id: actor.id, name: actor.name },
      reviewer: { id: first.id, name: first.name },
      reviewers: reviewers.map(({ id, name }) => ({ id, name })),
      dueOn: input.dueOn,
      sentAt: clock.now().toISOString(),
      message: wellFormed(input.message),
      blindFirst: input.blindFirst,
      stayedOpen: withReasons(await openItemsOf(manager, place.net.id, document, reading), input.reasons),
      previousHash: previous?.payloadHash ?? null,
    };
    return { payload, reviewers };
  }

  async function insertRevision(payload: RevisionPayload, number: number, changeNumber: number) {
    const { text, hash } = freezePayload(payload);
    await manager.insert(RevisionEntity, {
      id: payload.revisionId,
      netId: payload.netId,
      number,
      label: payload.label,
      changeNumber: String(changeNumber),
      payload: text,
      payloadHash: hash,
      previousHash: payload.previousHash,
      engineVersion: payload.engineVersion,
      drawnBy: payload.drawnBy.map((person) => person.id),
      sentBy: payload.sentBy.id,
      reviewerId: payload.reviewer.id,
      reviewerIds: payload.reviewers.map((person) => person.id),
      dueOn: payload.dueOn,
      message: payload.message,
      blindFirst: payload.blindFirst,
      sentAt: new Date(payload.sentAt),
    });
    return hash;
  }

  async function tell(
    { payload, hash, previous }: { payload: RevisionPayload; hash: string; previous: RevisionEntity | null },
    place: NetPlace,
    reviewers: readonly Reviewer[],
    actor: Actor,
  ) {
    const { revisionId, netId, label, message } = payload;
    const letter = sentForCheckingMail({
      ...revisionFacts(payload),
      sentBy: actor.name,
      message,
      dueOn: payload.dueOn,
      // Who is to read the net alone must not find the figures in the mail.
      changes: payload.blindFirst
        ? null
        : previous && (await changesSinceRevision(manager, previous.id, payload)),
      figures: payload.blindFirst ? null : scheduleFigures(payload),
      hash,
      url: `${config.publicUrl}/revisions/${revisionId}`,
    });
    const damId = place.dam.id;
    for (const { id, email } of reviewers)
      await queueMail(deps, { ...letter, personId: id, to: email, damId, revisionId });
    await writeEvent(manager, {
      damId,
      drawingId: place.drawing.id,
      netId,
      personId: actor.id,
      type: 'revision.sent',
      text: `sent revision ${label} of ${sectionTitle(place.section.name)}, ${place.net.name}, to ${namesText(reviewers)} for checking`,
      detail: { revisionId },
    });
    await live.publish(manager, { type: 'revisions', damId, netId });
  }

  return { send };
}

const numberAfter = (previous: RevisionEntity | null) => (previous?.number ?? 0) + 1;

function placeFacts({ net, section, sheet, drawing, dam }: NetPlace) {
  const { id, number, title, revision, sha256 } = drawing;
  return {
    netId: net.id,
    netName: net.name,
    dam: { id: dam.id, name: dam.name, datum: dam.datum },
    drawing: { id, number, title, revision, sha256 },
    section: { id: section.id, name: section.name, chainage: section.chainage },
    sheet: { id: sheet.id, pageNumber: sheet.pageNumber },
  };
}

function chooseReviewer(
  reviewers: readonly Reviewer[],
  reviewerId: string,
  drawnBy: readonly PersonRef[],
  actor: Actor,
): Reviewer {
  const reviewer = reviewers.find(({ id }) => id === reviewerId);
  if (!reviewer)
    throw invalidInput([
      { path: 'reviewerIds', message: 'This person is no reviewer of the dam, or can no longer sign in.' },
    ]);
  if (reviewer.id !== actor.id && drawnBy.every(({ id }) => id !== reviewer.id)) return reviewer;
  throw new AppError(
    'own-work',
    422,
    'Another person has to check it',
    `${reviewer.name} drew or sends this net. Choose a reviewer who did not.`,
  );
}

/** Each open item with its reason. @throws AppError invalid-input naming those without one */
function withReasons(items: readonly OpenItem[], reasons: SendInput['reasons']): StayedOpen[] {
  const given = new Map(reasons.map(({ key, reason }) => [key, reason]));
  const missing = items.filter(({ key }) => !given.has(key));
  if (missing.length > 0)
    throw invalidInput(
      missing.map(({ key, text }) => ({
        path: `reasons.${key}`,
        message: `Settle this, or give a reason why it stays: ${text}`,
      })),
    );
  return items.map((each) => ({ ...each, reason: wellFormed(given.get(each.key) ?? '') }));
}

const reviewersNamedTwice = () =>
  invalidInput([{ path: 'reviewerIds', message: 'Name at least one reviewer, and each of them once.' }]);

/** The day may be over where the server is and not yet elsewhere: one day of grace covers every time zone. */
function refuseDayGone(dueOn: string | null, now: Date): void {
  if (dueOn === null || Date.parse(dueOn) > now.getTime() - 2 * DAY_MS) return;
  throw invalidInput([{ path: 'dueOn', message: 'This day has passed. Choose a later one, or none.' }]);
}

const changedMeanwhile = (changeNumber: number) =>
  conflict(
    'conflict',
    'The net was changed meanwhile',
    'Somebody changed the net after you last saw it, so it was not sent. Look at the change and send it again.',
    { changeNumber },
  );
