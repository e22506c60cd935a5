import { describe, expect, it } from 'vitest';
import type { DeskCommand } from '#client/features/desk/model/desk-state.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { ReadingPort } from '#client/features/desk/model/reading-port.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import type { ChangesDto } from '#shared/contract/nets.ts';
import {
  appliedAt,
  countedIds,
  documentWith,
  LINE_A,
  LINE_B,
  tracedLine,
} from '#tests/support/desk/desk-fixture.ts';

const shortLine = tracedLine([
  [10, 10],
  [20, 20],
]);
const longLine = tracedLine([
  [10, 10],
  [20, 20],
  [30, 30],
]);
const theirLine = tracedLine([
  [11, 11],
  [21, 21],
]);
const okafor = { id: '00000000-0000-7000-8000-0000000000ff', name: 'R. Okafor' };

function deskWith(values: Record<string, DocumentEntity>, options = {}) {
  const store = createDeskStore(
    { document: documentWith(values), changeNumber: 4 },
    { newId: countedIds(), ...options },
  );
  const commands: DeskCommand[] = [];
  store.onCommand((command) => commands.push(command));
  return { store, commands, heldValue: (id: string) => store.getState().document.entities[id]?.value };
}

function changed(
  id: string,
  version: number,
  value: DocumentEntity | null,
  clientId: string | null = null,
): ChangesDto {
  return { changeNumber: 5, entities: [{ id, version, value, changedBy: okafor, clientId }] };
}

function conflictOn(id: string, version: number, value: DocumentEntity | null) {
  const current = value === null ? null : { id, version, value };
  return { entityId: id, outcome: 'conflict' as const, version, current, changedBy: okafor };
}

