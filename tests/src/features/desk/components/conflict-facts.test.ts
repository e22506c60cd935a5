import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { conflictFacts } from '#client/features/desk/components/conflict-facts.ts';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';
import { tracedLine } from '#tests/support/desk/desk-fixture.ts';

const levels = (headwater: number | null): DocumentEntity => ({
  kind: 'waterLevels',
  ...UNSAID.waterLevels,
  headwater,
  tailwater: null,
  gammaW: 9.81,
  source: '',
});

describe('two versions of one thing', () => {
  it('are compared by what differs only', () => {
    expect(conflictFacts(levels(111), levels(112))).toEqual([
      { name: 'Headwater', mine: '111', theirs: '112' },
    ]);
  });

  it('say when one of them was removed', () => {
    expect(conflictFacts(tracedLine([[1, 1]]), null)).toEqual([
      { name: 'line', mine: 'line', theirs: 'removed' },
    ]);
  });

  it('of a reading point show what was measured, and of a soil where it lies', () => {
    const point = {
      kind: 'readingPoint' as const,
      name: 'P1',
      place: { on: 'section' as const, offset: 1, elevation: 2 },
      order: 1,
      elevationPlusMinus: null,
      measured: null,
    };
    const measured = { value: 112.3, as: 'totalHead' as const, plusMinus: 0.1, on: '1968-04-03' };
    expect(conflictFacts({ ...point, measured }, { ...point, elevationPlusMinus: 0.02 })).toEqual([
      { name: 'Measured', mine: 'a total head, 112.3 ± 0.1, 1968-04-03', theirs: '–' },
      { name: 'Elevation ±', mine: '–', theirs: '0.02' },
    ]);
    const soil = { kind: 'soil' as const, name: 'Core', ...UNSAID.soil, k: null, unit: 'm/s' as const };
    const held = { ...soil, factor: null, source: '', places: [] };
    expect(conflictFacts({ ...held, kv: 1e-9 }, { ...held, places: [[1, 2]] })).toEqual([
      { name: 'Permeability across the bedding', mine: '1e−9', theirs: '–' },
      { name: 'Places', mine: '–', theirs: '1.0, 2.0 px' },
    ]);
  });

  it('of every kind differ wherever two versions differ', () => {
    fc.assert(
      fc.property(arbitraryDocument(), (document) => {
        const values = Object.values(document.entities).map(({ value }) => value);
        for (const value of values) {
          expect(conflictFacts(value, value)).toEqual([]);
          const other = values.find(
            (each) =>
              each.kind === value.kind &&
              JSON.stringify({ ...each, order: 0 }) !== JSON.stringify({ ...value, order: 0 }),
          );
          if (other) expect(conflictFacts(value, other)).not.toEqual([]);
        }
      }),
      { numRuns: 60 },
    );
  });

  it('of a line show its points and its typed head', () => {
    const mine = tracedLine([
      [1, 1],
      [2, 2],
    ]);
    const theirs = tracedLine([[1, 1]], { head: 112 });
    expect(conflictFacts(mine, theirs)).toEqual([
      { name: 'Points', mine: '2: 1.0, 1.0 px; 2.0, 2.0 px', theirs: '1: 1.0, 1.0 px' },
      { name: 'Typed head', mine: '–', theirs: '112' },
    ]);
  });
});
