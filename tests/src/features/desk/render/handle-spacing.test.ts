import { describe, expect, it } from 'vitest';
import type { ClickedPlace } from '#client/features/desk/model/clicked-places.ts';
import { handledVertices } from '#client/features/desk/render/handle-spacing.ts';

const level = (count: number, step: number) =>
  Array.from({ length: count }, (_, i): [number, number] => [i * step, 0]);
const clicks = (way: ClickedPlace['way'], ...indexes: number[]) =>
  new Map(indexes.map((i): [number, ClickedPlace] => [i, { at: [0, 0], way }]));

describe('the handles of a line', () => {
  it('stand on every vertex that can be told apart', () => {
    expect(handledVertices(level(4, 20), new Map(), 1, null)).toEqual([0, 1, 2, 3]);
    expect(handledVertices([], new Map(), 1, null)).toEqual([]);
  });

  it('keep apart on screen, the ends and the chosen one always shown', () => {
    expect(handledVertices(level(11, 5), new Map(), 1, null)).toEqual([0, 3, 6, 9, 10]);
    expect(handledVertices(level(11, 5), new Map(), 4, null)).toHaveLength(11);
    expect(handledVertices(level(11, 5), new Map(), 1, 4)).toEqual([0, 3, 4, 7, 10]);
  });

  it('of a smooth piece stand where it was clicked', () => {
    expect(handledVertices(level(11, 40), clicks('smooth', 0, 5, 10), 1, null)).toEqual([0, 5, 10]);
    expect(handledVertices(level(11, 40), clicks('ink', 0, 10), 1, null)).toHaveLength(11);
  });
});
