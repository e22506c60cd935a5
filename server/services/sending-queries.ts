import { type EntityManager, Not } from 'typeorm';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { NoteEntity } from '#server/entities/note-entity.ts';
import { type AppError, conflict, unprocessable } from '#server/errors/app-error.ts';
import { beforeSending } from '#shared/compute/before-sending.ts';
import type { OpenItem } from '#shared/contract/before-sending.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';
import { namesText } from '#shared/text/names-text.ts';
import { readDocument } from './net-document.ts';
import { drawersOfNet } from './net-drawers.ts';
import { type NetPlace, placeOfNet, putAwayRefusal } from './net-place.ts';
import { revisionLabel } from './revision-label.ts';
import { revisionStateOf } from './revision-queries.ts';
import { readingOf } from './schedule-queries.ts';

export interface Reviewer extends PersonRef {
  email: string;
}

/** The dam's reviewers who can sign in, by name. */
export function reviewersOfDam(manager: EntityManager, damId: string): Promise<Reviewer[]> {
  return manager.query(
    `SELECT p.id, p.name, p.email FROM membership m JOIN person p ON p.id = m.person_id
     WHERE m.dam_id = $1 AND 'reviewer' = ANY(m.roles)
       AND p.deactivated_at IS NULL AND p.password_hash IS NOT NULL
     ORDER BY p.name, p.id`,
    [damId],
  );
}

/** The newest revision of a net; null when none was sent. */
export function newestRevision(manager: EntityManager, netId: string): Promise<RevisionEntity | null> {
  return manager.findOne(RevisionEntity, { where: { netId }, order: { number: 'DESC' } });
}

/**
 * What stands in the way of sending the net as it is, whoever sends it to whom; null when nothing does. A revision
 * that still waits for a reviewer who can decide is not sent a second time unchanged.
 */
export async function sendingRefusal(
  manager: EntityManager,
  place: NetPlace,
  reading: NetReading,
  newest: RevisionEntity | null,
  reviewers: readonly Reviewer[],
): Promise<AppError | null> {
  const away = putAwayRefusal(place);
  if (away) return away;
  if (reading.state === 'unfinished') return unfinished(reading);
  if (!newest || newest.changeNumber !== place.net.changeNumber) return null;
  if ((await revisionStateOf(manager, newest.id)) !== 'waiting') return null;
  const ready = reviewers.filter((each) => newest.reviewerIds.includes(each.id));
  // With one reviewer gone it can never be accepted, so it may go to others.
  if (ready.length < newest.reviewerIds.length) return null;
  return conflict(
    'conflict',
    'This has been sent already',
    `The net as it stands has been sent to ${namesText(ready)} as revision ${newest.label}. Wait for the decision, withdraw that revision, or change the net and send it again.`,
  );
}

function unfinished({ findings }: NetReading): AppError {
  const first = findings.find(({ weight }) => weight === 'missing' || weight === 'wrong');
  return unprocessable(
    'net-unfinished',
    'The net is unfinished',
    `The net is unfinished and gives no figures, so it cannot be checked. ${first?.text ?? ''}`.trim(),
  );
}

/** What is still open on the net; nothing is said of an unfinished one, which is refused as a whole. */
export async function openItemsOf(
  manager: EntityManager,
  netId: string,
  document: FlowNetDocument,
  reading: NetReading,
): Promise<OpenItem[]> {
  if (reading.state !== 'read') return [];
  const notes = await manager.find(NoteEntity, {
    select: { id: true, number: true },
    where: { netId, state: Not('closed') },
    order: { number: 'ASC' },
  });
  return beforeSending(
    document,
    reading,
    notes.map(({ number }) => number),
  );
}

/** What to know before sending for checking. @throws AppError not-found */
export async function sendingOf(manager: EntityManager, netId: string, actorId: string): Promise<SendingDto> {
  const place = await placeOfNet(manager, netId);
  const reading = await readingOf(manager, place);
  const newest = await newestRevision(manager, netId);
  const reviewers = await reviewersOfDam(manager, place.dam.id);
  const drew = new Set([actorId, ...(await drawersOfNet(manager, netId)).map((person) => person.id)]);
  const refusal = await sendingRefusal(manager, place, reading, newest, reviewers);
  return {
    reviewers: reviewers.map(({ id, name, email }) => ({
      person: { id, name },
      email,
      drew: drew.has(id),
    })),
    findings: reading.state === 'read' ? [] : reading.findings,
    open: await openItemsOf(manager, netId, await readDocument(manager, place), reading),
    refusal: refusal?.detail ?? null,
    nextLabel: revisionLabel((newest?.number ?? 0) + 1),
  };
}
