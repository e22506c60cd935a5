import { createElement, type ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import type { AskedWorker } from '#client/features/desk/model/asked-worker.ts';
import { createDeskChecks } from '#client/features/desk/model/desk-checks.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type {
  IndependentAnswer,
  IndependentQuestion,
} from '#client/features/desk/model/independent-worker.ts';
import { IndependentCheck } from '#client/pages/check/independent-check.tsx';
import { RunAgainPane } from '#client/pages/check/run-again-pane.tsx';
import { besideSolution } from '#shared/compute/beside/beside-solution.ts';
import { besideFrozen } from '#shared/compute/compare-figures/run-again.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import { sectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const place = net.placeAt(4.4, 1.1);
const document = exactNetDocument(net, { pxPerUnit, readings: [{ at: place, clicked: true }] });
const now = readNet(document);
const nothing = () => undefined;

/** Frozen by an earlier engine, which read the point three centimetres too high and knew it to two. */
const HIGHER = 0.03;
const frozen: NetReading = {
  ...now,
  points: now.points.map((point) => ({
    ...point,
    totalHead: point.totalHead! + HIGHER,
    totalHeadPlusMinus: 0.02,
  })),
};
const payload = {
  label: 'A',
  engineVersion: '1',
  document,
  reading: frozen,
  drawing: { number: 'HF-114' },
} as RevisionPayload;

function textOf(element: ReactElement): string {
  return renderToStaticMarkup(element)
    .replace(/<\/(p|h2|h3|li|tr|caption|button)>/g, '\n')
    .replace(/<\/t[hd]>/g, ' | ')
    .replace(/<[^>]+>/g, '');
}

/** A worker that solves at once, as the real one does apart from the page. */
function solvingWorker(): AskedWorker<IndependentQuestion, IndependentAnswer> {
  const worker: AskedWorker<IndependentQuestion, IndependentAnswer> = {
    onmessage: null,
    onerror: null,
    terminate: nothing,
    postMessage({ document: asked, reading }) {
      const section = sectionOfDocument(asked);
      if (!section.ok || reading === null) throw new Error('The exact net can be solved.');
      const solution = solveSection(section.problem);
      if (!solution.ok) throw new Error('The exact net can be solved.');
      const beside = besideSolution(asked, reading, section, solution)!;
      worker.onmessage?.({ data: { state: 'done', beside } } as MessageEvent<IndependentAnswer>);
    },
  };
  return worker;
}

describe('the independent solution of a frozen revision', () => {
  const store = createDeskStore({ document }, { reading: frozen, readOnly: true });
  const checks = createDeskChecks(store, {
    independent: solvingWorker,
    ways: () => {
      throw new Error('No point is explained here.');
    },
  });
  // Without a browser a store is rendered as it was first.
  const asNow = () => ({ ...checks, getInitialState: checks.getState });
  const pane = () =>
    textOf(
      createElement(IndependentCheck, { payload, store, checks: asNow(), views: null, onSheet: nothing }),
    );

  it('is worked out only when it is asked for, and said to be no part of the record', () => {
    expect(checks.getState()).toMatchObject({ result: null, independent: { state: 'none' } });
    expect(pane()).toContain(
      `Worked out now by engine ${ENGINE_VERSION}. It is no part of the record of revision A`,
    );
    expect(pane()).toContain('those frozen by engine 1.');
  });

  it('stands beside the figures as they were frozen, with their ±, and is the closed form', () => {
    const end = checks.connect();
    checks.solve();
    const [, traced, solved, difference, plusMinus] = pane()
      .split('\n')
      .find((line) => line.startsWith('P1 |'))!
      .split(' | ')
      .map((cell) => Number.parseFloat(cell.replace('−', '-')));
    expect(traced).toBeCloseTo(frozen.points[0]!.totalHead!, 2);
    // Basic parabola, Kozeny (1931): within a twentieth of a drop of 2 m.
    expect(Math.abs(solved! - net.headAt(...place))).toBeLessThan(0.1);
    expect(difference).toBeCloseTo(traced! - solved!, 1);
    expect(plusMinus).toBe(0.02);
    expect(store.getState().guides.computedNet?.lines.length).toBeGreaterThan(0);
    end();
    expect(store.getState().guides.computedNet).toBeUndefined();
  });
});

describe('a frozen revision run again', () => {
  const again = (result: ReturnType<typeof besideFrozen> | null) =>
    textOf(
      createElement(RunAgainPane, {
        payload,
        again: { state: result ? 'done' : 'none', result, run: nothing, cancel: nothing },
        views: null,
      }),
    );

  it('names both engines and says that nothing is kept', () => {
    expect(again(null)).toContain(`revision A, frozen by engine 1, again with engine ${ENGINE_VERSION}.`);
    expect(again(null)).toContain('The record stays as it was');
  });

  it('lists each figure frozen, now and their difference, and says which are equal', () => {
    const text = again(besideFrozen(document, frozen, now));
    const rowOf = (name: string) => text.split('\n').find((line) => line.startsWith(name));
    const { totalHead, totalHeadPlusMinus, elevation } = now.points[0]!;
    const was = (totalHead! + HIGHER).toFixed(2);
    expect(rowOf('Total head, m LD')).toBe(
      `Total head, m LD | ${was} ± 0.02 | ${totalHead!.toFixed(2)} ± ${totalHeadPlusMinus!.toFixed(2)} | −0.03, ± differs | `,
    );
    expect(rowOf('Elevation, m LD')).toBe(
      `Elevation, m LD | ${elevation!.toFixed(2)} | ${elevation!.toFixed(2)} | equal | `,
    );
    expect(text).toMatch(/^1 of \d+ figures differs from the frozen record/m);
  });

  it('says so when all figures are equal', () => {
    expect(again(besideFrozen(document, now, now))).toMatch(
      /^All \d+ figures are equal to the last digit shown\.$/m,
    );
  });
});
