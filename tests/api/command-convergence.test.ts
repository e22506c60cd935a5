import fc from 'fast-check';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import type { ChangesDto, CommandBatch, CommandResult, NetOp } from '#shared/contract/nets.ts';
import type { Caller } from '#tests/support/caller.ts';
import { addNet, batchesOf, lineOf, openNet, put } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

/** What a browser knows of an entity; a null value is a removed one. */
interface Known {
  version: number;
  value: DocumentEntity | null;
}
/** Every state the server acknowledged, by entity and version: nothing may share a version, nothing may vanish. */
type Acknowledged = Map<string, DocumentEntity | null>;

const pointAt = (x: number): DocumentEntity => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name: `P${x}`,
  place: { on: 'sheet', at: [x, 1] },
  order: x,
});
const knownPointAt = (x: number): DocumentEntity => ({
  kind: 'knownPoint',
  name: `K${x}`,
  at: [x, 1],
  offset: x,
  elevation: 98,
  use: 'check',
});

/** A browser that works on its own idea of the net and hears from the server only when it sends or catches up. */
class Browser {
  readonly known = new Map<string, Known>();
  readonly #batch = batchesOf();
  #since = 0;

  constructor(
    private readonly caller: Caller,
    private readonly netId: string,
    private readonly acknowledged: Acknowledged,
  ) {}

  /** Makes one change of an entity of the shared pool. With `lost` the answer gets lost and the batch is sent again. */
  async change(entityId: string, value: DocumentEntity | null, lost: boolean): Promise<void> {
    const baseVersion = this.known.get(entityId)?.version ?? 0;
    if (value === null && baseVersion === 0) return;
    const op: NetOp = value ? put(value, entityId, baseVersion) : { op: 'remove', entityId, baseVersion };
    const batch = this.#batch([op]);
    if (lost) await this.#send(batch);
    this.#take(op, await this.#send(batch));
  }

  async #send(batch: CommandBatch): Promise<CommandResult> {
    const { status, body } = await this.caller.post(`/nets/${this.netId}/commands`, batch);
    expect([200, 409]).toContain(status);
    return body;
  }

  #take(op: NetOp, { outcomes }: CommandResult): void {
    const outcome = outcomes[0];
    if (!outcome) throw new Error('An op was not answered.');
    const applied = op.op === 'put' ? op.value : null;
    const value = outcome.outcome === 'applied' ? applied : (outcome.current?.value ?? null);
    this.known.set(op.entityId, { version: outcome.version, value });
    if (outcome.outcome === 'conflict') return;
    // Nobody's version is replaced unseen: what is applied stands on the version it was made on.
    if (op.op === 'put') expect(outcome.version).toBe(op.baseVersion + 1);
    const key = `${op.entityId} ${outcome.version}`;
    if (op.op === 'put') expect(this.acknowledged.has(key), `version ${key} twice`).toBe(false);
    this.acknowledged.set(key, applied);
  }

  async catchUp(): Promise<void> {
    const { body } = await this.caller.get(`/nets/${this.netId}/changes?since=${this.#since}`).expect(200);
    const { changeNumber, entities } = body as ChangesDto;
    for (const { id, version, value } of entities) this.known.set(id, { version, value });
    this.#since = changeNumber;
  }
}

const step = fc.record({
  browser: fc.nat(1),
  entity: fc.nat(4),
  act: fc.constantFrom('put' as const, 'put' as const, 'remove' as const, 'catchUp' as const),
  x: fc.nat(999),
  lost: fc.boolean(),
  /** Whether the next step waits for this one. */
  waits: fc.boolean(),
});

describe('two browsers that change the same net', () => {
  it('end with the same document as the server, and nothing acknowledged is lost', async () => {
    const first = await addNet(app);
    const second = await app.signIn('Sana Verma');
    await addMember(app.db, first.damId, second.person.id, 'engineer');
    await fc.assert(
      fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 30 }), async (steps) => {
        const netId = uuidv7();
        await first.caller
          .post(`/sections/${first.sectionId}/nets`, { id: netId, name: 'Trial' })
          .expect(201);
        const pool = Array.from({ length: 5 }, () => uuidv7());
        const acknowledged: Acknowledged = new Map();
        const browsers = [first, second].map(({ caller }) => new Browser(caller, netId, acknowledged));
        // Each browser sends its own changes in order; the two run past each other.
        const queues = browsers.map(() => Promise.resolve());
        for (const { browser, entity, act, x, lost, waits } of steps) {
          const one = browsers[browser]!;
          const value = act === 'remove' ? null : entity === 0 ? knownPointAt(x) : pointAt(x);
          queues[browser] = queues[browser]!.then(() =>
            act === 'catchUp' ? one.catchUp() : one.change(pool[entity]!, value, lost),
          );
          if (waits) await Promise.all(queues);
        }
        await Promise.all(queues);
        await Promise.all(browsers.map((one) => one.catchUp()));
        const { document } = await openNet(first.caller, netId);
        for (const id of pool) {
          const held = document.entities[id];
          for (const { known } of browsers) {
            expect(known.get(id)?.value ?? null).toEqual(held?.value ?? null);
            if (held) expect(known.get(id)?.version).toBe(held.version);
          }
          expectEveryVersionAccountedFor(id, browsers[0]!.known.get(id)?.version ?? 0, acknowledged);
          const newest = acknowledged.get(`${id} ${browsers[0]!.known.get(id)?.version}`);
          expect(newest ?? null).toEqual(held?.value ?? null);
        }
      }),
      { numRuns: 15 },
    );
    // Some three hundred requests one after another, on a machine that may be busy.
  }, 120_000);
});

function expectEveryVersionAccountedFor(id: string, newest: number, acknowledged: Acknowledged): void {
  for (let version = 1; version <= newest; version++)
    expect(acknowledged.has(`${id} ${version}`), `version ${version}`).toBe(true);
}

describe('twenty batches at once on one net', () => {
  const line = lineOf([
    [1, 1],
    [2, 9],
  ]);

  it('are numbered 1 to 20 without a gap and are all kept', async () => {
    const { caller, netId } = await addNet(app);
    const answers = await Promise.all(
      Array.from({ length: 20 }, () =>
        caller.post(`/nets/${netId}/commands`, batchesOf()([put(line)])).expect(200),
      ),
    );
    const numbers = answers.map(({ body }) => body.changeNumber).sort((a, b) => a - b);
    expect(numbers).toEqual(Array.from({ length: 20 }, (_, index) => index + 1));
    const detail = await openNet(caller, netId);
    expect(detail.changeNumber).toBe(20);
    expect(Object.values(detail.document.entities).filter(({ value }) => value.kind === 'line')).toHaveLength(
      20,
    );
  });

  it('and twenty that move the known points of two nets of a section do not lock each other out', async () => {
    const { caller, netId, sectionId } = await addNet(app);
    const otherId = uuidv7();
    await caller.post(`/sections/${sectionId}/nets`, { id: otherId, name: 'Flood' }).expect(201);
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, index) =>
        caller
          .post(
            `/nets/${index % 2 === 0 ? netId : otherId}/commands`,
            batchesOf()([put(index % 4 < 2 ? knownPointAt(index) : line)]),
          )
          .expect(200),
      ),
    );
    expect(answers).toHaveLength(20);
    const [one, other] = await Promise.all([openNet(caller, netId), openNet(caller, otherId)]);
    const known = (detail: typeof one) =>
      Object.values(detail.document.entities).filter(({ value }) => value.kind === 'knownPoint');
    expect(known(one)).toHaveLength(10);
    expect(known(one)).toEqual(known(other));
  });
});
