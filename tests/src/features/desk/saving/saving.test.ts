import 'fake-indexeddb/auto';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { openQueueStorage, type QueueStorage } from '#client/features/desk/saving/queue-storage.ts';
import { couldLoseWork, saveStateOf } from '#client/features/desk/saving/save-state.ts';
import { type SavingDeps, startSaving } from '#client/features/desk/saving/saving.ts';
import type { SendBatch, SendOutcome } from '#client/features/desk/saving/send-commands.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import type { CommandBatch, OpOutcome } from '#shared/contract/nets.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const okafor = { id: '00000000-0000-7000-8000-0000000000ff', name: 'Remi Okafor' };
const lineTo = (x: number) =>
  tracedLine([
    [0, 0],
    [x, x],
  ]);

/** A server that keeps versions and remembers answers by number, as the real one does. */
function serverHolding(values: Record<string, DocumentEntity>) {
  const held = new Map(Object.entries(values).map(([id, value]) => [id, { version: 1, value }]));
  const answers = new Map<number, OpOutcome[]>();
  const received: CommandBatch[] = [];
  const answer = (batch: CommandBatch): SendOutcome => {
    received.push(batch);
    const outcomes = answers.get(batch.seq) ?? batch.ops.map((op) => applyOp(op));
    answers.set(batch.seq, outcomes);
    return { kind: 'answered', result: { changeNumber: received.length, outcomes } };
  };
  function applyOp(op: CommandBatch['ops'][number]): OpOutcome {
    const { entityId } = op;
    const now = held.get(entityId);
    if ((now?.version ?? 0) !== op.baseVersion) {
      const current = now ? { id: entityId, ...now } : null;
      return { entityId, outcome: 'conflict', version: now?.version ?? 0, current, changedBy: okafor };
    }
    const version = op.baseVersion + 1;
    if (op.op === 'put') held.set(entityId, { version, value: op.value });
    else held.delete(entityId);
    return { entityId, outcome: 'applied', version, current: null, changedBy: null };
  }
  return { held, received, answer };
}

let storage: QueueStorage;
let owner: string;
let owners = 0;

beforeEach(async () => {
  vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
  storage = await openQueueStorage();
  owners += 1;
  owner = `iris/net-${owners}`;
});
afterEach(() => {
  vi.useRealTimers();
});

async function open(values: Record<string, DocumentEntity>, send: SendBatch, over: Partial<SavingDeps> = {}) {
  const desk = createDeskStore({ document: documentWith(values) });
  const kept = await storage.load(owner);
  const newClientId = () => '00000000-0000-7000-8000-0000000000c1';
  const saving = startSaving({ desk, storage, owner, send, kept, newClientId, now: () => 42, ...over });
  return { desk, saving };
}
const put = (x: number) => ({ op: 'put' as const, entityId: LINE_A, value: lineTo(x) });
/** Lets time pass on the fake clock and the browser's storage, which has a time of its own, come to rest. */
async function passMs(ms: number): Promise<void> {
  await vi.advanceTimersByTimeAsync(ms);
  for (let turn = 0; turn < 12; turn += 1) await new Promise((resolve) => setImmediate(resolve));
}
const move = (desk: ReturnType<typeof createDeskStore>, x: number) => desk.run('moved a vertex', [put(x)]);

