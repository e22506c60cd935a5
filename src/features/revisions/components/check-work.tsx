import { createContext, type ReactNode, useContext, useMemo } from 'react';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { type FigureToCheck, figuresToCheck } from '#shared/text/figures-to-check.ts';
import { type DraftChange, useCheckDraft } from '../api/use-check-draft.ts';

/** What a reviewer has to check of a revision, and how far they are. */
export interface CheckWorkState {
  figures: readonly FigureToCheck[];
  checking: NonNullable<RevisionDto['checking']>;
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
  const { summary, payload, checking } = revision;
  const { change, error } = useCheckDraft(summary.id);
  const figures = useMemo(() => figuresToCheck(payload.document, payload.reading), [payload]);
  const work = useMemo(
    () => checking && { figures, checking, ticked: new Set(checking.draft.ticks), change, error },
    [figures, checking, change, error],
  );
  return <Context value={work}>{children}</Context>;
}
