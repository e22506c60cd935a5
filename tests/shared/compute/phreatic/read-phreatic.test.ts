import { describe, expect, it } from 'vitest';
import { readPhreatic } from '#shared/compute/phreatic/read-phreatic.ts';
import { prepareNet } from '#shared/compute/prepare-net.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS.find(({ name }) => name.includes('parabola'))!;
const traced = (jitterPx = 0, mirrored = false) =>
  exactNetDocument(net, { pxPerUnit, jitterPx, mirrored, turnDeg: 1.3 });

function check(document: FlowNetDocument) {
  const setOut = readSetOut(document);
  const inputs = singleInputs(document);
  const { model, heads } = prepareNet(document, setOut, setOut.map!, inputs);
  return readPhreatic(model, heads, setOut.map!, inputs.count.tracingAccuracyPx, 'm LD');
}

// The exact net of the basic parabola (Kozeny 1931): on its phreatic line head and elevation are one, it enters square
// to the parabolic boundary and leaves vertically into the level drain.
describe('a phreatic line that obeys its rules', () => {
  it.each([
    [0, false],
    [1.5, false],
    [1.5, true],
  ])('is not questioned (jitter %d px, mirrored %s)', (jitterPx, mirrored) => {
    const { reading, findings } = check(traced(jitterPx, mirrored));
    expect(findings).toEqual([]);
    expect(reading?.entry).toMatchObject({ expected: 'square' });
    expect(reading?.exit).toMatchObject({ expected: 'vertical' });
    expect(reading?.meetings).toHaveLength(net.drops - 1);
    const allowed = jitterPx === 0 ? 0.002 : (4 * jitterPx) / pxPerUnit;
    for (const { departure } of reading!.meetings) expect(Math.abs(departure)).toBeLessThan(allowed);
  });
});

describe('a phreatic line that does not', () => {
  const reshaped = (change: (points: [number, number][]) => [number, number][]) =>
    withLines(traced(), 'phreaticLine', (line) => ({ ...line, points: change(line.points) }));

  it('is questioned where it rises', () => {
    const document = reshaped((points) => {
      const middle = Math.floor(points.length / 2);
      return points.map(([x, y], i) => (i === middle ? [x, y - 150] : [x, y]));
    });
    expect(check(document).findings.map(({ code }) => code)).toContain('phreaticRises');
  });

  it('lists every departure of a head from its elevation in lengths', () => {
    const lifted = reshaped((points) =>
      points.map(([x, y], i) => (i > 0 && i < points.length - 1 ? [x, y + 30] : [x, y])),
    );
    const departures = check(lifted).reading!.meetings.map(({ departure }) => departure);
    for (const departure of departures.slice(1, -1)) expect(Math.abs(departure)).toBeGreaterThan(0.05);
  });

  it('is questioned where it leaves a drain at a slant', () => {
    const document = reshaped((points) => {
      const kept = points.slice(0, -110);
      return [...kept, points[points.length - 1]!];
    });
    expect(check(document).findings.map(({ code }) => code)).toContain('phreaticExit');
  });

  it('says while it is still a guess', () => {
    const guess = withLines(traced(), 'phreaticLine', (line) => ({ ...line, origin: 'guessed' }));
    expect(check(guess)).toMatchObject({
      reading: { guessed: true },
      findings: [{ code: 'phreaticGuessed' }],
    });
  });

  it('is not looked for in a confined section', () => {
    const { net: apron, pxPerUnit: px } = EXACT_NETS.find(({ name }) => !name.includes('parabola'))!;
    expect(check(exactNetDocument(apron, { pxPerUnit: px }))).toEqual({ reading: null, findings: [] });
  });
});
