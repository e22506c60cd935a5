import type { EntityManager } from 'typeorm';
import { AppError } from '#server/errors/app-error.ts';
import { compareRevisions } from '#shared/compute/compare-revisions.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { changesText } from '#shared/text/changes-text.ts';
import { openRevision } from './revision-queries.ts';

/** What changed since an earlier revision, in sentences. A damaged one is told of and holds nobody up. */
export async function changesSinceRevision(
  manager: EntityManager,
  revisionId: string,
  payload: RevisionPayload,
): Promise<string[]> {
  try {
    const before = (await openRevision(manager, revisionId)).payload;
    return changesText(compareRevisions(before, payload), payload.document.unitSystem);
  } catch (error) {
    if (error instanceof AppError && error.code === 'internal')
      return ['The record of the revision before is damaged, so the two cannot be compared.'];
    throw error;
  }
}
