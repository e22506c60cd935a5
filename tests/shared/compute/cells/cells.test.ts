import { describe, expect, it } from 'vitest';
import { channelsOf } from '#shared/compute/cells/channels.ts';
import { PLAIN_FACTS } from '#shared/compute/cells/common-ratio.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { cellsOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { freeOutflowNet } from '#tests/support/exact-nets/free-outflow-net.ts';

describe.each(EXACT_NETS)('cells of an exact net: $name', ({ net, pxPerUnit }) => {
  const whole = exactNetDocument(net, { pxPerUnit });

  it('are as many as drops times channels, and square within 3 %', () => {
    const { cells } = cellsOfDocument(whole).net;
    expect(cells).toHaveLength(net.drops * net.channels);
    for (const cell of cells) expect(Math.abs(cell.ratio - 1)).toBeLessThan(0.03);
  });

  it('have their middle where the net has it', () => {
    const {
      net: { cells },
      map,
    } = cellsOfDocument(whole);
    const places = Array.from({ length: net.drops }, (_, i) =>
      Array.from({ length: net.channels }, (_, j) => net.placeAt(i + 0.5, j + 0.5)),
    ).flat();
    for (const { measures } of cells.filter((cell) => cell.notJudged === null)) {
      const [x, z] = map.toSection(measures.middle as never);
      const distance = Math.min(...places.map((place) => Math.hypot(place[0] - x, place[1] - z)));
      expect(distance).toBeLessThan(0.08 * measures.length * map.unitsPerPx);
    }
  });

  it('with an angle of the ground at their outline are not judged, and only those', () => {
    const { cells } = cellsOfDocument(whole).net;
    const unjudged = cells.filter((cell) => cell.notJudged !== null);
    expect(unjudged.map((cell) => cell.notJudged)).toEqual(unjudged.map(() => 'singular'));
    // The focus of the parabola; the two edges of the apron; both sides of the pile's tip.
    expect(unjudged).toHaveLength(net.bounded ? 1 : 2);
  });

  it('leave to the last outlet as many exit cells as channels', () => {
    const { cells } = cellsOfDocument(whole).net;
    expect(cells.filter((cell) => cell.isExit)).toHaveLength(net.channels);
  });

  it('carry the same flow in every channel, all of it Nf/Nd of kH (Forchheimer), within 2 %', () => {
    const channels = channelsOf(cellsOfDocument(whole).net.cells, PLAIN_FACTS);
    expect(channels).toHaveLength(net.channels);
    for (const { flow } of channels) expect(Math.abs(flow! - 1)).toBeLessThan(0.02);
    channels.slice(1).forEach(({ left }, i) => {
      expect(left).toBe(channels[i]!.right);
    });
  });

  it('are the same when lines are drawn the other way round', () => {
    const turned = withLines(whole, 'equipotential', (line, i) =>
      i % 2 === 0 ? { ...line, points: [...line.points].reverse() } : line,
    );
    const flowTurned = withLines(turned, 'flowLine', (line) => ({
      ...line,
      points: [...line.points].reverse(),
    }));
    const facts = (document: typeof whole) =>
      cellsOfDocument(document).net.cells.map(({ before, after, left, right, ratio }) => [
        before,
        after,
        left.id,
        right.id,
        Number(ratio.toFixed(6)),
      ]);
    expect(facts(flowTurned)).toEqual(facts(whole));
  });
});

describe('cells that are not squares by nature', () => {
  it('are not judged where a flow line stops within them', () => {
    const { net, pxPerUnit } = EXACT_NETS[1]!;
    const document = withLines(exactNetDocument(net, { pxPerUnit }), 'flowLine', (line, i) =>
      i === 2 ? { ...line, points: line.points.slice(0, Math.floor(line.points.length / 2)) } : line,
    );
    const { cells } = cellsOfDocument(document).net;
    const broken = cells.filter((cell) => cell.notJudged === 'lineEnds');
    expect(broken.length).toBeGreaterThanOrEqual(1);
    expect(broken.length).toBeLessThanOrEqual(2);
  });

  it('are not judged at a face of free outflow', () => {
    const { net, model } = cellsOfDocument(freeOutflowNet([]));
    const last = model.strips.at(-1)!;
    const atFace = net.cells.filter((cell) => cell.after === last.after || cell.before === last.before);
    for (const cell of atFace) expect(cell.notJudged).not.toBeNull();
    expect(net.cells.filter((cell) => cell.notJudged === null).length).toBeGreaterThanOrEqual(4);
  });

  it('do not come from a document without flow lines and boundaries', () => {
    const { net, pxPerUnit } = EXACT_NETS[2]!;
    const bare = withLines(exactNetDocument(net, { pxPerUnit }), 'flowLine', () => null);
    expect(cellsOfDocument(bare).net.cells).toEqual([]);
  });
});
