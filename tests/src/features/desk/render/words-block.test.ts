import { describe, expect, it } from 'vitest';
import { paintWordsBlock, type WordsLook } from '#client/features/desk/render/words-block.ts';

const LETTER_PX = 7;
const look: WordsLook = {
  font: '14px a',
  linePx: 20,
  paddingPx: [10, 5],
  groundAlpha: 1,
  edged: false,
  gap: '\u2003',
};
const one = 'Offset 12.3 m';
const other = 'Elevation 4.5 m';

type Said = { text: string; x: number; y: number; maxWidth: number | undefined };

/** What is painted into a context whose letters are all of one width. */
function painted(words: readonly string[], roomPx: number, side: 'left' | 'right' = 'left', by = look) {
  const said: Said[] = [];
  const grounds: number[][] = [];
  const context = {
    font: '',
    measureText: (text: string) => ({ width: text.length * LETTER_PX }),
    fillRect: (...box: number[]) => grounds.push(box),
    fillText: (text: string, x: number, y: number, maxWidth?: number) => said.push({ text, x, y, maxWidth }),
  } as unknown as CanvasRenderingContext2D;
  paintWordsBlock(context, words, { x: side === 'left' ? 0 : roomPx, y: 0, side, roomPx }, by);
  return { said, ground: grounds[0] };
}

describe('a block of words', () => {
  it('stands in one row where there is room for it, else in one for each', () => {
    const oneRowPx = (one.length + 1 + other.length) * LETTER_PX + 20;
    expect(painted([one, other], oneRowPx).said.map(({ text }) => text)).toEqual([`${one}\u2003${other}`]);
    expect(painted([one, other], oneRowPx - 1).said.map(({ text }) => text)).toEqual([one, other]);
    const apart = { ...look, gap: null };
    expect(painted([one, other], 10_000, 'left', apart).said).toHaveLength(2);
  });

  it('has a ground about all of its words, which ends where it is told to', () => {
    const width = other.length * LETTER_PX + 20;
    expect(painted([one, other], width).ground).toEqual([0, 0, width, 50]);
    const right = painted([one, other], 150, 'right');
    expect(right.ground).toEqual([150 - width, 0, width, 50]);
    expect(right.said.every(({ x }) => x === 150 - width + 10)).toBe(true);
  });

  it('sets words that are too long for the room closer, instead of cutting them off', () => {
    const { said, ground } = painted([one, other], 80);
    expect(ground).toEqual([0, 0, 80, 50]);
    expect(said.map(({ maxWidth }) => maxWidth)).toEqual([60, 60]);
  });

  it('paints nothing where there is nothing to say', () => {
    expect(painted([], 100)).toEqual({ said: [], ground: undefined });
  });
});
