import { describe, expect, it } from 'vitest';
import { basicParabolaNet } from '#shared/compute/exact/basic-parabola-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { sheetPileNet } from '#shared/compute/exact/sheet-pile-net.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

const pile = sheetPileNet({ depth: 5, headwater: 1, tailwater: 0, drops: 10, channels: 4, head: [0, 0] });
const apron = flatApronNet({ width: 20, headwater: 1, tailwater: 0, drops: 12, channels: 7, middle: [0, 0] });

describe('closed forms of the exact nets', () => {
  it('give the head down a sheet pile (published check 1A-06, Harr 1962)', () => {
    const check = PUBLISHED['1A-06'];
    expect(pile.headAt(1e-12, -1)).toBeCloseTo(check.h_over_H_y1, 6);
    expect(pile.headAt(1e-12, -2.5)).toBeCloseTo(check['h_over_H_y2.5'], 6);
    expect(pile.headAt(1e-12, -4)).toBeCloseTo(check.h_over_H_y4, 6);
  });

  it('place the nodes of the sheet pile net (published check 1A-07, Harr 1962)', () => {
    const check = PUBLISHED['1A-07'];
    // Node i, j counts i drops up from the tailwater and j channels out from the pile.
    const node = pile.placeAt(10 - 3, 2);
    expect(node[0]).toBeCloseTo(check.node_i3_j2_x, 6);
    expect(-node[1]).toBeCloseTo(check.node_i3_j2_depth, 6);
    expect(pile.placeAt(10, 4)[0]).toBeCloseTo(check.outer_flow_line_half_width, 6);
    expect(-pile.placeAt(5, 4)[1]).toBeCloseTo(check.outer_flow_line_depth, 6);
  });

  it('place the nodes of the apron net (published check 1A-08, Harr 1962)', () => {
    const check = PUBLISHED['1A-08'];
    const node = apron.placeAt(12 - 4, 3);
    expect(node[0]).toBeCloseTo(check.node_i4_j3_x, 6);
    expect(-node[1]).toBeCloseTo(check.node_i4_j3_depth, 6);
    expect(apron.placeAt(12, 7)[0]).toBeCloseTo(check.outer_flow_line_half_width, 6);
    expect(-apron.placeAt(6, 7)[1]).toBeCloseTo(check.outer_flow_line_depth, 6);
  });

  it('give the head along the apron (published check 1A-12, Harr 1962)', () => {
    const check = PUBLISHED['1A-12'];
    expect(apron.headAt(-8, 0)).toBeCloseTo(check['h_over_H_x-8'], 6);
    expect(apron.headAt(-5, 0)).toBeCloseTo(check['h_over_H_x-5'], 6);
    expect(apron.headAt(0, 0)).toBeCloseTo(check.h_over_H_x0, 6);
    expect(apron.headAt(5, 0)).toBeCloseTo(check.h_over_H_x5, 6);
    expect(apron.headAt(8, 0)).toBeCloseTo(check.h_over_H_x8, 6);
  });

  it('give the basic parabola (published check 2-01, Kozeny 1931)', () => {
    const check = PUBLISHED['2-01'];
    const net = basicParabolaNet({ head: 12, drops: 12, channels: check.S, focus: [0, 0] });
    expect(net.headAt(-20, 0)).toBeCloseTo(check.h_on_base_x20, 6);
    // On the phreatic line the head is the elevation.
    expect(net.headAt(-20, check.y_at_x20 - 1e-9)).toBeCloseTo(check.y_at_x20, 6);
    expect(net.headAt(0, check.y_at_x0 - 1e-9)).toBeCloseTo(check.y_at_x0, 6);
  });

  it('agree between place and head everywhere', () => {
    for (const net of [pile, apron]) {
      for (let i = 1; i < 10; i += 1) {
        const [x, z] = net.placeAt(i + 0.3, 1.7);
        expect(net.headAt(x, z)).toBeCloseTo(1 - (i + 0.3) / net.drops, 9);
      }
    }
  });
});
