import type { CommandOp, DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { SaveConflict, SaveQueue } from './save-queue.ts';

/**
 * Lays work kept from an earlier visit over the document the server gave, and numbers it anew: command numbers
 * count within one visit of the desk.
 */
export function restoreQueue(desk: DeskStore, kept: SaveQueue): SaveQueue {
  const batches = kept.batches.map((batch) => ({ ...batch, through: desk.replay(batch.ops) }));
  for (const conflict of kept.conflicts) restoreConflict(desk, conflict);
  return { ...kept, batches };
}

/** The person's version goes back on the sheet and stays in question, beside what the server holds now. */
function restoreConflict(desk: DeskStore, { entityId, mine, theirVersion, changedBy }: SaveConflict): void {
  const current = desk.getState().document.entities[entityId] ?? null;
  const version = current?.version ?? theirVersion;
  const op: CommandOp = mine
    ? { op: 'put', entityId, value: mine, baseVersion: version }
    : { op: 'remove', entityId, baseVersion: version };
  const through = desk.replay([op]);
  desk.acknowledge([{ entityId, outcome: 'conflict', version, current, changedBy }], through);
}
