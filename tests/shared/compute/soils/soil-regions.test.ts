import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import { facesOf } from '#shared/compute/soils/faces.ts';
import type { Soil } from '#shared/compute/soils/soil-list.ts';
import { soilRegionsOf } from '#shared/compute/soils/soil-regions.ts';
import { type LineKind, type SheetPoint, UNSAID } from '#shared/contract/document.ts';

const REACH = 10;
const UP = [0, -1] as const;

function line(kind: LineKind, points: SheetPoint[]): NetLine {
  const value = {
    kind: 'line' as const,
    origin: 'traced' as const,
    line: kind,
    name: '',
    points,
    finished: true,
    water: null,
    head: null,
    drops: null,
  };
  return { id: `${kind} ${points[0]}`, kind, value, shape: polylineOf(points)! };
}

function soil(label: string, ...places: SheetPoint[]): Soil {
  const value = {
    kind: 'permeability' as const,
    ...UNSAID.soil,
    k: 1,
    unit: 'm/s' as const,
    factor: null,
    source: '',
  };
  return { id: label, label, kh: 1, kv: 1, dipDeg: 0, places, value };
}

const section = soil('section');
const outline = [
  line('ground', [
    [0, 0],
    [1000, 0],
  ]),
  line('impervious', [
    [0, 0],
    [0, 500],
    [1000, 500],
    [1000, 0],
  ]),
];
const regions = (lines: NetLine[], ...placed: Soil[]) =>
  soilRegionsOf([...outline, ...lines], { section, placed }, REACH, UP);
const codes = (found: ReturnType<typeof regions>) => found.findings.map(({ code }) => code);

describe('regions of soils', () => {
  const layer = line('soilBoundary', [
    [4, 200],
    [500, 205],
    [997, 198],
  ]);

  it('reach from boundary to boundary, small gaps closed', () => {
    const clay = soil('clay', [300, 300]);
    const found = regions([layer], clay);
    expect(codes(found)).toEqual([]);
    for (const [x, y] of [
      [2, 350],
      [998, 250],
      [500, 210],
    ] as const)
      expect(found.soilAt(x, y)).toBe(clay);
    for (const [x, y] of [
      [2, 150],
      [998, 190],
      [500, 200],
    ] as const)
      expect(found.soilAt(x, y)).toBe(section);
  });

  it('hold a lens inside a layer as one of its own', () => {
    const lens = line('soilBoundary', [
      [400, 300],
      [600, 300],
      [600, 400],
      [400, 400],
      [403, 305],
    ]);
    const clay = soil('clay', [100, 300], [100, 480]);
    const sand = soil('sand', [500, 350]);
    const found = regions([layer, lens], sand, clay);
    expect(codes(found)).toEqual([]);
    expect(found.soilAt(500, 320)).toBe(sand);
    expect(found.soilAt(500, 290)).toBe(clay);
    expect(found.soilAt(500, 100)).toBe(section);
  });

  it('are contradictory when two soils are placed in one, and told at the place', () => {
    const found = regions([layer], soil('clay', [300, 300]), soil('silt', [700, 400]));
    expect(codes(found)).toEqual(['soilsContradict']);
    expect(found.findings[0]!.at).toEqual([700, 400]);
    expect(found.findings[0]!.weight).toBe('wrong');
  });

  it('are closed by a boundary that ends far from any other, which is questioned where it ends', () => {
    const short = line('soilBoundary', [
      [0, 200],
      [900, 200],
    ]);
    const clay = soil('clay', [300, 300]);
    const found = regions([short], clay);
    expect(codes(found)).toEqual(['soilBoundaryOpen']);
    expect(found.findings[0]!.at).toEqual([900, 200]);
    expect(found.soilAt(950, 250)).toBe(clay);
    expect(found.soilAt(950, 150)).toBe(section);
  });

  it('reach to the edge of the sheet where the section has no sides', () => {
    const open = soilRegionsOf(
      [outline[0]!, layer],
      { section, placed: [soil('clay', [500, 400])] },
      REACH,
      UP,
    );
    expect(codes(open)).toEqual([]);
    expect(open.soilAt(30, 400).label).toBe('clay');
    expect(open.soilAt(30, 100)).toBe(section);
  });

  it('are kept apart where the outline gapes at its corners or has no sides', () => {
    const core = line('soilBoundary', [
      [500, 2],
      [500, 498],
    ]);
    const clay = soil('clay', [700, 300]);
    const top = line('ground', [
      [3, 0],
      [996, 3],
    ]);
    const base = line('impervious', [
      [0, 500],
      [1000, 500],
    ]);
    const sides = [0, 1000].map((x) =>
      line('submergedFace', [
        [x, 4],
        [x, 494],
      ]),
    );
    for (const lines of [
      [top, base, core],
      [top, base, core, ...sides],
    ]) {
      const found = soilRegionsOf(lines, { section, placed: [clay] }, REACH, UP);
      expect(found.soilAt(300, 300)).toBe(section);
      expect(found.soilAt(800, 200)).toBe(clay);
    }
  });

  it('pass below the tip of a wall', () => {
    const wall = line('impervious', [
      [500, 0],
      [500, 320],
    ]);
    const clay = soil('clay', [300, 300]);
    const open = soilRegionsOf([outline[0]!, layer, wall], { section, placed: [clay] }, REACH, UP);
    expect(open.soilAt(800, 290)).toBe(clay);
    expect(open.soilAt(800, 100)).toBe(section);
  });

  it('are one where nothing is traced', () => {
    const empty = soilRegionsOf([], { section, placed: [soil('clay', [1, 1])] }, REACH, UP);
    expect(empty.soilAt(1, 1)).toBe(section);
    expect(codes(empty)).toEqual([]);
  });
});

describe('the plane parted by lines', () => {
  it('has as many regions as lines enclose, and finds the innermost', () => {
    const square = (from: number, to: number): SheetPoint[] => [
      [from, from],
      [to, from],
      [to, to],
      [from, to],
      [from, from],
    ];
    const across: SheetPoint[] = [
      [-5, 50],
      [105, 50],
    ];
    const faces = facesOf([square(0, 100), square(20, 40), across], 0.1)!;
    expect(faces.count).toBe(3);
    const numbers = [faces.at(30, 30), faces.at(10, 10), faces.at(50, 80), faces.at(-3, 20)];
    expect(new Set(numbers).size).toBe(4);
    expect(numbers[3]).toBe(-1);
  });
});
