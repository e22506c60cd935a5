import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { similarityBackward } from '#shared/compute/similarity.ts';
import type { FlowNetDocument, LineKind, SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { entityIdOf, exactNetDocument, sheetMapOf } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const readings = randomReadings(net, 20, 5, 0.1);
const sound = exactNetDocument(net, { pxPerUnit, readings });

/** The sound net with the points of its first line of a kind replaced. */
function withPoints(kind: LineKind, points: SheetPoint[]): FlowNetDocument {
  const document = structuredClone(sound);
  const line = Object.values(document.entities)
    .map(({ value }) => value)
    .find((value): value is TracedLine => value.kind === 'line' && value.line === kind)!;
  line.points = points;
  return document;
}

function scribble(vertices: number, seed: number): SheetPoint[] {
  const random = seededRandom(seed);
  return Array.from({ length: vertices }, () => [500 + 4000 * random(), 400 + 2700 * random()]);
}

function withLine(kind: LineKind, points: SheetPoint[], id: string): FlowNetDocument {
  const document = structuredClone(sound);
  document.entities[id] = {
    id,
    version: 1,
    value: {
      kind: 'line',
      origin: 'traced',
      line: kind,
      name: '',
      points,
      finished: true,
      water: null,
      head: null,
      drops: null,
    },
  };
  return document;
}

// Each of these once took from 3 to 68 seconds: the test's time-out is their wall-clock bound.
describe('a line that crosses itself', { timeout: 10_000 }, () => {
  it.each<[LineKind, number]>([
    ['phreaticLine', 100],
    ['phreaticLine', 150],
    ['phreaticLine', 5000],
    ['impervious', 100],
    ['flowLine', 300],
    ['equipotential', 300],
    ['submergedFace', 300],
    ['drain', 300],
  ])('%s of %i vertices is found before anything is worked out, with its place and what to do', (kind, n) => {
    const reading = readNet(withPoints(kind, scribble(n, n)));
    const found = reading.findings.find(({ code }) => code === 'lineCrossesItself');
    expect(found).toMatchObject({
      weight: 'wrong',
      text: 'This line crosses itself. Draw it again or remove the loop.',
      at: [expect.any(Number), expect.any(Number)],
    });
    expect(found?.entityIds).toHaveLength(1);
    expect(reading.state).toBe('unfinished');
    expect(reading.points.map(({ status, totalHead }) => [status, totalHead])).toEqual(
      readings.map(() => ['withheld', null]),
    );
    expect(reading.points[0]?.reason?.text).toBe(`Net unfinished. ${found?.text}`);
  });

  it('may be a soil boundary, which bounds no flow', () => {
    expect(readNet(withLine('soilBoundary', scribble(100, 4), entityIdOf(900))).state).toBe('read');
  });
});

describe('an outline of something impervious', () => {
  const box: SheetPoint[] = [
    [200, 200],
    [400, 200],
    [400, 300],
    [200, 300],
  ];

  it('may be closed, and may run a little past its own start', () => {
    const closed: SheetPoint[] = [...box, [200, 200]];
    const past: SheetPoint[] = [[199, 205], ...box.slice(1), [210, 300], [210, 190]];
    for (const outline of [closed, past]) {
      expect(readNet(withLine('impervious', outline, entityIdOf(901))).state).toBe('read');
    }
  });

  it('that crosses itself far from its ends is to be drawn again', () => {
    const eight: SheetPoint[] = [box[0]!, box[2]!, box[1]!, box[3]!];
    const { findings } = readNet(withLine('impervious', eight, entityIdOf(902)));
    expect(findings.map(({ code }) => code)).toContain('lineCrossesItself');
  });
});

it('lines that cross one another far more often than those of a net are named, and nothing is worked out', () => {
  const comb = (upright: boolean): SheetPoint[] =>
    Array.from({ length: 400 }, (_, i) => {
      const along = 500 + 7 * i;
      const across = i % 2 === 0 ? 300 : 3200;
      return upright ? [along, across] : [across, along];
    });
  const document = withLine('flowLine', comb(true), entityIdOf(903));
  const id = entityIdOf(904);
  document.entities[id] = { ...document.entities[entityIdOf(903)]!, id };
  document.entities[id].value = { ...(document.entities[id].value as TracedLine), points: comb(false) };
  const { state, findings } = readNet(document);
  expect(state).toBe('unfinished');
  expect(findings.find(({ code }) => code === 'linesTangled')?.entityIds).toEqual([entityIdOf(903), id]);
});

// Once 105 s and more: the maze crosses nothing that it must not, and every point has to be read in it.
it('a maze of 40 walls of 100 vertices between the lines of a net is read, or the points are withheld, in time', {
  timeout: 120_000,
}, () => {
  const document = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 200, 6, 0.1) });
  const map = sheetMapOf(net, { pxPerUnit });
  const at = (drops: number, channel: number): SheetPoint =>
    similarityBackward(map, ...net.placeAt(drops, channel));
  for (let wall = 0; wall < 40; wall += 1) {
    const id = entityIdOf(2000 + wall);
    const points = Array.from({ length: 100 }, (_, k) =>
      at((wall % 10) + 0.1 + 0.008 * k, 0.1 + 0.65 * Math.floor(wall / 10) + (k % 2) * 0.6),
    );
    const line = withLine('impervious', points, id).entities[id]!;
    document.entities[id] = line;
  }
  const start = process.cpuUsage();
  const { state, points } = readNet(document);
  // The processor's time: the clock's depends on what else the machine does.
  expect(process.cpuUsage(start).user / 1e6).toBeLessThan(20);
  expect(state).toBe('read');
  for (const point of points) expect(['read', 'acrossWall']).toContain(point.reason?.code ?? 'read');
});
