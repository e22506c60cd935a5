import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { ReadingAnswer } from '#client/features/desk/model/reading-worker.ts';
import { poorPlacesOf } from '#shared/compute/net-check/poor-places.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type FlowNetDocument, flowNetDocument } from '#shared/contract/document.ts';
import { type NetReading, netReading } from '#shared/contract/reading.ts';
import { openNet } from '#tests/support/net-fixture.ts';
import { sentRevision } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

const root = path.resolve(import.meta.dirname, '..', '..');
let app: TestApp;
let folder = '';
beforeAll(async () => {
  app = await createTestApp();
  folder = mkdtempSync(path.join(tmpdir(), 'same-figures-'));
});
afterAll(async () => {
  rmSync(folder, { recursive: true, force: true });
  await app.close();
});

/** Numbers of a reading by their paths; texts and everything else as they are. */
function leaves(value: unknown, at = ''): Array<[path: string, leaf: unknown]> {
  if (typeof value !== 'object' || value === null) return [[at, value]];
  return Object.entries(value).flatMap(([key, inner]) => leaves(inner, `${at}.${key}`));
}

/** Figures of two readings are the same to 12 significant digits, and the rest is the same altogether. */
function expectSameFigures(found: NetReading, wanted: NetReading, who: string) {
  const expected = new Map(leaves(wanted));
  const got = leaves(found);
  expect(got.length, who).toBe(expected.size);
  const differing = got.filter(([at, leaf]) => {
    const other = expected.get(at);
    if (typeof leaf !== 'number' || typeof other !== 'number') return leaf !== other;
    return leaf.toPrecision(12) !== other.toPrecision(12);
  });
  expect(differing, who).toEqual([]);
}

/** What the desk works out: the document as the page parses it, through the desk's own worker. */
async function readOnDesk(document: FlowNetDocument): Promise<NetReading> {
  const answers: ReadingAnswer[] = [];
  const scope = globalThis as unknown as {
    postMessage: (answer: ReadingAnswer) => void;
    onmessage: (event: { data: { revision: number; document: FlowNetDocument } }) => void;
  };
  scope.postMessage = (answer) => answers.push(answer);
  await import('#client/features/desk/model/reading-worker.ts');
  scope.onmessage({ data: { revision: 1, document: structuredClone(flowNetDocument.parse(document)) } });
  return answers[0]!.reading;
}

function readByCommand(text: string): NetReading {
  const file = path.join(folder, 'net.json');
  writeFileSync(file, text);
  const script = path.join(root, 'server/scripts/read-net.ts');
  const { stdout, status } = spawnSync(process.execPath, ['--import', 'tsx', script, file], {
    cwd: root,
    encoding: 'utf8',
    maxBuffer: 64 * 1024 * 1024,
  });
  expect(status).toBe(0);
  return netReading.parse(JSON.parse(stdout));
}

it('the desk, the API, the frozen revision and the command give the same figures', async () => {
  const { caller, netId, revisionId } = await sentRevision(app);
  const { document } = await openNet(caller, netId);
  const wanted = netReading.parse(readNet(document));
  expect(wanted.state).toBe('read');
  expect(wanted.points.every((point) => point.porePressure !== null)).toBe(true);
  const schedule = netReading.parse((await caller.get(`/nets/${netId}/schedule`).expect(200)).body);
  expectSameFigures(schedule, wanted, 'schedule of the API');
  const { body } = await caller.get(`/revisions/${revisionId}`).expect(200);
  expectSameFigures(netReading.parse(body.payload.reading), wanted, 'frozen revision');
  const file = (await caller.get(`/nets/${netId}/document`).expect(200)).text;
  expectSameFigures(readByCommand(file), wanted, 'command');
  // The desk is told no cells and crossings but the poor ones.
  const onDesk = { ...wanted, netCheck: poorPlacesOf(wanted.netCheck!) };
  expectSameFigures(netReading.parse(await readOnDesk(document)), onDesk, 'desk');
});
