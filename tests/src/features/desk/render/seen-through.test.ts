import { describe, expect, it } from 'vitest';
import { sectionViews } from '#client/features/desk/model/section-views.ts';
import type { SceneItem } from '#client/features/desk/render/scene.ts';
import { itemsThrough } from '#client/features/desk/render/seen-through.ts';
import type { FrameReading } from '#shared/contract/reading-frame.ts';

const third: [number, number, number, number] = [1 / 3, 0, 0, 1];
const look = { colour: '#000', widthPx: 2, dashPx: [], end: 'none', hatchPx: 0 } as const;
const line: SceneItem = {
  id: 'a',
  shape: 'line',
  points: [
    [30, 6],
    [60, 9],
  ],
  look,
  strong: false,
};
const mark: SceneItem = {
  id: 'b',
  shape: 'label',
  at: [9, 4],
  text: '114',
  colour: '#000',
  strong: false,
  offsetPx: [3, -12],
};
const area: SceneItem = {
  id: 'c',
  shape: 'area',
  outlines: [
    [
      [0, 0],
      [3, 0],
      [3, 3],
    ],
  ],
  look: { colour: '#000', alpha: 0.2, edged: false },
  strong: false,
};

describe('a picture seen through a map', () => {
  it('is the drawing itself without one', () => {
    const items = [line, mark];
    expect(itemsThrough(items, null)).toBe(items);
  });

  it('has its places mapped, and its words and widths as they were', () => {
    expect(itemsThrough([line, mark, area], third)).toEqual([
      {
        ...line,
        points: [
          [10, 6],
          [20, 9],
        ],
      },
      { ...mark, at: [3, 4] },
      {
        ...area,
        outlines: [
          [
            [0, 0],
            [1, 0],
            [1, 3],
          ],
        ],
      },
    ]);
  });

  it('keeps what did not change the same, and follows another map', () => {
    const [first] = itemsThrough([line], third);
    const [again] = itemsThrough([{ ...line, strong: true }], third);
    const pointsOf = (item: SceneItem | undefined) => (item?.shape === 'line' ? item.points : null);
    expect(pointsOf(again)).toBe(pointsOf(first));
    expect(pointsOf(itemsThrough([line], [1, 0, 0, 0.5])[0])).toEqual([
      [30, 3],
      [60, 4.5],
    ]);
  });
});

describe('the ways in which a section can be seen', () => {
  const frame = (changes: Partial<FrameReading>): FrameReading => ({
    kind: 'natural',
    ratio: 1,
    factor: 1,
    dipDeg: 0,
    matrix: [1, 0, 0, 1],
    naturalMatrix: [1, 0, 0, 1],
    ...changes,
  });
  const names = (reading: FrameReading | null) => [...sectionViews(reading).keys()];

  it('are the drawing alone before it is set out, and where it is isotropic and at one scale', () => {
    expect(names(null)).toEqual(['sheet']);
    expect(names(frame({}))).toEqual(['sheet']);
  });

  it('are the transformed section too in anisotropic ground, the natural one where the drawing is stretched', () => {
    expect(names(frame({ kind: 'transformed', matrix: third }))).toEqual(['sheet', 'transformed']);
    const stretched = frame({ naturalMatrix: [1, 0, 0, 0.5], matrix: [1, 0, 0, 0.5] });
    expect(names(stretched)).toEqual(['sheet', 'natural']);
    expect(sectionViews(stretched).get('natural')).toEqual([1, 0, 0, 0.5]);
  });

  it('are the drawing and the natural section where the drawing itself is the transformed one', () => {
    expect(names(frame({ kind: 'transformed', naturalMatrix: [1, 0, 0, 1 / 3] }))).toEqual([
      'sheet',
      'natural',
    ]);
  });

  it('are no transformed one where the soils share none', () => {
    expect(names(frame({ kind: 'none', matrix: third }))).toEqual(['sheet']);
  });
});
