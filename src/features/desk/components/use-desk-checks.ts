import { useEffect, useState } from 'react';
import { createDeskChecks, type DeskChecks } from '../model/desk-checks.ts';
import type { DeskStore } from '../model/desk-state.ts';

/** The checks of the open net, kept as long as the desk is: closing their pane takes nothing away. */
export function useDeskChecks(store: DeskStore): DeskChecks {
  const [checks] = useState(() => createDeskChecks(store));
  useEffect(() => checks.connect(), [checks]);
  return checks;
}
