import type * as z from 'zod/mini';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { BlindReading, blindReadingInput } from '#shared/contract/review.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { readBlind } from './blind-figures.ts';
import { figuresMailedWith, placesShownAt } from './blind-view.ts';
import { writeEvent } from './event-writer.ts';
import { areFiguresKeptBack, figuresOpenAlready } from './figures-kept-back.ts';
import { lockNet } from './net-locks.ts';
import { appendReviewRecord } from './review-records.ts';
import { openRevision } from './revision-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

type BlindInput = z.output<typeof blindReadingInput>;
type BlindDeps = Pick<ServiceDeps, 'manager' | 'clock' | 'live'>;

/**
 * What a reviewer does before the figures of a revision are shown: looks where the points lie, reads them on the net
 * alone, or opens the figures without. Each is a record that stays. Runs in a transaction of the caller, under the net's
 * lock.
 */
export function createBlindReadingService({ manager, clock, live }: BlindDeps) {
  /** Shows where the engineer's points lie; asked twice, it is recorded once. */
  async function showPlaces(revisionId: string, actor: Actor): Promise<void> {
    const { row } = await opened(revisionId, actor);
    if ((await placesShownAt(manager, revisionId, actor.id)) !== null) return;
    await appendReviewRecord(manager, row, actor, clock.now(), { kind: 'placesShown' });
  }

  /** Opens the figures without reading blind. Who has them open already changes nothing by asking again. */
  async function openFigures(revisionId: string, actor: Actor): Promise<void> {
    const { row, payload, isKeptBack } = await found(revisionId, actor);
    if (!isKeptBack) return;
    await appendReviewRecord(manager, row, actor, clock.now(), { kind: 'figuresOpened' });
    await announce(payload, actor, 'revision.figuresOpened', 'opened the figures of');
  }

  /** Seals the reviewer's own reading, after which the figures are open. */
  async function seal(revisionId: string, input: BlindInput, actor: Actor): Promise<void> {
    const { row, payload } = await opened(revisionId, actor);
    const reading: BlindReading = {
      ...readBlind(input, payload),
      placesShownAt: (await placesShownAt(manager, revisionId, actor.id))?.toISOString() ?? null,
      figuresMailed: figuresMailedWith(payload),
    };
    await appendReviewRecord(manager, row, actor, clock.now(), { kind: 'blindReading', reading });
    await announce(payload, actor, 'revision.blindReading', 'read points blind on');
  }

  async function opened(revisionId: string, actor: Actor) {
    const { isKeptBack, ...revision } = await found(revisionId, actor);
    if (!isKeptBack) throw figuresOpenAlready();
    return revision;
  }

  async function found(revisionId: string, actor: Actor) {
    const held = await manager.findOne(RevisionEntity, {
      select: { id: true, netId: true },
      where: { id: revisionId },
    });
    if (!held) throw notFound();
    await lockNet(manager, held.netId);
    const isKeptBack = await areFiguresKeptBack(manager, revisionId, actor.id);
    return { ...(await openRevision(manager, revisionId)), isKeptBack };
  }

  async function announce(payload: RevisionPayload, actor: Actor, type: string, did: string): Promise<void> {
    const { dam, drawing, netId, label, section, netName, revisionId } = payload;
    await writeEvent(manager, {
      damId: dam.id,
      drawingId: drawing.id,
      netId,
      personId: actor.id,
      type,
      text: `${did} revision ${label} of ${sectionTitle(section.name)}, ${netName}`,
      detail: { revisionId },
    });
    await live.publish(manager, { type: 'revisions', damId: dam.id, netId });
  }

  return { showPlaces, openFigures, seal };
}
