import { v7 as newUuid } from 'uuid';
import { fetchChanges } from '#client/features/desk/api/net-queries.ts';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { createReadingClient } from '#client/features/desk/model/reading-client.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { createCatchUp } from './catch-up.ts';
import { type HistoryKeeping, keepHistory, loadSteps } from './keep-history.ts';
import { openQueueStorage, type QueueStorage, queueOwner } from './queue-storage.ts';
import type { SaveQueue } from './save-queue.ts';
import { type Saving, startSaving } from './saving.ts';
import { batchSender } from './send-commands.ts';

/** Why the traces cannot be changed here; null when they can. */
export type ReadOnlyReason = 'noPart' | 'putAway' | 'elsewhere' | null;

/** How long a page that is left goes on sending before it leaves the rest to the next visit. */
const LEAVE_WITHIN_MS = 3000;

/** One open net: its store, what saves it, and what keeps it up with others. */
export interface DeskSession {
  store: DeskStore;
  saving: Saving | null;
  /** What keeps the steps that can be taken back; null where nothing may be changed. */
  history: HistoryKeeping | null;
  readOnly: ReadOnlyReason;
  catchUp: () => Promise<void>;
  /** Gives the right to write up: writes what is left to the disk, where another tab takes it up. */
  handOver(): Promise<void>;
  /** Ends saving after what is left is on the disk, and frees the reader. Sends nothing more: another tab may write. */
  close(): Promise<void>;
  /** As `close`, for a page that is left: what waits is sent first, so that it need not wait for the next visit. */
  leave(): Promise<void>;
}

export function reasonAgainstWriting(detail: NetDetailDto): 'noPart' | 'putAway' | null {
  if (detail.net.archivedAt !== null) return 'putAway';
  return detail.can.includes('net.trace') ? null : 'noPart';
}

/** A net that is only looked at. */
export function openToRead(detail: NetDetailDto, readOnly: NonNullable<ReadOnlyReason>): DeskSession {
  const store = createDeskStore(detail, { reader: createReadingClient(), readOnly: true });
  return sessionOf(detail.net.id, { store, saving: null, history: null, readOnly });
}

/** A net to write on, with what an earlier visit left unsent laid over it. */
export async function openToWrite(
  detail: NetDetailDto,
  personId: string,
  mayKeep: boolean,
): Promise<DeskSession> {
  const owner = queueOwner(personId, detail.net.id);
  const { storage, kept } = await openKept(owner, mayKeep);
  const steps = await loadSteps(owner, mayKeep);
  const clientId = kept?.clientId ?? newUuid();
  const store = createDeskStore(detail, {
    reader: createReadingClient(),
    clientId,
    history: steps.history,
  });
  const saving = startSaving({
    desk: store,
    storage,
    owner,
    send: batchSender(detail.net.id, personId),
    kept,
    newClientId: () => clientId,
    now: Date.now,
  });
  const history = keepHistory(store, owner, steps, Date.now);
  return sessionOf(detail.net.id, { store, saving, history, readOnly: null });
}

/** A browser that keeps nothing (private windows of some) still lets one work: the state says so. */
async function openKept(
  owner: string,
  mayKeep: boolean,
): Promise<{ storage: QueueStorage | null; kept: SaveQueue | null }> {
  if (!mayKeep) return { storage: null, kept: null };
  try {
    const storage = await openQueueStorage();
    return { storage, kept: await storage.load(owner) };
  } catch {
    return { storage: null, kept: null };
  }
}

function sessionOf(
  netId: string,
  parts: Pick<DeskSession, 'store' | 'saving' | 'history' | 'readOnly'>,
): DeskSession {
  const { store, saving, history } = parts;
  const handOver = async () => {
    await Promise.all([saving?.stop(), history?.stop()]);
  };
  const close = async () => {
    await handOver();
    store.close();
  };
  return {
    ...parts,
    handOver,
    catchUp: createCatchUp(store, (since) => fetchChanges(netId, since)),
    close,
    async leave() {
      const patience = new Promise((resolve) => setTimeout(resolve, LEAVE_WITHIN_MS));
      await Promise.race([saving?.flush(), patience]);
      await close();
    },
  };
}
