import { afterEach, describe, expect, it } from 'vitest';
import type { AskedWorker } from '#client/features/desk/model/asked-worker.ts';
import { faultKey } from '#client/features/desk/model/check-guides.ts';
import { createDeskChecks } from '#client/features/desk/model/desk-checks.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type {
  IndependentAnswer,
  IndependentQuestion,
} from '#client/features/desk/model/independent-worker.ts';
import type { WaysAnswer, WaysQuestion } from '#client/features/desk/model/ways-worker.ts';
import type { BesideSolution } from '#shared/compute/beside/beside-solution.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { withFlowLineMoved } from '#tests/support/exact-nets/poorly-drawn.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const drawn = exactNetDocument(net, { pxPerUnit });
const poor = withFlowLineMoved(net, { pxPerUnit }, 1, 1.45);

const beside: BesideSolution = {
  comparison: {
    points: [],
    seepage: { traced: null, independent: null, difference: null, part: null },
    outlets: [],
  },
  headLost: 20,
  hasPermeability: true,
  usesPhreaticLine: false,
  exits: [],
  net: {
    drops: 10,
    dropHead: 2,
    channels: 3,
    equipotentials: [{ value: 10, lines: [corner(0)] }],
    flowLines: [{ value: 1, lines: [corner(5), corner(9)] }],
    surface: [corner(20)],
  },
  picture: {
    above: [[corner(1)], [], []],
    below: [[], [], []],
    greatestAbove: { at: [3, 3], head: 0.4, part: 0.02 },
    greatestBelow: { at: [4, 4], head: -0.1, part: -0.005 },
    compared: 40,
  },
  imbalance: 0,
  gap: 0.0001,
  surfaceMisfit: null,
  nodeCount: 4000,
};

function corner(at: number): SheetPoint[] {
  return [
    [at, at],
    [at + 1, at],
    [at + 1, at + 1],
  ];
}

type Standin<Question, Answer> = AskedWorker<Question, Answer> & {
  asked: Question[];
  ended: boolean;
  say(answer: Answer): void;
};

function standIn<Question, Answer>(made: Array<Standin<Question, Answer>>): Standin<Question, Answer> {
  const worker: Standin<Question, Answer> = {
    asked: [],
    ended: false,
    onmessage: null,
    onerror: null,
    postMessage: (question) => void worker.asked.push(question),
    terminate: () => {
      worker.ended = true;
    },
    say: (answer) => worker.onmessage?.({ data: answer } as MessageEvent<Answer>),
  };
  made.push(worker);
  return worker;
}

/** Each net is read once. */
const readings = new Map([drawn, poor].map((document) => [document, readNet(document)]));

function desk(document: FlowNetDocument) {
  const workers: Array<Standin<IndependentQuestion, IndependentAnswer>> = [];
  const explainers: Array<Standin<WaysQuestion, WaysAnswer>> = [];
  const store = createDeskStore({ document }, { reading: readings.get(document)! });
  const checks = createDeskChecks(store, {
    independent: () => standIn(workers),
    ways: () => standIn(explainers),
  });
  const end = checks.connect();
  return { store, checks, workers, explainers, end, guides: () => store.getState().guides };
}

let open: ReturnType<typeof desk>;
afterEach(() => open.end());

describe('how a point is read, over the sheet', () => {
  const ways: WaysAnswer = {
    strip: corner(0),
    toBefore: [
      [5, 5],
      [5, 1],
    ],
    toAfter: [
      [5, 5],
      [7, 7],
      [7, 9],
    ],
    fraction: 0.25,
  };

  it('tints the strip and draws both ways with their parts, and goes when the point is left', () => {
    open = desk(drawn);
    const { checks, explainers, guides } = open;
    checks.explain({ document: drawn, pointId: 'p' });
    expect(checks.getState().ways).toBe('working');
    explainers[0]!.say(ways);
    expect(checks.getState().ways).toBe('shown');
    expect(guides().explanation?.areas.map(({ tone }) => tone)).toEqual(['strip']);
    expect(guides().explanation?.lines.map(({ points }) => points.length)).toEqual([2, 3]);
    // The part of the interval stands on the last piece of its way.
    expect(guides().explanation?.marks.map(({ at, text }) => [at, text])).toEqual([
      [[5, 3], '0.25'],
      [[7, 8], '0.75'],
    ]);
    checks.explain(null);
    expect(guides().explanation).toBeUndefined();
  });

  it('keeps its worker from point to point, and gives one up that is still at work', () => {
    open = desk(drawn);
    const { checks, explainers, guides } = open;
    checks.explain({ document: drawn, pointId: 'p' });
    explainers[0]!.say(ways);
    checks.explain({ document: drawn, pointId: 'q' });
    expect(explainers).toHaveLength(1);
    checks.explain({ document: drawn, pointId: 'r' });
    expect(explainers).toHaveLength(2);
    expect(explainers[0]!.ended).toBe(true);
    explainers[0]!.say(ways);
    expect(guides().explanation).toBeUndefined();
    explainers[1]!.onerror?.({ preventDefault: () => undefined } as ErrorEvent);
    expect(checks.getState().ways).toBe('failed');
  });
});

