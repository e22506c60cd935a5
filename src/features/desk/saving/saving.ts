import { createStore, type StoreApi } from 'zustand/vanilla';
import { keepAsCopy } from '#client/features/desk/model/conflict-copy.ts';
import type { DeskCommand, DeskStore } from '#client/features/desk/model/desk-state.ts';
import { AUTOSAVE_MS } from '#shared/contract/limits.ts';
import type { OpOutcome } from '#shared/contract/nets.ts';
import type { QueueStorage } from './queue-storage.ts';
import { restoreQueue } from './restore-queue.ts';
import {
  answered,
  emptyQueue,
  enqueue,
  forgetRefused,
  type SaveQueue,
  setAside,
  settled,
  takeFirst,
} from './save-queue.ts';
import { pauseBeforeRetry, type SaveFacts, type SendFailure } from './save-state.ts';
import type { SendBatch } from './send-commands.ts';

export interface SavingDeps {
  desk: DeskStore;
  /** Null where this browser can keep nothing; the work is then only in memory and the page says so. */
  storage: QueueStorage | null;
  owner: string;
  send: SendBatch;
  /** Queue kept from an earlier visit, and a client id for a new one. */
  kept: SaveQueue | null;
  newClientId: () => string;
  now: () => number;
}

export interface SavingState extends SaveFacts {
  conflicts: SaveQueue['conflicts'];
  refused: SaveQueue['refused'];
  /** The server's own words about the failure. */
  detail: string;
}

/** Others see a change within two seconds, of which this is the part that is waited on purpose. */
const WATCHED_MS = 250;

export type ConflictChoice = 'mine' | 'theirs' | 'both';

export interface Saving {
  state: StoreApi<SavingState>;
  clientId: string;
  /** Sends now what waits, whatever the pause under way. */
  flush(): Promise<void>;
  /** Settles a conflict; `both` lets the other version stand and puts this person's beside it as a thing of its own. */
  settle(entityId: string, keep: ConflictChoice): void;
  forgetRefused(): void;
  /** Sends changes sooner while somebody else has the net open and waits to see them. */
  setWatched(watched: boolean): void;
  /** Ends sending and waits until what is left is on the disk. */
  stop(): Promise<void>;
}

/** Carries the desk's commands to the server: kept first, then sent in order, tried again until they are answered. */
export function startSaving(deps: SavingDeps): Saving {
  const { desk, storage, owner } = deps;
  let queue: SaveQueue = deps.kept ?? emptyQueue(deps.newClientId());
  let stored: SaveQueue | null = deps.kept;
  let storing: Promise<void> = Promise.resolve();
  let failures = 0;
  let pumping: Promise<void> | null = null;
  let stopped = false;
  let watched = false;
  let timer: ReturnType<typeof setTimeout> | null = null;

  const state = createStore<SavingState>(() => ({
    unsent: 0,
    failure: null,
    detail: '',
    kept: true,
    savedAt: null,
    conflicts: [],
    refused: [],
  }));

  function change(next: SaveQueue): void {
    queue = next;
    const { conflicts, refused, batches } = queue;
    state.setState({ unsent: batches.length, conflicts, refused, kept: queue === stored });
    storing = storing.then(keep);
  }

  async function keep(): Promise<void> {
    if (!storage || queue === stored) return;
    const target = queue;
    try {
      await storage.save(owner, stored, target);
      stored = target;
      state.setState({ kept: queue === stored });
    } catch {
      // A full disk or a browser that allows no storage: the state says "not kept" and leaving the page warns.
      state.setState({ kept: false });
    }
  }

  function sendIn(pauseMs: number): void {
    if (stopped) return;
    timer ??= setTimeout(() => {
      timer = null;
      void pump();
    }, pauseMs);
  }

  /** Sends until nothing waits or sending fails; a second call waits for the one under way. */
  function pump(): Promise<void> {
    pumping ??= sendAll().finally(() => {
      pumping = null;
    });
    return pumping;
  }

  async function sendAll(): Promise<void> {
    while (!stopped && (await sendFirst()));
  }

  async function sendFirst(): Promise<boolean> {
    const taken = takeFirst(queue);
    if (!taken) return false;
    change(taken.queue);
    // On the disk as tried before it leaves, or a reload could send something else under the same number.
    await storing;
    const outcome = await deps.send(taken.batch);
    if (stopped) return false;
    if (outcome.kind === 'failed') return failed(outcome.failure, outcome.detail);
    failures = 0;
    state.setState({ failure: null, detail: '' });
    if (outcome.kind === 'refused') change(setAside(queue, outcome));
    else takeAnswer(taken.batch.seq, outcome.result);
    return true;
  }

  function takeAnswer(seq: number, result: { changeNumber: number; outcomes: OpOutcome[] }): void {
    const through = queue.batches.find((batch) => batch.seq === seq)?.through ?? 0;
    change(answered(queue, seq, result));
    desk.acknowledge(result.outcomes, through);
    state.setState({ savedAt: deps.now() });
  }

  function failed(failure: SendFailure, detail: string): false {
    failures += 1;
    state.setState({ failure, detail });
    // The others wait for the person: signing in, or asking for a part on the dam.
    if (failure === 'offline' || failure === 'server') sendIn(pauseBeforeRetry(failures, Math.random()));
    return false;
  }

  if (deps.kept) queue = restoreQueue(desk, deps.kept);
  const endCommands = desk.onCommand((command: DeskCommand) => {
    change(enqueue(queue, command));
    sendIn(watched ? WATCHED_MS : AUTOSAVE_MS);
  });
  change(queue);
  if (queue.batches.length > 0) sendIn(0);

  return {
    state,
    clientId: queue.clientId,
    async flush() {
      if (timer) clearTimeout(timer);
      timer = null;
      await pump();
    },
    settle(entityId, choice) {
      const mine = desk.getState().conflicts[entityId]?.mine ?? null;
      change(settled(queue, entityId));
      // "mine" comes back as a command of the desk, based on the other one's version.
      desk.resolveConflict(entityId, choice === 'mine' ? 'mine' : 'theirs');
      if (choice === 'both' && mine !== null) keepAsCopy(desk, mine);
    },
    forgetRefused: () => change(forgetRefused(queue)),
    setWatched(next) {
      watched = next;
    },
    async stop() {
      stopped = true;
      if (timer) clearTimeout(timer);
      endCommands();
      await storing;
    },
  };
}