describe('saving', () => {
  it('sends a change by itself within two seconds and says when it was saved', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    move(desk, 2);
    expect(saveStateOf(saving.state.getState())).toEqual({ kind: 'saving' });
    await vi.advanceTimersByTimeAsync(2000);
    await vi.waitFor(() => expect(saveStateOf(saving.state.getState())).toEqual({ kind: 'saved', at: 42 }));
    expect(server.held.get(LINE_A)).toEqual({ version: 2, value: lineTo(2) });
  });

  it('sends a change sooner while somebody else has the net open', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    saving.setWatched(true);
    move(desk, 2);
    await passMs(300);
    expect(server.received).toHaveLength(1);
    saving.setWatched(false);
    move(desk, 3);
    await passMs(300);
    expect(server.received).toHaveLength(1);
  });

  it('keeps the work while there is no connection and sends it later, in order', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    let online = false;
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) =>
      online ? server.answer(batch) : { kind: 'failed', failure: 'offline', detail: '' },
    );
    move(desk, 2);
    await saving.flush();
    move(desk, 3);
    await vi.waitFor(() => expect(saving.state.getState().kept).toBe(true));
    expect(saveStateOf(saving.state.getState())).toMatchObject({
      kind: 'waiting',
      failure: 'offline',
      kept: true,
    });
    expect(couldLoseWork(saving.state.getState())).toBe(false);
    online = true;
    await saving.flush();
    expect(server.held.get(LINE_A)).toEqual({ version: 3, value: lineTo(3) });
  });

  it('sends what a closed tab left behind at the next opening, and shows it at once', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const first = await open({ [LINE_A]: lineTo(1) }, async () => ({
      kind: 'failed',
      failure: 'offline',
      detail: '',
    }));
    move(first.desk, 2);
    await first.saving.stop();
    const second = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    expect(second.desk.getState().document.entities[LINE_A]?.value).toEqual(lineTo(2));
    await second.saving.flush();
    expect(server.held.get(LINE_A)?.value).toEqual(lineTo(2));
  });

  it('repeats a batch whose answer was lost under the same number, so that it counts once', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    let lost = true;
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => {
      const outcome = server.answer(batch);
      if (!lost) return outcome;
      lost = false;
      return { kind: 'failed', failure: 'offline', detail: '' };
    });
    move(desk, 2);
    await saving.flush();
    move(desk, 3);
    await saving.flush();
    expect(server.received.map((batch) => batch.seq)).toEqual([1, 1, 2]);
    expect(server.held.get(LINE_A)).toEqual({ version: 3, value: lineTo(3) });
    expect(saving.state.getState().conflicts).toEqual([]);
  });

  it('gives nothing up in an hour without a network, and sends it by itself when that is back', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    let network = false;
    let signedIn = false;
    let tries = 0;
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => {
      tries += 1;
      if (!network) return { kind: 'failed', failure: 'offline', detail: '' };
      return signedIn ? server.answer(batch) : { kind: 'failed', failure: 'signedOut', detail: '' };
    });
    for (let minute = 0; minute < 60; minute += 1) {
      if (minute % 10 === 0) desk.run(`act ${minute}`, [put(minute + 2)]);
      for (let part = 0; part < 4; part += 1) await passMs(15_000);
    }
    expect(saveStateOf(saving.state.getState())).toMatchObject({ failure: 'offline', kept: true });
    expect(saving.state.getState().unsent).toBe(6);
    // At first soon, then every half minute, give or take a quarter.
    expect(tries).toBeGreaterThan(80);
    expect(tries).toBeLessThan(180);
    network = true;
    for (let part = 0; part < 4; part += 1) await passMs(15_000);
    expect(saveStateOf(saving.state.getState())).toMatchObject({ failure: 'signedOut', kept: true });
    expect(server.received).toEqual([]);
    signedIn = true;
    await saving.flush();
    expect(server.received.map(({ seq, label }) => [seq, label])).toEqual(
      [0, 10, 20, 30, 40, 50].map((minute, i) => [i + 1, `act ${minute}`]),
    );
    expect(server.held.get(LINE_A)).toEqual({ version: 7, value: lineTo(52) });
  });

  it('waits for the person to sign in again and then goes on', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    let signedIn = false;
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) =>
      signedIn ? server.answer(batch) : { kind: 'failed', failure: 'signedOut', detail: '' },
    );
    move(desk, 2);
    await saving.flush();
    await vi.advanceTimersByTimeAsync(60_000);
    expect(server.received).toEqual([]);
    expect(saveStateOf(saving.state.getState())).toMatchObject({ kind: 'waiting', failure: 'signedOut' });
    signedIn = true;
    await saving.flush();
    expect(server.held.get(LINE_A)?.value).toEqual(lineTo(2));
  });

  it("puts a newer version of somebody else's before the person, and sends mine on top when told so", async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    server.held.set(LINE_A, { version: 2, value: lineTo(9) });
    move(desk, 2);
    await saving.flush();
    expect(saveStateOf(saving.state.getState())).toEqual({
      kind: 'conflict',
      count: 1,
      changedBy: 'Remi Okafor',
    });
    expect(server.held.get(LINE_A)?.value).toEqual(lineTo(9));
    saving.settle(LINE_A, 'mine');
    await saving.flush();
    expect(server.held.get(LINE_A)).toEqual({ version: 3, value: lineTo(2) });
    expect(saving.state.getState().conflicts).toEqual([]);
  });

  it('keeps both where told so: theirs stands, mine goes out as a line of its own', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    server.held.set(LINE_A, { version: 2, value: lineTo(9) });
    move(desk, 2);
    await saving.flush();
    saving.settle(LINE_A, 'both');
    await saving.flush();
    expect(server.held.get(LINE_A)).toEqual({ version: 2, value: lineTo(9) });
    expect([...server.held.values()].map(({ value }) => value)).toEqual([lineTo(9), lineTo(2)]);
    expect(saving.state.getState()).toMatchObject({ conflicts: [], unsent: 0 });
  });

  it('keeps a conflict that was not settled over a closed tab', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const first = await open({ [LINE_A]: lineTo(1) }, async (batch) => server.answer(batch));
    server.held.set(LINE_A, { version: 2, value: lineTo(9) });
    move(first.desk, 2);
    await first.saving.flush();
    await first.saving.stop();
    const second = await open({ [LINE_A]: lineTo(9) }, async (batch) => server.answer(batch));
    expect(second.saving.state.getState().conflicts).toMatchObject([{ entityId: LINE_A, mine: lineTo(2) }]);
    second.saving.settle(LINE_A, 'theirs');
    expect(second.desk.getState().document.entities[LINE_A]?.value).toEqual(lineTo(9));
  });

  it('goes on after a change the server will never take, and says which it was', async () => {
    const server = serverHolding({ [LINE_A]: lineTo(1) });
    const { desk, saving } = await open({ [LINE_A]: lineTo(1) }, async (batch) =>
      batch.seq === 1
        ? { kind: 'refused', reason: 'Too many points.', requestId: 'r-1' }
        : server.answer(batch),
    );
    desk.run('drew a line', [{ op: 'put', entityId: LINE_A, value: lineTo(2) }]);
    desk.run('moved a vertex', [{ op: 'put', entityId: LINE_A, value: lineTo(3) }]);
    await saving.flush();
    expect(saveStateOf(saving.state.getState())).toEqual({
      kind: 'refused',
      label: 'drew a line',
      reason: 'Too many points.',
      requestId: 'r-1',
    });
    expect(server.held.get(LINE_A)?.value).toEqual(lineTo(3));
  });

  it('warns before leaving only when this browser could keep nothing', async () => {
    const { desk, saving } = await open(
      { [LINE_A]: lineTo(1) },
      async () => ({ kind: 'failed', failure: 'offline', detail: '' }),
      { storage: null },
    );
    move(desk, 2);
    await saving.flush();
    expect(couldLoseWork(saving.state.getState())).toBe(true);
  });
});
