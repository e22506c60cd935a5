import { describe, expect, it } from 'vitest';
import type { ExactNet, ExactPlace } from '#shared/compute/exact/exact-net.ts';
import { compareWithIndependent } from '#shared/compute/independent/compare-with-independent.ts';
import { sectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { uprightDam } from '#tests/support/exact-nets/upright-dam.ts';

const [parabola, apron, pile] = EXACT_NETS;

/** A line drawn straight from place to place. */
function through(places: readonly ExactPlace[]): (part: number) => ExactPlace {
  return (part) => {
    const at = Math.min(places.length - 2, Math.floor(part * (places.length - 1)));
    const t = part * (places.length - 1) - at;
    const [a, b] = [places[at]!, places[at + 1]!];
    return [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])];
  };
}

/** An exact net of a half-space with a far boundary drawn along its outermost flow line, where nothing passes. */
function bounded(net: ExactNet): ExactNet {
  const beds = net.lines.filter(({ line }) => line !== 'submergedFace');
  const bed = (water: 'headwater' | 'tailwater', drops: number) => ({
    line: 'submergedFace' as const,
    water,
    at: (part: number) => net.placeAt(drops, part * net.channels),
  });
  return {
    ...net,
    lines: [
      ...beds,
      bed('headwater', 0),
      bed('tailwater', net.drops),
      { line: 'impervious', water: null, at: (part) => net.placeAt(part * net.drops, net.channels) },
    ],
  };
}

function solvedDocument(document: FlowNetDocument): SectionSolution {
  const section = sectionOfDocument(document);
  if (!section.ok) throw new Error(section.text);
  const solution = solveSection(section.problem);
  if (!solution.ok) throw new Error(solution.text);
  return solution;
}

