import { describe, expect, it } from 'vitest';
import type { Run } from '#client/features/desk/components/runs.tsx';
import {
  type CellId,
  checkedText,
  titleBlockCells,
} from '#client/features/desk/components/title-block-cells.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type DocumentEntity, entitiesOf, UNSAID } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const FACTS = {
  damName: 'Harrow Fen Dam',
  section: { name: 'B–B', chainage: '212' },
  drawn: 'I. Marsh, 1 Dec 2026',
  checked: 'not sent',
  calculation: 'none',
};
const ID = (n: number) => `00000000-0000-7000-8000-0000000001${String(n).padStart(2, '0')}`;
const water = (headwater: number | null, tailwater: number | null = null): DocumentEntity => ({
  kind: 'waterLevels',
  ...UNSAID.waterLevels,
  headwater,
  tailwater,
  gammaW: 9.81,
  source: '',
});
const plain = (runs: readonly Run[]) =>
  runs.map((run) => (typeof run === 'string' ? run : `^${run.sup}`)).join('');

function block(values: Record<string, DocumentEntity>, quantities: Partial<NetReading['quantities']> = {}) {
  const document = documentWith(values);
  const read = readNet(document);
  const reading = { ...read, quantities: { ...read.quantities, ...quantities } };
  const cells = titleBlockCells(document, reading, FACTS);
  const cell = (id: CellId) => {
    const found = cells.find((each) => each.id === id);
    return found ? `${found.label}: ${plain(found.value)} [${found.state}]` : undefined;
  };
  return { cells, cell };
}

