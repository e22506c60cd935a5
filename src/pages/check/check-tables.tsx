import { useState } from 'react';
import { HeadingSwitch } from '#client/components/heading-switch.tsx';
import { useDeskChecks } from '#client/features/desk/components/use-desk-checks.ts';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { runAgainText as text } from '#client/text/run-again.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { FrozenSchedule } from './frozen-schedule.tsx';
import { IndependentCheck } from './independent-check.tsx';
import { RunAgainPane } from './run-again-pane.tsx';
import { useRunAgain } from './use-run-again.ts';

interface CheckTablesProps {
  payload: RevisionPayload;
  store: DeskStore;
  onSheet: () => void;
}

/** The tables below the frozen sheet: what was frozen, and what can be worked out now to be held beside it. */
export function CheckTables({ payload, store, onSheet }: CheckTablesProps) {
  const [shown, setShown] = useState<keyof typeof text.views>('frozen');
  // Kept whatever is shown, so that what was worked out is there when one comes back to it.
  const checks = useDeskChecks(store);
  const again = useRunAgain(payload);
  const views = <HeadingSwitch titles={text.views} shown={shown} onShow={setShown} />;
  if (shown === 'independent') return <IndependentCheck {...{ payload, store, checks, views, onSheet }} />;
  if (shown === 'again') return <RunAgainPane payload={payload} again={again} views={views} />;
  return <FrozenSchedule payload={payload} store={store} views={views} />;
}
