import type * as z from 'zod/mini';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { CheckDraftEntity } from '#server/entities/review-entity.ts';
import { AppError, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { decisionRefusal } from '#server/policies/revision-policy.ts';
import type { CheckListAnswer, CheckListItem } from '#shared/contract/check-list.ts';
import type { CheckDraft, checkDraftPatch, FrozenCheck } from '#shared/contract/review.ts';
import type { DecisionKind, RevisionPayload } from '#shared/contract/revisions.ts';
import { figuresToCheck } from '#shared/text/figures-to-check.ts';
import { lockNet } from './net-locks.ts';
import { checkDraftOf, checkListOfDam } from './review-queries.ts';
import { decisionFacts, openRevision } from './revision-queries.ts';
import type { ServiceDeps } from './service-deps.ts';
import { wellFormed } from './well-formed.ts';

type Deps = Pick<ServiceDeps, 'manager' | 'clock'>;

/** Ticks and answers of a reviewer while checking, kept until the decision freezes them. */
export function createCheckDraftService({ manager, clock }: Deps) {
  /** Changes what the patch names. Runs in a transaction of the caller. @throws AppError for who may not decide */
  async function change(
    revisionId: string,
    patch: z.output<typeof checkDraftPatch>,
    actor: Actor,
  ): Promise<CheckDraft> {
    const held = await manager.findOne(RevisionEntity, {
      select: { id: true, netId: true },
      where: { id: revisionId },
    });
    if (!held) throw notFound();
    // The decision holds the same lock, so that no tick comes after it.
    await lockNet(manager, held.netId);
    const { row, payload } = await openRevision(manager, revisionId);
    const refusal = decisionRefusal(await decisionFacts(manager, row, actor.id));
    if (refusal) throw new AppError(refusal.code, 409, 'You are not checking this revision', refusal.text);
    refuseUnknown(patch.ticked, payload);
    const before = await checkDraftOf(manager, revisionId, actor.id);
    const list = await checkListOfDam(manager, payload.dam.id);
    const draft = changed(before, patch, list);
    await manager.upsert(
      CheckDraftEntity,
      { revisionId, personId: actor.id, ...draft, changedAt: clock.now() },
      ['revisionId', 'personId'],
    );
    return draft;
  }

  /** What a decision freezes of the reviewer's draft. @throws AppError invalid-input for an acceptance with gaps */
  async function freeze(
    payload: RevisionPayload,
    decision: DecisionKind,
    actor: Actor,
  ): Promise<FrozenCheck> {
    const draft = await checkDraftOf(manager, payload.revisionId, actor.id);
    const list = await checkListOfDam(manager, payload.dam.id);
    const answers = new Map(draft.answers.map((each) => [each.itemId, each]));
    const checkList = list.map(({ id, text }) => ({
      id,
      text,
      answer: answers.get(id)?.answer ?? null,
      remark: answers.get(id)?.remark ?? '',
    }));
    if (decision !== 'returned') refuseGaps(checkList);
    const ticks = new Set(draft.ticks);
    const figures = figuresToCheck(payload.document, payload.reading).map(({ key, of, what, value }) => ({
      key,
      of,
      what,
      value,
      ticked: ticks.has(key),
    }));
    return { figures, checkList };
  }

  return { change, freeze };
}

function refuseUnknown(ticked: readonly string[], { document, reading }: RevisionPayload): void {
  if (ticked.length === 0) return;
  const known = new Set(figuresToCheck(document, reading).map(({ key }) => key));
  if (ticked.every((key) => known.has(key))) return;
  throw invalidInput([{ path: 'ticked', message: 'a figure that was ticked is not in this revision' }]);
}

/** Answers to items that the list no longer holds go: they belong to other words. */
function changed(
  before: CheckDraft,
  { ticked, unticked, answers }: z.output<typeof checkDraftPatch>,
  list: readonly CheckListItem[],
): CheckDraft {
  const off = new Set(unticked);
  const known = new Set(list.map(({ id }) => id));
  const byItem = new Map<string, CheckListAnswer>();
  for (const each of [...before.answers, ...answers])
    if (known.has(each.itemId)) byItem.set(each.itemId, { ...each, remark: wellFormed(each.remark) });
  return {
    ticks: [...new Set([...before.ticks, ...ticked])].filter((key) => !off.has(key)).sort(),
    answers: [...byItem.values()],
  };
}

/**
 * An acceptance answers every item, and says why it stands where one is answered with no. It is refused rather than asked
 * about: "does not apply" is always an answer, and an acceptance with gaps would leave the reader in twenty years to guess.
 */
function refuseGaps(checkList: FrozenCheck['checkList']): void {
  const gaps = checkList.filter(({ answer }) => answer === null);
  const bare = checkList.filter(({ answer, remark }) => answer === 'no' && remark === '');
  if (gaps.length + bare.length === 0) return;
  throw invalidInput([
    ...gaps.map(({ id, text }) => ({
      path: `checkList.${id}`,
      message: `Answer this before you accept, if need be with "does not apply": ${text}`,
    })),
    ...bare.map(({ id, text }) => ({
      path: `checkList.${id}`,
      message: `You answered no. Say in a remark why it can be accepted all the same: ${text}`,
    })),
  ]);
}
