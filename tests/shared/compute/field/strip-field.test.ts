import { describe, expect, it } from 'vitest';
import { type StripField, solveStrip } from '#shared/compute/field/strip-field.ts';
import type { StripSurroundings } from '#shared/compute/field/strip-mesh.ts';
import type { MeshTensor } from '#shared/compute/field/strip-system.ts';
import { ringOf } from '#shared/compute/geometry/polygon.ts';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

const ALONE: StripSurroundings = { walls: [], freeFaces: [], soilBoundaries: [], slack: 3 };
const line = (...points: Pair[]) => polylineOf(points)!;

/** The ground between x = 0 and x = 300, from y = 0 to y = 200. */
const BLOCK: Strip = {
  before: 'before',
  after: 'after',
  beforeShape: line([0, 0], [0, 200]),
  afterShape: line([300, 0], [300, 200]),
  ring: ringOf([
    [0, 0],
    [0, 200],
    [300, 200],
    [300, 0],
  ])!,
  ways: [
    {
      points: [
        [0, 0],
        [300, 0],
      ],
      open: false,
    },
    {
      points: [
        [0, 200],
        [300, 200],
      ],
      open: false,
    },
  ],
  held: [],
};

function solved(
  around: Partial<StripSurroundings>,
  tensorAt: ((x: number, y: number) => MeshTensor) | null = null,
  heads: [number, number] = [10, 4],
): StripField {
  const field = solveStrip(
    BLOCK,
    { before: () => heads[0], after: () => heads[1], free: () => Number.NaN },
    { ...ALONE, ...around },
    tensorAt,
  );
  expect(field).not.toBeNull();
  return field!;
}

const isotropic = (k: number): MeshTensor => ({ xx: k, xy: 0, yy: k });

describe('the field of a strip', () => {
  it('falls evenly between two parallel lines, with its gradient', () => {
    const field = solved({});
    for (const x of [1, 77, 150, 299]) {
      const found = field.at(x, 120, 3)!;
      expect(found.head).toBeCloseTo(10 - (6 * x) / 300, 5);
      expect(found.gradient[0]).toBeCloseTo(-0.02, 6);
      expect(found.gradient[1]).toBeCloseTo(0, 6);
    }
    expect(field.at(305, 120, 3)).toBeNull();
    expect(field.at(302, 120, 3)!.head).toBeCloseTo(4, 6);
  });

  // Darcy (1856): the same flow through both soils, so Δh₁/Δh₂ = (L₁/k₁)/(L₂/k₂); here 100/1 to 200/5.
  it('parts the head between soils in series by L/k', () => {
    const field = solved({ soilBoundaries: [line([100, -50], [100, 250])] }, (x) =>
      isotropic(x < 100 ? 1 : 5),
    );
    expect(field.at(100, 60, 3)!.head).toBeCloseTo(10 - (6 * 100) / 140, 4);
    expect(field.at(50, 150, 3)!.head).toBeCloseTo(10 - (6 * 50) / 140, 4);
    expect(field.at(200, 20, 3)!.head).toBeCloseTo(4 + (6 * 20) / 140, 4);
  });

  it('is the same in soils side by side, whatever their permeabilities', () => {
    const field = solved({ soilBoundaries: [line([-50, 90], [350, 90])] }, (_, y) =>
      isotropic(y < 90 ? 1 : 40),
    );
    expect(field.at(150, 30, 3)!.head).toBeCloseTo(7, 4);
    expect(field.at(150, 170, 3)!.head).toBeCloseTo(7, 4);
  });

  // ∇·(K∇h) = 0 with kx = 4·ky is Laplace's equation in x' = x/2 (Samsioe 1931): a wall into the block, read at
  // places of both.
  it('with kh = 4·kv is that of the block shortened to half, and a wall parts the head on its two sides', () => {
    const wall = line([150, 0], [150, 120]);
    const natural = solved({ walls: [wall] }, () => ({ xx: 4, xy: 0, yy: 1 }));
    const half = (points: readonly Pair[]): Pair[] => points.map(([x, y]) => [x / 2, y]);
    const shortened: Strip = {
      ...BLOCK,
      afterShape: line([150, 0], [150, 200]),
      ring: ringOf([
        [0, 0],
        [0, 200],
        [150, 200],
        [150, 0],
      ])!,
      ways: BLOCK.ways.map((way) => ({ ...way, points: half(way.points) })),
    };
    const transformed = solveStrip(
      shortened,
      { before: () => 10, after: () => 4, free: () => Number.NaN },
      { ...ALONE, walls: [line([75, 0], [75, 120])] },
      null,
    )!;
    for (const [x, y] of [
      [40, 20],
      [110, 100],
      [145, 60],
      [156, 60],
      [200, 150],
    ] as const) {
      expect(Math.abs(natural.at(x, y, 3)!.head - transformed.at(x / 2, y, 3)!.head)).toBeLessThan(0.07);
    }
    expect(natural.at(146, 60, 3)!.head - natural.at(154, 60, 3)!.head).toBeGreaterThan(2);
    expect(natural.at(150, 160, 3)!.head).toBeCloseTo(7, 1);
  });

  it('has no head in a pocket that walls close off', () => {
    const pocket = line([100, 50], [200, 50], [200, 150], [100, 150], [100, 50]);
    const field = solved({ walls: [pocket] });
    expect(field.at(150, 100, 3)).toBeNull();
    expect(field.at(150, 25, 3)!.head).toBeCloseTo(7, 1);
  });
});