describe('the net check over the sheet', () => {
  it('shows poor cells with their ratio when asked to, and the chosen one apart', () => {
    open = desk(poor);
    const { checks, guides, store } = open;
    const { faults, cells } = store.getState().reading!.netCheck!;
    expect(faults.length).toBeGreaterThan(0);
    expect(guides().netCheck).toBeUndefined();
    checks.showNetCheck(true);
    const poorCells = cells.filter(({ judgement }) => judgement === 'poor');
    expect(guides().netCheck?.areas).toHaveLength(poorCells.length);
    expect(guides().netCheck?.marks[0]?.text).toMatch(/^B\/L \d\.\d\d$/);
    const worst = faults.find(({ of }) => of === 'cells')!;
    checks.chooseFault(faultKey(worst));
    const chosen = guides().netCheck?.areas.filter(({ tone }) => tone === 'chosenCell');
    expect(chosen?.map(({ id }) => id)).toEqual([faultKey(worst)]);
    checks.showNetCheck(false);
    expect(guides().netCheck).toBeUndefined();
  });

  it('shows nothing over a net that is well drawn', () => {
    open = desk(drawn);
    open.checks.showNetCheck(true);
    expect(open.guides().netCheck).toEqual({ areas: [], lines: [], marks: [] });
  });
});

describe('the independent solution beside the net', () => {
  it('starts its worker only when asked, tells how far it is, and lays the computed net over the sheet', () => {
    open = desk(drawn);
    const { checks, workers, guides } = open;
    expect(workers).toHaveLength(0);
    checks.solve();
    const [worker] = workers;
    expect(worker!.asked[0]!.reading).not.toBeNull();
    worker!.say({ state: 'working', stage: 'solving' });
    expect(checks.getState().independent).toEqual({ state: 'working', stage: 'solving' });
    worker!.say({ state: 'done', beside });
    expect(checks.getState()).toMatchObject({ independent: { state: 'none' }, result: { of: 0 } });
    expect(guides().computedNet?.lines).toHaveLength(4);
    checks.showNet(false);
    expect(guides().computedNet).toBeUndefined();
  });

  it('draws the differences when asked, with figures only where they are worth a word', () => {
    open = desk(drawn);
    const { checks, workers, guides } = open;
    checks.solve();
    workers[0]!.say({ state: 'done', beside });
    expect(guides().differences).toBeUndefined();
    checks.showDifferences(true);
    expect(guides().differences?.areas.map(({ tone }) => tone)).toEqual(['above1']);
    expect(guides().differences?.marks.map(({ text }) => text)).toEqual(['+0.40 m']);
  });

  it('is out of date once the document has changed, and kept until it is solved again', () => {
    open = desk(drawn);
    const { checks, workers, store } = open;
    checks.solve();
    workers[0]!.say({ state: 'done', beside });
    const [line] = Object.values(drawn.entities).filter(({ value }) => value.kind === 'line');
    store.run('removed', [{ op: 'remove', entityId: line!.id }]);
    const { result } = checks.getState();
    expect(result).not.toBeNull();
    expect(result!.of).toBeLessThan(store.getState().documentRevision);
    checks.solve();
    // The reading is older than the document: the worker has to read the net itself.
    expect(workers[0]!.asked[1]!.reading).toBeNull();
    workers[0]!.say({ state: 'done', beside });
    expect(checks.getState().result!.of).toBe(store.getState().documentRevision);
  });

  it('gives up at once when it is cancelled, and hears nothing more of it', () => {
    open = desk(drawn);
    const { checks, workers } = open;
    checks.solve();
    checks.cancel();
    expect(workers[0]!.ended).toBe(true);
    workers[0]!.say({ state: 'done', beside });
    expect(checks.getState()).toMatchObject({ independent: { state: 'none' }, result: null });
    checks.solve();
    expect(workers).toHaveLength(2);
  });

  it('says what stood in the way, with the place, and survives a worker that breaks', () => {
    open = desk(drawn);
    const { checks, workers } = open;
    checks.solve();
    workers[0]!.say({ state: 'failed', text: 'The outline is open.', at: [3, 4] });
    expect(checks.getState().independent).toEqual({
      state: 'failed',
      text: 'The outline is open.',
      at: [3, 4],
    });
    checks.solve();
    workers[0]!.onerror?.({ preventDefault: () => undefined } as ErrorEvent);
    expect(checks.getState().independent).toMatchObject({ state: 'failed', at: null });
  });

  it('takes its guides and its worker away with the desk', () => {
    open = desk(drawn);
    const { checks, workers, guides, end } = open;
    checks.solve();
    workers[0]!.say({ state: 'done', beside });
    end();
    expect(guides().computedNet).toBeUndefined();
    expect(workers[0]!.ended).toBe(true);
  });
});
