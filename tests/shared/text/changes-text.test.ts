import { expect, it } from 'vitest';
import type { RevisionComparison } from '#shared/contract/revision-comparison.ts';
import { changesText } from '#shared/text/changes-text.ts';

const NOTHING: RevisionComparison = { lines: [], points: [], inputs: [], quantities: [], figures: [] };
const line = { id: '1', line: 'equipotential' as const, name: '', drops: 3, movedPx: 5, moved: 1, facts: [] };
const pair = (before: number, after: number) => ({ before, after, difference: after - before });

it('a revision that changed nothing says so', () => {
  expect(changesText(NOTHING, 'SI')).toEqual(['No line, point or input changed.']);
});

it('counts lines, names inputs, and tells the greatest change of pressure', () => {
  const comparison: RevisionComparison = {
    ...NOTHING,
    lines: [
      { ...line, change: 'changed', before: [], after: [] },
      { ...line, change: 'changed', before: [], after: [] },
      { ...line, change: 'added', before: [], after: [] },
    ],
    inputs: [
      { label: 'Headwater', before: 118, after: 119.25 },
      { label: 'Source', before: '', after: 'Gauge' },
    ],
    figures: [
      { id: 'a', name: 'P1', totalHead: pair(1, 1), porePressure: pair(10, 10.5) },
      { id: 'b', name: 'P2', totalHead: pair(1, 1), porePressure: pair(30, 26.75) },
    ],
  };
  expect(changesText(comparison, 'SI')).toEqual([
    '2 lines changed, 1 line added.',
    'Headwater: 118 before, now 119.25.',
    'Source: not given before, now Gauge.',
    'The pore pressure changes most at P2: −3.3 kPa.',
  ]);
});

it('a long list of inputs ends with how many more there are', () => {
  const inputs = Array.from({ length: 15 }, (_, i) => ({ label: `Soil ${i}`, before: 1, after: 2 }));
  expect(changesText({ ...NOTHING, inputs }, 'US').at(-1)).toBe('And 3 more.');
});
