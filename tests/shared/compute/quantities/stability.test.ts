import { describe, expect, it } from 'vitest';
import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sheetPileNet } from '#shared/compute/exact/sheet-pile-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { centredPileNet } from '#tests/support/exact-nets/centred-pile-net.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';

const pile = sheetPileNet({
  depth: 10,
  headwater: 104,
  tailwater: 100,
  drops: 10,
  channels: 4,
  head: [0, 99],
});
const apron = flatApronNet({
  width: 20,
  headwater: 106,
  tailwater: 100,
  drops: 12,
  channels: 7,
  middle: [0, 98],
});

function withWeight(document: FlowNetDocument): FlowNetDocument {
  return changed(document, 'permeability', (value) => ({ ...value, specificGravity: 2.65, voidRatio: 0.65 }));
}

describe('heave beside a wall', () => {
  it('has the mean excess head of the closed form on its base (published case 4-10)', () => {
    const reading = readNet(withWeight(exactNetDocument(pile, { pxPerUnit: 90 })));
    expect(reading.stability.heave).toHaveLength(1);
    const [prism] = reading.stability.heave;
    expect(prism!.depth).toBeCloseTo(10, 1);
    expect(prism!.width).toBeCloseTo(5, 1);
    // C0 of the half-space, by quadrature of the exact head; the traced net reads it within 0.02 drop.
    expect(Math.abs(prism!.meanExcessHead! - 0.3539612 * 4)).toBeLessThan(0.02 * 0.4);
    // i_c = 1 for Gs 2.65 and e 0.65, so that F = D/h_m.
    expect(prism!.factor!).toBeCloseTo(prism!.depth / prism!.meanExcessHead!, 9);
  });

  it('lies on the side of the outlet, whichever way the section is drawn', () => {
    const reading = readNet(withWeight(exactNetDocument(pile, { pxPerUnit: 90, mirrored: true })));
    expect(Math.abs(reading.stability.heave[0]!.meanExcessHead! - 0.3539612 * 4)).toBeLessThan(0.02 * 0.4);
  });

  it('has no factor while the weight of the soil is not known, and says what to enter', () => {
    const [prism] = readNet(exactNetDocument(pile, { pxPerUnit: 90 })).stability.heave;
    expect(prism!.factor).toBeNull();
    expect(prism!.note).toContain('unit weight');
  });

  it('is not looked for beside a floor without a wall', () => {
    expect(readNet(exactNetDocument(apron, { pxPerUnit: 55 })).stability.heave).toEqual([]);
  });
});

describe('exit gradients', () => {
  it('stand at the pile as H/(πs), by the point and by the cell (Harr 1962)', () => {
    const reading = readNet(withWeight(exactNetDocument(pile, { pxPerUnit: 90 })));
    expect(reading.exits).toHaveLength(4);
    const atPile = reading.exits.toSorted((a, b) => a.offset - b.offset)[0]!;
    // On the bed x = s·sinh v: i = H/(π·√(s² + x²)).
    const exact = 4 / (Math.PI * Math.hypot(10, atPile.offset));
    expect(atPile.pointState).toBe('read');
    expect(atPile.pointGradient! / exact).toBeCloseTo(1, 1);
    expect(atPile.cellGradient! / exact).toBeGreaterThan(0.85);
    expect(atPile.cellGradient! / exact).toBeLessThan(1.15);
    expect(atPile.criticalGradient).toBeCloseTo(1, 12);
    expect(atPile.factor).toBeCloseTo(1 / atPile.cellGradient!, 12);
    expect(atPile.seepageForce).toBeCloseTo(9.81 * atPile.cellGradient!, 12);
  });

  it('have no value at a floor edge, where there is no bound, and follow the closed form beyond it (1A-14)', () => {
    const { exits } = readNet(exactNetDocument(apron, { pxPerUnit: 55 }));
    const ordered = exits.toSorted((a, b) => a.offset - b.offset);
    expect(ordered[0]).toMatchObject({ pointState: 'singular', pointGradient: null });
    expect(ordered[0]!.cellGradient!).toBeGreaterThan(0);
    for (const { offset, pointGradient } of ordered.slice(1, -1)) {
      const exact = 6 / (Math.PI * Math.sqrt(offset ** 2 - 100));
      expect(Math.abs(pointGradient! / exact - 1)).toBeLessThan(0.1);
    }
  });

  it('have no factor on a sloping bed', () => {
    const turned = changed(withWeight(exactNetDocument(pile, { pxPerUnit: 90 })), 'knownPoint', (value) => ({
      ...value,
      // The whole section turned by one in ten, falling towards the outlet.
      offset: value.offset! + 0.1 * (value.elevation! - 99),
      elevation: value.elevation! - 0.1 * value.offset!,
    }));
    const reading = readNet(turned);
    expect(reading.exits).toHaveLength(4);
    expect(reading.stability.heave[0]).toMatchObject({ factor: null });
    expect(reading.stability.heave[0]!.note).toContain('slopes');
    for (const { factor, factorNote, slopeDeg } of reading.exits) {
      expect(slopeDeg).toBeGreaterThan(3);
      expect(factor).toBeNull();
      expect(factorNote).not.toBe('');
    }
  });
});

describe('creep along the contact', () => {
  it('counts a lone wall down and up', () => {
    const { creep } = readNet(exactNetDocument(pile, { pxPerUnit: 90 })).stability;
    expect(creep!.steep).toBeCloseTo(20, 1);
    expect(creep!.flat).toBeCloseTo(0, 1);
    expect(creep!.weightedRatio!).toBeCloseTo(5, 1);
  });

  it('counts a floor with a pile under its middle, in one outline of two lines (Lane 1935)', () => {
    const net = centredPileNet({
      width: 20,
      depth: 6,
      headwater: 106,
      tailwater: 100,
      drops: 12,
      channels: 6,
      middle: [0, 98],
    });
    const { creep } = readNet(exactNetDocument(net, { pxPerUnit: 55 })).stability;
    expect(creep!.lines).toHaveLength(2);
    expect(creep!.flat).toBeCloseTo(20, 0);
    expect(creep!.steep).toBeCloseTo(12, 0);
    expect(creep!.weightedRatio!).toBeCloseTo((12 + 20 / 3) / 6, 1);
  });

  it('is not given for a dam with a phreatic line, whose base is its foundation', () => {
    const dam = basicParabolaNet({ head: 20, drops: 10, channels: 3, focus: [14, 98] });
    const reading = readNet(exactNetDocument(dam, { pxPerUnit: 110 }));
    expect(reading.state).toBe('read');
    expect(reading.stability.creep).toBeNull();
  });
});
