import { createStore, type StoreApi } from 'zustand/vanilla';
import { independentText as text } from '#client/text/independent.ts';
import type { BesideSolution } from '#shared/compute/beside/beside-solution.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { type AskedWorker, createAsked } from './asked-worker.ts';
import { computedNetGuides, differenceGuides, netCheckGuides } from './check-guides.ts';
import type { DeskStore } from './desk-state.ts';
import type { IndependentAnswer, IndependentQuestion, IndependentStage } from './independent-worker.ts';

/** What became of the last independent solution that was asked for. */
export type IndependentState =
  | { readonly state: 'none' }
  | { readonly state: 'working'; readonly stage: IndependentStage }
  | { readonly state: 'failed'; readonly text: string; readonly at: SheetPoint | null };

/** A solution and the change of the document that it is of; older than the document it is out of date. */
export type IndependentResult = { readonly beside: BesideSolution; readonly of: number };

export type ChecksState = {
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

function startWorker(): IndependentWorker {
  return new Worker(new URL('./independent-worker.ts', import.meta.url), {
    type: 'module',
  }) as IndependentWorker;
}

const NOTHING_YET: ChecksState = {
  netCheckShown: false,
  chosenFault: null,
  independent: { state: 'none' },
  result: null,
  netShown: true,
  differencesShown: false,
};

/** The checks of one open net: the net check over the sheet, and the independent solution beside the net. */
export function createDeskChecks(store: DeskStore, start: () => IndependentWorker = startWorker): DeskChecks {
  const checks = createStore<ChecksState>(() => NOTHING_YET);
  let askedOf = 0;
  const fail = (said: string, at: SheetPoint | null = null) =>
    checks.setState({ independent: { state: 'failed', text: said, at } });
  const solver = createAsked<IndependentQuestion, IndependentAnswer>({
    start,
    isLast: (answer) => answer.state !== 'working',
    onFailure: () => fail(text.broken),
    onAnswer(answer) {
      if (answer.state === 'working') return checks.setState({ independent: answer });
      if (answer.state === 'failed') return fail(answer.text, answer.at);
      checks.setState({ independent: { state: 'none' }, result: { beside: answer.beside, of: askedOf } });
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
    showNetCheck: (netCheckShown) => checks.setState({ netCheckShown, chosenFault: null }),
    chooseFault: (chosenFault) =>
      checks.setState({
        chosenFault,
        netCheckShown: checks.getState().netCheckShown || chosenFault !== null,
      }),
    showNet: (netShown) => checks.setState({ netShown }),
    showDifferences: (differencesShown) => checks.setState({ differencesShown }),
    solve() {
      const { document, documentRevision, reading, readingOf } = store.getState();
      askedOf = documentRevision;
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
        if (checks.getState().independent.state === 'working')
          checks.setState({ independent: { state: 'none' } });
        for (const owner of ['netCheck', 'computedNet', 'differences'] as const) store.setGuides(owner, null);
      };
    },
  };
}
