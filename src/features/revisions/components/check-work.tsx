import { createContext, type ReactNode, useContext, useMemo } from 'react';
import type { CheckListItem } from '#shared/contract/check-list.ts';
import type { CheckDraft } from '#shared/contract/review.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { type FigureToCheck, figuresToCheck } from '#shared/text/figures-to-check.ts';
import { type DraftChange, useCheckDraft } from '../api/use-check-draft.ts';

/** What a reviewer has to check of a revision, and how far they are. */
export interface CheckWorkState {
  figures: readonly FigureToCheck[];
  checkList: readonly CheckListItem[];
  draft: CheckDraft;
  ticked: ReadonlySet<string>;
  change: (change: DraftChange) => void;
  /** Why the last change could not be kept. */
  error: unknown;
}

const Context = createContext<CheckWorkState | null>(null);

/** The work of who checks the revision on the page; null for everybody else. */
export const useCheckWork = () => useContext(Context);

/** Gives every figure below it the tick of who checks the revision. */
export function CheckWork({ revision, children }: { revision: RevisionDto; children: ReactNode }) {
  const { payload, checking } = revision;
  const { draft, change, error } = useCheckDraft(revision);
  const figures = useMemo(() => figuresToCheck(payload.document, payload.reading), [payload]);
  const work = useMemo(
    () =>
      checking &&
      draft && { figures, checkList: checking.checkList, draft, ticked: new Set(draft.ticks), change, error },
    [figures, checking, draft, change, error],
  );
  return <Context value={work}>{children}</Context>;
}
