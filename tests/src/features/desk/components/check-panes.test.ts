import { createElement, type ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { DoubtSharesList, formOfSource } from '#client/features/desk/components/doubt-shares.tsx';
import { HeadTable, SeepageTable } from '#client/features/desk/components/independent-tables.tsx';
import { NetCheckPane } from '#client/features/desk/components/net-check-pane.tsx';
import { ReadingPane } from '#client/features/desk/components/reading-pane.tsx';
import { SeepagePane } from '#client/features/desk/components/seepage-pane.tsx';
import { createDeskChecks } from '#client/features/desk/model/desk-checks.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { withFlowLineMoved } from '#tests/support/exact-nets/poorly-drawn.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const readings = [{ at: net.placeAt(4.4, 1.1), clicked: true }];
const drawn = exactNetDocument(net, { pxPerUnit, readings });
const nothing = () => undefined;

/** A pane as plain text, one line for each of its parts. */
function textOf(element: ReactElement): string {
  return renderToStaticMarkup(element)
    .replace(/<\/(p|h2|h3|h4|li|tr|caption)>/g, '\n')
    .replace(/<\/t[hd]>/g, ' | ')
    .replace(/<[^>]+>/g, '')
    .replace(/&#x27;/g, '’');
}

function readingPane(document: FlowNetDocument, change: (point: PointReading) => PointReading): string {
  const read = readNet(document);
  const points = read.points.map(change);
  const store = createDeskStore({ document }, { reading: { ...read, points } });
  return textOf(
    createElement(ReadingPane, {
      store,
      checks: createDeskChecks(store),
      pointId: points[0]!.id,
      keepsFocus: false,
      onOpen: nothing,
      onClose: nothing,
      onSheet: nothing,
    }),
  );
}

describe('how a point is read', () => {
  it('sets hand’s rule and the field side by side with their difference, and the shares of the ±', () => {
    const text = readingPane(drawn, (point) => point);
    const [point] = readNet(drawn).points;
    expect(text).toContain(point!.explanation);
    expect(text).toContain(`Hand’s rule | ${point!.byHand!.dropsLost.toFixed(2)} |`);
    expect(text).toContain(`The field, which is the figure | ${point!.byField!.dropsLost.toFixed(2)} |`);
    expect(text).toMatch(/Pore pressure± \d+\.\d kPa/);
    expect(text).toMatch(/Tracing of the lines\d+ %Change/);
    expect(text).not.toContain('more than 0.1 drop');
  });

  it('flags two readings that are more than a tenth of a drop apart', () => {
    const text = readingPane(drawn, (point) => ({
      ...point,
      byHand: { ...point.byHand!, dropsLost: point.byField!.dropsLost + 0.11 },
    }));
    expect(text).toContain('Difference, more than 0.1 drop | −0.11 |');
  });

  it('says why there is no figure, and then compares nothing', () => {
    const text = readingPane(drawn, (point) => ({
      ...point,
      status: 'withheld',
      byHand: null,
      byField: null,
      doubt: null,
      reason: { code: 'outsideNet', text: 'The point lies outside the traced net.' },
      explanation: 'The point lies outside the traced net.',
    }));
    expect(text).toContain('There is no figure here.');
    expect(text.match(/The point lies outside/g)).toHaveLength(1);
    expect(text).not.toContain('Hand’s rule');
  });
});

describe('the shares of a ±', () => {
  it('lead to the form in which each source can be bettered', () => {
    expect(formOfSource('tracing', 'p')).toEqual({ form: 'count' });
    expect(formOfSource('gammaW', 'p')).toEqual({ form: 'water' });
    expect(formOfSource('tip', 'p')).toEqual({ form: 'measured', pointId: 'p' });
    expect(formOfSource('tip', null)).toBeNull();
  });

  it('offer no change where nothing may be changed, and say so when nothing is in doubt', () => {
    const list = { what: 'pore pressure', pointId: 'p', onOpen: null };
    const shares = [{ source: 'tracing' as const, part: 0.634 }];
    expect(textOf(createElement(DoubtSharesList, { ...list, shares }))).toBe('Tracing of the lines63 %\n');
    expect(textOf(createElement(DoubtSharesList, { ...list, shares: [] }))).toContain(
      'Nothing is in doubt by what is entered.',
    );
  });
});

describe('the pane of the net check', () => {
  it('lists what is poor, the greatest effect first, each with its effect in drops and kPa', () => {
    const document = withFlowLineMoved(net, { pxPerUnit }, 1, 1.45);
    const store = createDeskStore({ document }, { reading: readNet(document) });
    const pane = { store, checks: createDeskChecks(store), onShow: nothing, onOpen: nothing };
    const text = textOf(createElement(NetCheckPane, { ...pane, onClose: nothing, onSheet: nothing }));
    expect(text).toMatch(/cells not square/);
    const effects = [...text.matchAll(/± (\d+\.\d\d) drop/g)].map(([, drops]) => Number(drops));
    expect(effects.length).toBeGreaterThan(3);
    expect(effects).toEqual([...effects].sort((a, b) => b - a));
    expect(text).toMatch(/A cell has B\/L \d\.\d+ instead of 1\.Between 1\d\d and 1\d\d, channel \d/);
    expect(text).toContain('Channel 1 | ');
  });
});

describe('what the seepage is made of', () => {
  const pane = (document: FlowNetDocument) =>
    textOf(
      createElement(SeepagePane, {
        document,
        reading: readNet(document),
        disabled: false,
        onOpen: nothing,
        onClose: nothing,
      }),
    );

  it('shows the terms that make q, and the factor within which it is known with its sources', () => {
    const document = changed(drawn, 'permeability', (value) => ({ ...value, k: 2.5e-6, factor: 3 }));
    const text = pane(document);
    expect(text).toContain('Permeability k | 2.5 × 10−6 m/s');
    expect(text).toContain('Head per drop Δh, m | 2.00');
    expect(text).toContain('Channels Nf | 3');
    // k·Δh·Nf·(B/L) = 2.5e-6 · 2 · 3, 1.5e-5, shown with the one figure that k deserves.
    expect(text).toMatch(/Seepage q, m³\/s per metre \| 2 × 10−5/);
    expect(text).toMatch(/×\/÷ 3\.\d/);
    expect(text).toMatch(/Permeability\d+ %/);
    expect(text).toMatch(/Water levels&lt; 1 %/);
    expect(text).not.toContain('In the transformed section');
  });

  it('says that q has no bounds while k has no factor, and which k counts across the bedding', () => {
    const document = changed(drawn, 'permeability', (value) => ({
      ...value,
      k: 4e-6,
      kv: 1e-6,
      factor: null,
    }));
    const text = pane(document);
    expect(text).toContain('√(4 × 10−6 · 1 × 10−6) m/s');
    expect(text).toContain('which is 2.00 × 10−6 m/s');
    expect(text).toContain('The permeability has no ×/÷ factor');
  });
});

describe('the tables of the independent solution', () => {
  const figure = { traced: 110.5, independent: 110, difference: 0.5, part: 0.025 };

  it('give traced, independent and their difference with its sign', () => {
    const seepage = { traced: 1.2e-6, independent: 1e-6, difference: 2e-7, part: 0.2 };
    const comparison = {
      points: [
        { id: 'a', name: 'P1', ...figure },
        { id: 'b', name: 'P2', traced: 101, independent: null, difference: null, part: null },
      ],
      seepage,
      outlets: [{ id: 'd', label: 'the drain', ...seepage }],
    };
    const heads = textOf(createElement(HeadTable, { comparison, document: drawn }));
    expect(heads).toContain('P1 | 110.50 | 110.00 | +0.50 | +2.5 % |');
    expect(heads).toContain('P2 | 101.00 | outside | – | – |');
    const flows = textOf(createElement(SeepageTable, { comparison, unitSystem: 'SI' }));
    expect(flows).toContain('All of it | 1.20 × 10−6 | 1.00 × 10−6 | +20.0 % |');
    // One outlet is all of it.
    expect(flows).not.toContain('the drain');
  });
});