describe('running a command', () => {
  it('does nothing and tells nobody when the ops change nothing', () => {
    const { store, commands } = deskWith({ [LINE_A]: shortLine });
    store.run('nothing', [{ op: 'put', entityId: LINE_A, value: { ...shortLine } }]);
    expect(commands).toEqual([]);
    expect(store.getState().history.undoLabel).toBeNull();
  });

  it('refuses every change of a net that may only be looked at, and says so', () => {
    const { store, commands } = deskWith({}, { readOnly: true });
    const result = store.run('add', [{ op: 'put', entityId: LINE_A, value: shortLine }]);
    expect(result.ok).toBe(false);
    expect(store.getState().notice).toMatch(/looked at/);
    expect(commands).toEqual([]);
  });

  it('changes the document and tells the saving part the version it stands on', () => {
    const { store, commands, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('add a line', [{ op: 'put', entityId: LINE_B, value: shortLine }]);
    store.run('remove a line', [{ op: 'remove', entityId: LINE_A }]);
    expect(heldValue(LINE_B)).toEqual(shortLine);
    expect(heldValue(LINE_A)).toBeUndefined();
    expect(commands.map((command) => [command.number, command.label, command.ops[0]?.baseVersion])).toEqual([
      [1, 'add a line', 0],
      [2, 'remove a line', 1],
    ]);
  });

  it('drops the selection and the draft of what is removed', () => {
    const { store } = deskWith({ [LINE_A]: { ...shortLine, finished: false } });
    store.select({ kind: 'line', ids: [LINE_A] });
    store.setDraft({ lineId: LINE_A, atStart: false });
    store.run('remove', [{ op: 'remove', entityId: LINE_A }]);
    expect(store.getState().selection.kind).toBe('none');
    expect(store.getState().draft).toBeNull();
  });
});

describe('undo and redo', () => {
  it('says so when there is nothing to take back', () => {
    expect(deskWith({}).store.undo()).toMatchObject({ ok: false });
  });

  it('takes steps back and does them again by new commands', () => {
    const { store, commands, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.run('remove', [{ op: 'remove', entityId: LINE_A }]);
    store.undo();
    expect(heldValue(LINE_A)).toEqual(longLine);
    store.undo();
    expect(heldValue(LINE_A)).toEqual(shortLine);
    expect(store.getState().history).toEqual({ undoLabel: null, redoLabel: 'move' });
    store.redo();
    store.redo();
    expect(heldValue(LINE_A)).toBeUndefined();
    expect(commands).toHaveLength(6);
    expect(store.getState().history).toEqual({ undoLabel: 'remove', redoLabel: null });
  });

  it('refuses a step whose entity someone else has changed since, then offers the step before', () => {
    const { store, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('add B', [{ op: 'put', entityId: LINE_B, value: shortLine }]);
    store.run('move A', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([appliedAt(LINE_B, 1), appliedAt(LINE_A, 2)], 2);
    store.receive(changed(LINE_A, 3, theirLine));
    const result = store.undo();
    expect(result).toMatchObject({ ok: false });
    expect(store.getState().notice).toContain('move A');
    expect(heldValue(LINE_A)).toEqual(theirLine);
    expect(store.undo()).toEqual({ ok: true });
    expect(heldValue(LINE_B)).toBeUndefined();
  });

  it('still takes a step back after the server has acknowledged it, on the version acknowledged', () => {
    const { store, commands } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([appliedAt(LINE_A, 2)], 1);
    expect(store.undo()).toEqual({ ok: true });
    expect(commands[1]?.ops[0]).toEqual({ op: 'put', entityId: LINE_A, value: shortLine, baseVersion: 2 });
  });

  it('brings a removed line back on the version of its tombstone', () => {
    const { store, commands } = deskWith({ [LINE_A]: shortLine });
    store.run('remove', [{ op: 'remove', entityId: LINE_A }]);
    store.acknowledge([appliedAt(LINE_A, 2)], 1);
    store.undo();
    expect(commands[1]?.ops[0]).toEqual({ op: 'put', entityId: LINE_A, value: shortLine, baseVersion: 2 });
  });
});

describe('working beside others', () => {
  it('takes changes of entities it has not touched', () => {
    const { store, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.receive(changed(LINE_A, 2, theirLine));
    expect(heldValue(LINE_A)).toEqual(theirLine);
    expect(store.getState().changeNumber).toBe(5);
    store.receive(changed(LINE_A, 3, null));
    expect(heldValue(LINE_A)).toBeUndefined();
    expect(store.baseVersionOf(LINE_A)).toBe(3);
  });

  it('takes no version older than the one it holds', () => {
    const { store, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.receive(changed(LINE_A, 1, theirLine));
    expect(heldValue(LINE_A)).toEqual(shortLine);
  });

  it('never takes a change over one of its own that is under way, and takes it after the answer', () => {
    const { store, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.receive(changed(LINE_A, 3, theirLine));
    expect(heldValue(LINE_A)).toEqual(longLine);
    expect(store.baseVersionOf(LINE_A)).toBe(1);
    store.acknowledge([appliedAt(LINE_A, 2)], 1);
    expect(heldValue(LINE_A)).toEqual(theirLine);
    expect(store.baseVersionOf(LINE_A)).toBe(3);
  });

  it('keeps a later change of its own when an earlier one is acknowledged', () => {
    const { store, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.run('move again', [{ op: 'put', entityId: LINE_A, value: shortLine }]);
    store.acknowledge([appliedAt(LINE_A, 2)], 1);
    expect(heldValue(LINE_A)).toEqual(shortLine);
    expect(store.getState().pending).toEqual({ [LINE_A]: 2 });
    expect(store.baseVersionOf(LINE_A)).toBe(2);
  });

  it('puts a conflict to the person with both versions and holds the line until one is chosen', () => {
    const { store, commands, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([conflictOn(LINE_A, 2, theirLine)], 1);
    expect(heldValue(LINE_A)).toEqual(longLine);
    expect(store.getState().conflicts[LINE_A]).toMatchObject({
      mine: longLine,
      theirs: theirLine,
      changedBy: okafor,
    });
    expect(store.run('move', [{ op: 'put', entityId: LINE_A, value: shortLine }])).toMatchObject({
      ok: false,
    });
    store.resolveConflict(LINE_A, 'theirs');
    expect(heldValue(LINE_A)).toEqual(theirLine);
    expect(store.getState().conflicts).toEqual({});
    expect(commands).toHaveLength(1);
  });

  it('puts its own version on top of the newest when asked to', () => {
    const { store, commands, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([conflictOn(LINE_A, 2, null)], 1);
    store.receive(changed(LINE_A, 3, theirLine));
    store.resolveConflict(LINE_A, 'mine');
    expect(heldValue(LINE_A)).toEqual(longLine);
    expect(commands[1]?.ops).toEqual([{ op: 'put', entityId: LINE_A, value: longLine, baseVersion: 3 }]);
  });

  it('sees no conflict where both made the same change', () => {
    const { store } = deskWith({ [LINE_A]: shortLine });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([conflictOn(LINE_A, 2, { ...longLine })], 1);
    expect(store.getState().conflicts).toEqual({});
    expect(store.getState().pending).toEqual({});
    expect(store.baseVersionOf(LINE_A)).toBe(2);
  });

  it('puts back what was kept from an earlier visit on the version it was made on, without sending it twice', () => {
    const { store, commands, heldValue } = deskWith({ [LINE_A]: shortLine });
    store.receive(changed(LINE_A, 6, theirLine));
    const number = store.replay([{ op: 'put', entityId: LINE_A, value: longLine, baseVersion: 1 }]);
    expect(heldValue(LINE_A)).toEqual(longLine);
    expect(store.baseVersionOf(LINE_A)).toBe(1);
    expect(store.getState().pending).toEqual({ [LINE_A]: number });
    expect(commands).toEqual([]);
  });
});

type Told<K extends 'onPoints' | 'onAnswer'> = Parameters<ReadingPort[K]>[0];

describe('reading', () => {
  it('asks again after each change of a value, and not after an acknowledgement', () => {
    const asked: number[] = [];
    const reader: ReadingPort = {
      ask: (_document, revision) => asked.push(revision),
      onAnswer: () => () => undefined,
      onPoints: () => () => undefined,
      headAt: async () => null,
      close: () => undefined,
    };
    const { store } = deskWith({ [LINE_A]: shortLine }, { reader });
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    store.acknowledge([appliedAt(LINE_A, 2)], 1);
    expect(asked).toEqual([0, 1]);
    expect(store.getState()).toMatchObject({ documentRevision: 1, readingOf: -1 });
  });

  it('shows points read ahead as long as no newer document has come, and the rest as of before', () => {
    const told: { points?: Told<'onPoints'>; whole?: Told<'onAnswer'> } = {};
    const reader: ReadingPort = {
      ask: () => undefined,
      onAnswer: (listener) => {
        told.whole = listener;
        return () => undefined;
      },
      onPoints: (listener) => {
        told.points = listener;
        return () => undefined;
      },
      headAt: async () => null,
      close: () => undefined,
    };
    const { store } = deskWith({ [LINE_A]: shortLine }, { reader });
    const reading = readNet(store.getState().document);
    const ahead = { points: [...reading.points], measured: [...reading.measured] };
    told.points?.(0, ahead);
    expect(store.getState()).toMatchObject({ reading: null, pointsOf: -1 });
    told.whole?.(0, reading);
    store.run('move', [{ op: 'put', entityId: LINE_A, value: longLine }]);
    told.points?.(0, ahead);
    expect(store.getState().reading).toBe(reading);
    told.points?.(1, ahead);
    expect(store.getState()).toMatchObject({ documentRevision: 1, readingOf: 0, pointsOf: 1 });
    expect(store.getState().reading?.points).toBe(ahead.points);
    expect(store.getState().reading?.findings).toBe(reading.findings);
    told.whole?.(1, reading);
    expect(store.getState()).toMatchObject({ reading, readingOf: 1, pointsOf: 1 });
  });
});