describe('the title block', () => {
  it('says in each cell of an empty net what is missing', () => {
    const { cell } = block({ [ID(1)]: water(null) });
    expect(cell('scale')).toBe('Scale: Known points needed [missing]');
    expect(cell('headwater')).toBe('Headwater: Level needed [missing]');
    expect(cell('outlet')).toBe('Outlet: Outlet needed [missing]');
    expect(cell('permeability')).toBe('Permeability: Value needed [missing]');
    expect(cell('headPerDrop')).toBe('Head per drop: Net unfinished [missing]');
  });

  it('counts the drops to each outlet where they lie at several heads', () => {
    const at = { members: [], head: 98, headLost: 8, channels: null, seepage: null };
    const { cell } = block(
      { [ID(1)]: water(106) },
      {
        drops: null,
        outlets: [
          { ...at, id: 'a', label: 'the drain', drops: 15.5 },
          { ...at, id: 'b', label: 'the tailwater boundary', drops: 11.599999999 },
        ],
      },
    );
    expect(cell('drops')).toBe('Drops: 15.5 to the drain, 11.6 to the tailwater boundary [ok]');
  });

  it('shows nothing worked out while there is no reading', () => {
    const cells = titleBlockCells(documentWith({}), null, FACTS);
    expect(plain(cells.find((each) => each.id === 'drops')?.value ?? [])).toBe('…');
  });

  it('says how many drops are stated while the net that would bear them out is unfinished', () => {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const document = exactNetDocument(net, { pxPerUnit });
    const first = (kind: string) => entitiesOf(document, 'line').find(({ value }) => value.line === kind)?.id;
    const drops = (left: string | undefined, stated: number | null) => {
      const entities = Object.values(document.entities)
        .filter(({ id }) => id !== left)
        .map((each) =>
          each.value.kind === 'netCount' ? { ...each, value: { ...each.value, drops: stated } } : each,
        );
      const changed = { ...document, entities: Object.fromEntries(entities.map((each) => [each.id, each])) };
      const cell = titleBlockCells(changed, readNet(changed), FACTS).find(({ id }) => id === 'drops');
      return `${plain(cell?.value ?? [])} [${cell?.state}]`;
    };
    expect(drops(undefined, 10)).toBe('10 [ok]');
    expect(drops(first('drain'), 10)).toBe('10 stated [missing]');
    expect(drops(first('equipotential'), 10)).toBe('10 stated, 9 traced [missing]');
    expect(drops(undefined, null)).toBe('10 traced [missing]');
    expect(drops(first('drain'), null)).toBe('Needed [missing]');
  });

  it('questions the seepage and the channels that it shows, where their findings do', () => {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const document = exactNetDocument(net, { pxPerUnit });
    const [across] = entitiesOf(document, 'line').filter(({ value }) => value.line === 'equipotential');
    const states = (entities: typeof document.entities) => {
      const cells = titleBlockCells({ ...document, entities }, readNet({ ...document, entities }), FACTS);
      return (['channels', 'seepage'] as const).map((id) => cells.find((cell) => cell.id === id)?.state);
    };
    expect(states(document.entities)).toEqual(['ok', 'ok']);
    const beside = across!.value.points.map(([x, y]): [number, number] => [x + 5, y]);
    const soil = tracedLine(beside, { line: 'soilBoundary' });
    const withSoil = { ...document.entities, [ID(1)]: { id: ID(1), version: 1, value: soil } };
    expect(states(withSoil)).toEqual(['ok', 'question']);
    const [count] = entitiesOf(document, 'netCount');
    const oblong = { id: count!.id, version: 2, value: { ...count!.value, cellRatio: 6 } };
    expect(states({ ...document.entities, [oblong.id]: oblong })).toEqual(['question', 'ok']);
  });

  it('does not pass two points off as a residual of zero', () => {
    const point = (x: number, offset: number): DocumentEntity => ({
      kind: 'knownPoint',
      name: '',
      at: [x, 500],
      offset,
      elevation: 98,
      use: 'fit',
    });
    const setOut: DocumentEntity = {
      kind: 'setOut',
      scales: 'equal',
      method: 'points',
      distance: null,
      level: 'line',
      offsetsGrow: 'right',
      upstream: 'left',
      upQuarterTurns: 0,
      statedScale: null,
    };
    const { cell } = block({ [ID(1)]: point(100, 0), [ID(2)]: point(600, 50), [ID(3)]: setOut });
    expect(cell('scale')).toBe('Scale: 0.1 m/px [ok]');
    expect(cell('residual')).toBe('Residual: None, two points only; places ± 0.1 to 0.14\u00a0m [question]');
  });

  it('names the outlets with the head each carries', () => {
    const drain = tracedLine([[1, 1]], { line: 'drain', name: 'Toe drain', head: 98 });
    expect(block({ [LINE_A]: drain, [ID(1)]: water(118) }).cell('outlet')).toBe(
      'Toe drain: 98.00 m LD, under pressure [ok]',
    );
    expect(block({ [ID(1)]: water(118, 99.5) }).cell('outlet')).toContain('Tailwater: 99.50 m LD');
  });

  it('gives seepage to no more figures than k deserves, and only traced channels as such', () => {
    const figures = { seepage: 1.2345e-6, seepageFigures: 2, channels: 3, channelsComplete: true };
    expect(block({}, figures).cell('seepage')).toBe('Seepage per metre: 1.2 × 10^−6 m^3/s [ok]');
    const traced = { ...figures, channelsComplete: false };
    expect(block({}, traced).cell('seepage')).toBe(
      'Seepage per metre: 1.2 × 10^−6 m^3/s, traced channels only [question]',
    );
    expect(block({}, traced).cell('channels')).toBe('Traced channels: 3 [question]');
  });

  it('has no single head per drop where the intervals are unequal', () => {
    expect(block({}, { unequalIntervals: true }).cell('headPerDrop')).toBe(
      'Head per drop: Unequal intervals [question]',
    );
  });

  it('shows permeability as it was entered, with the factor it is known within', () => {
    const k = { kind: 'permeability', ...UNSAID.soil, k: 2e-7, unit: 'm/s', factor: 3, source: '' } as const;
    expect(block({ [ID(1)]: k }).cell('permeability')).toBe('Permeability: 2 × 10^−7 m/s, ×/÷ 3 [ok]');
    expect(block({ [ID(1)]: { ...k, k: 0.5, unit: 'ft/day', factor: null } }).cell('permeability')).toBe(
      'Permeability: 0.5 ft/day [ok]',
    );
  });

  it('puts the gravest finding into the net check', () => {
    expect(block({}).cell('netCheck')).toMatch(/^Net check: .+set out.+ \[missing\]$/);
  });

  it('does not pass an earlier check off as one of what was changed since', () => {
    const net = { state: 'accepted', reviewer: { id: ID(9), name: 'Remi Okafor' } } as const;
    expect(checkedText({ ...net, changedSinceRevision: false })).toBe('R. Okafor, accepted');
    const checked = checkedText({ ...net, changedSinceRevision: true });
    expect(checked).toBe('R. Okafor, accepted; changed since');
    const cells = titleBlockCells(documentWith({}), null, { ...FACTS, checked, checkedBefore: true });
    expect(cells.find((each) => each.id === 'checked')).toMatchObject({ state: 'question', said: true });
  });
});
