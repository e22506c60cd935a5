import { createStore, type StoreApi } from 'zustand/vanilla';
import { independentText as text } from '#client/text/independent.ts';
import type { BesideSolution } from '#shared/compute/beside/beside-solution.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { type AskedWorker, createAsked } from './asked-worker.ts';
import { computedNetGuides, differenceGuides, explanationGuides, netCheckGuides } from './check-guides.ts';
import type { DeskStore } from './desk-state.ts';
import { GUIDE_OWNERS } from './guides.ts';
import type { IndependentAnswer, IndependentQuestion, IndependentStage } from './independent-worker.ts';
import type { WaysAnswer, WaysQuestion } from './ways-worker.ts';

/** What became of the last independent solution that was asked for. */
export type IndependentState =
  | { readonly state: 'none' }
  | { readonly state: 'working'; readonly stage: IndependentStage }
  | { readonly state: 'failed'; readonly text: string; readonly at: SheetPoint | null };

/** A solution and the change of the document that it is of; older than the document it is out of date. */
export type IndependentResult = {
  readonly beside: BesideSolution;
  readonly of: number;
  readonly document: FlowNetDocument;
};

/** Whether the ways by which a point is read are drawn over the sheet; `none`: there are none to draw. */
export type WaysState = 'working' | 'shown' | 'none' | 'failed';

export type ChecksState = {
  readonly ways: WaysState;
  /** The net check is drawn over the sheet. */
  readonly netCheckShown: boolean;
  /** The fault chosen in the list, see `faultKey`. */
  readonly chosenFault: string | null;
  readonly independent: IndependentState;
  /** Kept until a newer one is there. */
  readonly result: IndependentResult | null;
  readonly netShown: boolean;
  readonly differencesShown: boolean;
};

export type DeskChecks = StoreApi<ChecksState> & {
  /** Draws over the sheet how a point is read by hand, or takes it away with null. */
  explain(question: WaysQuestion | null): void;
  showNetCheck(shown: boolean): void;
  chooseFault(key: string | null): void;
  showNet(shown: boolean): void;
  showDifferences(shown: boolean): void;
  /** Solves the section as it is now. */
  solve(): void;
  cancel(): void;
  /** Keeps the guides over the sheet in step; gives a function that ends it and takes them away. */
  connect(): () => void;
};

type IndependentWorker = AskedWorker<IndependentQuestion, IndependentAnswer>;
type WaysWorker = AskedWorker<WaysQuestion, WaysAnswer>;

/** The workers, each started with the first question that it is asked. */
export type CheckWorkers = { independent(): IndependentWorker; ways(): WaysWorker };

const WORKERS: CheckWorkers = {
  independent: () =>
    new Worker(new URL('./independent-worker.ts', import.meta.url), { type: 'module' }) as IndependentWorker,
  ways: () => new Worker(new URL('./ways-worker.ts', import.meta.url), { type: 'module' }) as WaysWorker,
};

const NOTHING_YET: ChecksState = {
  ways: 'none',
  netCheckShown: false,
  chosenFault: null,
  independent: { state: 'none' },
  result: null,
  netShown: true,
  differencesShown: false,
};

/**
 * The checks of one open net: how a point is read, the net check over the sheet, and the independent solution beside the
 * net.
 */
export function createDeskChecks(store: DeskStore, workers: CheckWorkers = WORKERS): DeskChecks {
  const checks = createStore<ChecksState>(() => NOTHING_YET);
  let asked = store.getState();
  const fail = (said: string, at: SheetPoint | null = null) =>
    checks.setState({ independent: { state: 'failed', text: said, at } });
  const solver = createAsked<IndependentQuestion, IndependentAnswer>({
    start: workers.independent,
    isLast: (answer) => answer.state !== 'working',
    onFailure: () => fail(text.broken),
    onAnswer(answer) {
      if (answer.state === 'working') return checks.setState({ independent: answer });
      if (answer.state === 'failed') return fail(answer.text, answer.at);
      checks.setState({
        independent: { state: 'none' },
        result: {
          beside: answer.beside,
          of: asked.documentRevision,
          document: asked.document,
        },
      });
    },
  });

  const explainer = createAsked<WaysQuestion, WaysAnswer>({
    start: workers.ways,
    onFailure: () => checks.setState({ ways: 'failed' }),
    onAnswer(ways) {
      store.setGuides('explanation', ways === null ? null : explanationGuides(ways));
      checks.setState({ ways: ways === null ? 'none' : 'shown' });
    },
  });

  function showGuides(state: ChecksState): void {
    const { reading, document } = store.getState();
    const check = reading?.netCheck ?? null;
    store.setGuides(
      'netCheck',
      state.netCheckShown && check !== null ? netCheckGuides(check, state.chosenFault) : null,
    );
    const beside = state.result?.beside ?? null;
    store.setGuides('computedNet', beside !== null && state.netShown ? computedNetGuides(beside) : null);
    store.setGuides(
      'differences',
      beside !== null && state.differencesShown
        ? differenceGuides(beside, unitNames(document.unitSystem).length)
        : null,
    );
  }

  return {
    ...checks,
    explain(question) {
      store.setGuides('explanation', null);
      checks.setState({ ways: question === null ? 'none' : 'working' });
      if (question === null) explainer.drop();
      else explainer.ask(question);
    },
    showNetCheck: (netCheckShown) => checks.setState({ netCheckShown, chosenFault: null }),
    chooseFault: (chosenFault) =>
      checks.setState({
        chosenFault,
        netCheckShown: checks.getState().netCheckShown || chosenFault !== null,
      }),
    showNet: (netShown) => checks.setState({ netShown }),
    showDifferences: (differencesShown) => checks.setState({ differencesShown }),
    solve() {
      asked = store.getState();
      const { document, documentRevision, reading, readingOf } = asked;
      checks.setState({ independent: { state: 'working', stage: 'outline' } });
      solver.ask({ document, reading: readingOf === documentRevision ? reading : null });
    },
    cancel() {
      solver.cancel();
      checks.setState({ independent: { state: 'none' } });
    },
    connect() {
      const endings = [
        checks.subscribe(showGuides),
        store.subscribe((state, before) => {
          if (state.reading !== before.reading) showGuides(checks.getState());
        }),
      ];
      showGuides(checks.getState());
      return () => {
        for (const end of endings) end();
        solver.cancel();
        explainer.cancel();
        if (checks.getState().independent.state === 'working')
          checks.setState({ independent: { state: 'none' } });
        for (const owner of GUIDE_OWNERS) store.setGuides(owner, null);
      };
    },
  };
}
