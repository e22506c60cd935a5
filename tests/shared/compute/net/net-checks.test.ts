import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import { checkLines } from '#shared/compute/net/net-checks.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { LineKind, SheetPoint } from '#shared/contract/document.ts';

const ACCURACY_PX = 1;
const REACH_PX = 5;

function traced(id: string, kind: LineKind, points: SheetPoint[]): NetLine {
  const value = { name: '', points, finished: true, water: null, head: null, drops: null };
  return {
    id,
    kind,
    shape: polylineOf(points)!,
    value: { kind: 'line', line: kind, origin: 'traced', ...value },
  };
}

const upright = (id: string, kind: LineKind, x = 0) =>
  traced(id, kind, [
    [x, 0],
    [x, 1100],
  ]);

/** A line that swings ten times across the upright at 0; the first crossing lies at a height of 100. */
const swinging = (id: string, kind: LineKind) =>
  traced(
    id,
    kind,
    Array.from({ length: 11 }, (_, i): SheetPoint => [i % 2 === 0 ? 100 : -100, 50 + 100 * i]),
  );

function check({ equipotentials = [], flowLines = [], walls = [] }: Partial<Record<string, NetLine[]>>) {
  const footed = equipotentials.map(({ id, shape }) => ({ id, footed: { shape, start: null, end: null } }));
  return checkLines(footed, flowLines, walls, ACCURACY_PX, REACH_PX);
}

describe('two lines that meet ten times', () => {
  const one = { entityIds: ['a', 'b'], at: [0, 100] };

  it('make one finding for a pair of equipotentials, with the first place and the count', () => {
    const equipotentials = [upright('a', 'equipotential'), swinging('b', 'equipotential')];
    expect(check({ equipotentials })).toMatchObject([
      { ...one, text: 'Two equipotentials cross in 10 places. Correct one of them.' },
    ]);
  });

  it('make one finding for a pair of flow lines', () => {
    const flowLines = [upright('a', 'flowLine'), swinging('b', 'flowLine')];
    expect(check({ flowLines })).toMatchObject([
      { ...one, text: 'Two flow lines cross in 10 places. Correct one of them.' },
    ]);
  });

  it('make one finding for an equipotential and a wall', () => {
    const equipotentials = [upright('a', 'equipotential')];
    expect(check({ equipotentials, walls: [swinging('b', 'impervious')] })).toMatchObject([
      { ...one, text: 'An equipotential runs through an impervious boundary in 10 places. End it there.' },
    ]);
  });
});

describe('one line traced again and again', () => {
  it('makes one finding that names every tracing', () => {
    const equipotentials = ['a', 'b', 'c', 'd', 'e'].map((id, i) => upright(id, 'equipotential', 0.3 * i));
    expect(check({ equipotentials })).toMatchObject([
      {
        code: 'tracedTwice',
        text: 'An equipotential has been traced 5 times. Delete all of these lines but one.',
        entityIds: ['a', 'b', 'c', 'd', 'e'],
        at: [0, 550],
      },
    ]);
  });

  it('is told as traced twice when there are two', () => {
    const equipotentials = [upright('a', 'equipotential'), upright('b', 'equipotential', 1)];
    expect(check({ equipotentials }).map((found) => found.text)).toEqual([
      'An equipotential has been traced twice. Delete one of the two lines.',
    ]);
  });
});

it('lines that cross once are told without a count', () => {
  const level = traced('b', 'equipotential', [
    [-100, 300],
    [100, 300],
  ]);
  expect(check({ equipotentials: [upright('a', 'equipotential'), level] })).toMatchObject([
    { text: 'Two equipotentials cross. Correct one of them.', at: [0, 300] },
  ]);
});
