import { useEffect } from 'react';
import { useStore } from 'zustand';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { DeskChecks, WaysState } from '../model/desk-checks.ts';

/**
 * Draws over the sheet how a point is read by hand, as long as the component that uses this is there. `document` is the
 * one that the reading shown is of; null while there is no reading to explain.
 */
export function usePointWays(
  checks: DeskChecks,
  document: FlowNetDocument | null,
  pointId: string,
): WaysState {
  useEffect(() => {
    checks.explain(document === null ? null : { document, pointId });
    return () => checks.explain(null);
  }, [checks, document, pointId]);
  return useStore(checks, (state) => state.ways);
}