describe('the section of a document', () => {
  it.each([
    { name: 'apron', net: bounded(apron!.net), pxPerUnit: apron!.pxPerUnit },
    { name: 'sheet pile', net: bounded(pile!.net), pxPerUnit: pile!.pxPerUnit },
    { name: 'sheet pile, mirrored', net: bounded(pile!.net), pxPerUnit: pile!.pxPerUnit, mirrored: true },
  ])(
    '$name between traced boundaries: heads and seepage of the closed form (Harr 1962)',
    ({ net, ...drawn }) => {
      const tracing: Tracing = { ...drawn, jitterPx: 1.5, seed: 7 };
      const solution = solvedDocument(exactNetDocument(net, tracing));
      const exact = (2.5e-6 * (net.headwater - net.outHead) * net.channels) / net.drops;
      expect(Math.abs(solution.inflow / exact - 1)).toBeLessThan(0.01);
      const { headAt } = solutionReader(solution);
      const lost = net.headwater - net.outHead;
      for (const drops of [1.5, 3.3, 5.2, net.drops - 1.2]) {
        for (const channel of [0.7, 2.4]) {
          const place = net.placeAt(drops, channel);
          expect(Math.abs(headAt([place[0], place[1]])! - net.headAt(...place))).toBeLessThan(0.005 * lost);
        }
      }
    },
  );

  it('the basic parabola, closed by its traced phreatic line for want of ground above it (Kozeny 1931)', () => {
    const { net, pxPerUnit } = parabola!;
    const document = exactNetDocument(net, {
      pxPerUnit,
      jitterPx: 1.5,
      readings: [{ at: net.placeAt(4.4, 1.1), clicked: false }],
    });
    const section = sectionOfDocument(document);
    expect(section).toMatchObject({ ok: true, usesPhreaticLine: true, hasPermeability: true });
    const solution = solvedDocument(document);
    const { points, seepage, outlets } = compareWithIndependent(readNet(document), solution, true);
    expect(points).toHaveLength(1);
    expect(Math.abs(points[0]!.part!)).toBeLessThan(0.005);
    expect(points[0]!.difference).toBeCloseTo(points[0]!.traced! - points[0]!.independent!, 12);
    expect(Math.abs(seepage.part!)).toBeLessThan(0.01);
    expect(outlets).toHaveLength(1);
    expect(outlets[0]!.independent! / solution.outflow).toBeCloseTo(1, 6);
  });

  it('says where an outline is open, and makes no section of the chinks between line ends', () => {
    for (const { net, pxPerUnit } of [apron!, pile!]) {
      for (const seed of [1, 2, 3]) {
        const section = sectionOfDocument(exactNetDocument(net, { pxPerUnit, jitterPx: 1.5, seed }));
        expect(section).toMatchObject({ ok: false, code: 'outline-open' });
        if (!section.ok) expect(section.at).not.toBeNull();
      }
    }
  });

  it('takes a dam with ground above its water as unconfined and finds the surface itself', () => {
    const dam = uprightDam();
    const section = sectionOfDocument(dam);
    expect(section).toMatchObject({ ok: true, usesPhreaticLine: false });
    const solution = solvedDocument(dam);
    // Published case 2-12 (Dupuit 1863; Charny 1951): q = kh²/2L.
    expect(Math.abs(solution.inflow / (2.5e-6 * 5) - 1)).toBeLessThan(0.006);
    expect(solution.phreatic).not.toBeNull();
    expect(Math.abs(solution.phreatic![0]!.at(-1)![1] - 3.67)).toBeLessThan(0.3);
  });

  it('without a permeability gives heads, and no seepage to compare', () => {
    const net = bounded(pile!.net);
    const document = changed(
      exactNetDocument(net, { pxPerUnit: pile!.pxPerUnit }),
      'permeability',
      (value) => ({
        ...value,
        k: null,
      }),
    );
    const section = sectionOfDocument(document);
    expect(section).toMatchObject({ ok: true, hasPermeability: false });
    const solution = solvedDocument(document);
    const compared = compareWithIndependent(readNet(document), solution, false);
    expect(compared.seepage).toEqual({ traced: null, independent: null, difference: null, part: null });
    expect(solution.greatestHead).toBeCloseTo(net.headwater, 6);
  });

  it('refuses what is not set out, has no water or lets none out', () => {
    const document = exactNetDocument(bounded(pile!.net), { pxPerUnit: pile!.pxPerUnit });
    expect(sectionOfDocument(changed(document, 'knownPoint', () => null))).toMatchObject({
      ok: false,
      code: 'nothing-drawn',
    });
    expect(
      sectionOfDocument(changed(document, 'waterLevels', (value) => ({ ...value, headwater: null }))),
    ).toMatchObject({ ok: false, code: 'no-head' });
    const withoutOutlet = changed(document, 'line', (value) => (value.water === 'tailwater' ? null : value));
    expect(sectionOfDocument(withoutOutlet)).toMatchObject({ ok: false, code: 'no-head' });
  });

  it('traces of another net than the boundaries change nothing', () => {
    const document = exactNetDocument(bounded(pile!.net), { pxPerUnit: pile!.pxPerUnit });
    const bare = changed(document, 'line', (value) =>
      value.line === 'equipotential' || value.line === 'flowLine' ? null : value,
    );
    expect(solvedDocument(bare).flow).toEqual(solvedDocument(document).flow);
  });
});

describe('a wall whose bed is traced past it', () => {
  it('lets no head leak round its foot', () => {
    const far: readonly ExactPlace[] = [
      [-40, 99],
      [-40, 79],
      [40, 79],
      [40, 99],
    ];
    const net: ExactNet = {
      ...pile!.net,
      lines: [
        {
          line: 'submergedFace',
          water: 'headwater',
          at: through([
            [-40, 99],
            [0.03, 99],
          ]),
        },
        {
          line: 'submergedFace',
          water: 'tailwater',
          at: through([
            [-0.02, 99],
            [40, 99],
          ]),
        },
        {
          line: 'impervious',
          water: null,
          at: through([
            [0, 99.02],
            [0, 89],
          ]),
        },
        { line: 'impervious', water: null, at: through(far) },
      ],
    };
    const solution = solvedDocument(exactNetDocument(net, { pxPerUnit: 55 }));
    // Sheet pile, s/T = 0.5: q/kH = 0.5 (published case 1A-02).
    expect(Math.abs(solution.inflow / (2.5e-6 * 4 * 0.5) - 1)).toBeLessThan(0.01);
  });
});
