import { describe, expect, it } from 'vitest';
import { type BesideSolution, besideSolution } from '#shared/compute/beside/beside-solution.ts';
import { STEPS } from '#shared/compute/beside/difference-steps.ts';
import { sectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import { type SolveOptions, solveSection } from '#shared/compute/independent/solve-section.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { changed, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { uprightDam } from '#tests/support/exact-nets/upright-dam.ts';

// The basic parabola: an exact solution (Kozeny 1931; Casagrande 1937) whose outline is closed as it is drawn.
const { net, pxPerUnit } = EXACT_NETS[0]!;
const PLACE = net.placeAt(4.4, 1.1);
const drawn = exactNetDocument(net, { pxPerUnit, readings: [{ at: PLACE, clicked: false }] });

function beside(document: FlowNetDocument, options: SolveOptions = {}): BesideSolution {
  const section = sectionOfDocument(document);
  if (!section.ok) throw new Error(section.text);
  const solution = solveSection(section.problem, options);
  if (!solution.ok) throw new Error(solution.text);
  return besideSolution(document, readNet(document), section, solution)!;
}

const headLost = net.headwater - net.outHead;

describe('a traced net beside the independent solution of its section', () => {
  const exact = beside(drawn);

  it('of an exact net differs nowhere by more than the solution and the tracing allow', () => {
    const [point] = exact.comparison.points;
    expect(Math.abs(point!.independent! - net.headAt(...PLACE))).toBeLessThan(0.005 * headLost);
    expect(Math.abs(exact.comparison.seepage.part!)).toBeLessThan(0.01);
    expect(exact.imbalance).toBeLessThan(0.005);
    expect(exact.picture.compared).toBeGreaterThan(500);
    expect(exact.picture.above.slice(1).flat()).toEqual([]);
    expect(exact.picture.below.slice(1).flat()).toEqual([]);
  });

  it('gives the computed net with as many drops as the traced one, its lines where the traced ones lie', () => {
    expect(exact.net.drops).toBe(net.drops);
    expect(exact.net.equipotentials).toHaveLength(net.drops - 1);
    expect(exact.net.channels).toBeCloseTo(net.channels, 1);
    const traced = Object.values(drawn.entities).flatMap(({ value }) =>
      value.kind === 'line' && value.line === 'equipotential' ? [value.points] : [],
    );
    const middles = exact.net.equipotentials.map(({ lines }) => lines[0]![lines[0]!.length >> 1]!);
    for (const middle of middles) {
      const nearest = Math.min(...traced.flat().map((at) => distance(at, middle)));
      // Vertices of the traces lie some 40 px apart.
      expect(nearest).toBeLessThan(30);
    }
  });

  it('gives no gradient of the place beside a corner, where the mesh would decide it', () => {
    // Water leaves into the drain, whose edge is the focus of the parabola: there the gradient has no bound.
    const [exit] = exact.exits;
    expect(exact.exits).toHaveLength(1);
    expect(exit!.hasSingular).toBe(true);
    const finer = beside(drawn, { accuracy: 1e-5 }).exits[0]!;
    expect(finer.gradient / exit!.gradient).toBeGreaterThan(0.8);
    expect(finer.gradient / exit!.gradient).toBeLessThan(1.25);
  });

  it('gives the same exit gradient on a finer mesh where a face of free outflow meets the base', () => {
    const dam = uprightDam();
    const [coarse, fine] = [300, 900].map((elements) => beside(dam, { elements, accuracy: 1 }));
    expect(Math.abs(coarse!.exits[0]!.gradient / fine!.exits[0]!.gradient - 1)).toBeLessThan(0.1);
    // The toe lies at (1500, 2000) on this sheet, and water comes out over some 3.7 m of the face, at 100 px to a metre.
    expect(distance(fine!.exits[0]!.at, [1500, 2000])).toBeGreaterThan(30);
    // Nothing is traced to count by, so the usual ten drops are drawn; the free surface is found and placed.
    expect(fine!.net.equipotentials).toHaveLength(9);
    expect(fine!.net.surface[0]!.length).toBeGreaterThan(10);
  });

  it('shows where one line is drawn out of place, with the sign of traced minus independent', () => {
    let moved = 0;
    // The fifth equipotential carried halfway towards the headwater: the ground beside it is read too low.
    const wrong = withLines(drawn, 'equipotential', (value, index) => {
      if (index !== 4) return value;
      moved += 1;
      const [from, to] = [net.placeAt(5, 1.5), net.placeAt(4.5, 1.5)];
      const dx = (to[0] - from[0]) * pxPerUnit;
      return { ...value, points: value.points.map(([x, y]): SheetPoint => [x + dx, y]) };
    });
    expect(moved).toBe(1);
    const { picture } = beside(wrong);
    const worst = picture.greatestBelow!;
    expect(worst.part).toBeLessThan(-STEPS[1]);
    expect(Math.abs(worst.part)).toBeGreaterThan(2 * (picture.greatestAbove?.part ?? 0));
    expect(picture.below[1]!.length + picture.below[2]!.length).toBeGreaterThan(10);
  });

  it('compares no seepage where no permeability is given, and no heads where the net is unfinished', () => {
    const without = beside(changed(drawn, 'permeability', (value) => ({ ...value, k: null })));
    expect(without.hasPermeability).toBe(false);
    expect(without.comparison.seepage.independent).toBeNull();
    expect(without.comparison.points[0]!.difference).not.toBeNull();
    const unfinished = beside(changed(drawn, 'netCount', (value) => ({ ...value, drops: 3 })));
    expect(unfinished.picture.compared).toBe(0);
    expect(unfinished.comparison.points[0]).toMatchObject({ traced: null, difference: null });
    expect(unfinished.comparison.points[0]!.independent).not.toBeNull();
  });
});

function distance([x, y]: SheetPoint, [ox, oy]: SheetPoint): number {
  return Math.hypot(x - ox, y - oy);
}
