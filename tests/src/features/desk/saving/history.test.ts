import 'fake-indexeddb/auto';
import { describe, expect, it } from 'vitest';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { openHistoryStorage } from '#client/features/desk/saving/history-storage.ts';
import { keepHistory, loadSteps } from '#client/features/desk/saving/keep-history.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import { documentWith, LINE_A, LINE_B, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const lineTo = (x: number) =>
  tracedLine([
    [0, 0],
    [x, x],
  ]);
const twoLines = { [LINE_A]: lineTo(1), [LINE_B]: lineTo(1) };
let clock = 0;
const now = () => {
  clock += 1;
  return clock;
};

/** Opens the desk as a visit does: with the steps that earlier visits left. */
async function visit(owner: string, document: FlowNetDocument, largest?: number) {
  const steps = await loadSteps(owner, true);
  const desk = createDeskStore({ document }, { history: steps.history });
  return { desk, keeping: keepHistory(desk, owner, steps, now, largest) };
}
const move = (desk: DeskStore, id: string, x: number) =>
  desk.run(`moved to ${x}`, [{ op: 'put', entityId: id, value: lineTo(x) }]);
const lineOf = (desk: DeskStore, id: string): DocumentEntity | undefined =>
  desk.getState().document.entities[id]?.value;
const labels = (desk: DeskStore) => desk.getState().steps.done.map(({ label }) => label);

describe('the steps of a visit', () => {
  it('are none at the first opening', async () => {
    const { desk, keeping } = await visit('iris/first', documentWith(twoLines));
    expect(desk.getState().history).toEqual({ undoLabel: null, redoLabel: null });
    expect(keeping.facts.getState()).toEqual({ kept: true, dropped: 0 });
  });

  it('are taken back and done again after a reload', async () => {
    const first = await visit('iris/reload', documentWith(twoLines));
    for (const x of [2, 3, 4]) move(first.desk, LINE_A, x);
    first.desk.undo();
    await first.keeping.stop();
    const second = await visit('iris/reload', first.desk.getState().document);
    expect(second.desk.getState().history).toEqual({ undoLabel: 'moved to 3', redoLabel: 'moved to 4' });
    second.desk.redo();
    expect(lineOf(second.desk, LINE_A)).toEqual(lineTo(4));
    second.desk.undo(3);
    expect(lineOf(second.desk, LINE_A)).toEqual(lineTo(1));
  });

  it('that somebody else has built on are refused with the reason, and those of other lines still work', async () => {
    const first = await visit('iris/others', documentWith(twoLines));
    move(first.desk, LINE_B, 5);
    move(first.desk, LINE_A, 6);
    await first.keeping.stop();
    const second = await visit('iris/others', documentWith({ [LINE_A]: lineTo(7), [LINE_B]: lineTo(5) }));
    expect(second.desk.undo(2)).toMatchObject({ ok: false, reason: expect.stringContaining('moved to 6') });
    expect(lineOf(second.desk, LINE_A)).toEqual(lineTo(7));
    expect(lineOf(second.desk, LINE_B)).toEqual(lineTo(1));
    expect(second.desk.getState().notice).toContain('moved to 6');
  });

  it('fit into a bounded place: the oldest go, are counted, and stay at hand in the visit itself', async () => {
    const first = await visit('iris/many', documentWith(twoLines), 4000);
    for (let x = 2; x <= 40; x += 1) move(first.desk, LINE_A, x);
    expect(labels(first.desk)).toHaveLength(39);
    await first.keeping.stop();
    const { dropped } = first.keeping.facts.getState();
    const second = await visit('iris/many', first.desk.getState().document, 4000);
    expect(dropped).toBeGreaterThan(0);
    expect(labels(second.desk)).toEqual(labels(first.desk).slice(dropped));
    expect(second.keeping.facts.getState().dropped).toBe(dropped);
  });

  it('of a visit that ended before its last step was written are refused where they no longer fit', async () => {
    const first = await visit('iris/sudden', documentWith(twoLines));
    move(first.desk, LINE_A, 2);
    await first.keeping.stop();
    move(first.desk, LINE_A, 3);
    const second = await visit('iris/sudden', first.desk.getState().document);
    expect(second.desk.undo()).toMatchObject({ ok: false });
    expect(lineOf(second.desk, LINE_A)).toEqual(lineTo(3));
  });

  it('are kept apart for each person and net, those used last of twenty nets', async () => {
    for (let net = 0; net < 22; net += 1) {
      const each = await visit(`tove/net-${net}`, documentWith(twoLines));
      move(each.desk, LINE_A, net + 2);
      await each.keeping.stop();
    }
    const storage = await openHistoryStorage();
    expect(await storage.load('tove/net-0')).toBeNull();
    expect((await storage.load('tove/net-21'))?.done.map(({ step }) => step.label)).toEqual(['moved to 23']);
  });
});
