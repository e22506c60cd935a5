import { describe, expect, it } from 'vitest';
import { besidePlace } from '#client/features/desk/components/beside-place.ts';

const view = { widthPx: 900, heightPx: 600 };
const mostly = { widthPx: 320, heightPx: 90 };

describe('words beside the pointer', () => {
  it('stand to its right and below while there is room', () => {
    expect(besidePlace(view, [100, 100], mostly, 40)).toEqual({ x: 118, y: 118, side: 'left' });
  });

  it('stand to its left, ending there, at the right edge, and above it at the foot', () => {
    expect(besidePlace(view, [800, 560], mostly, 40)).toEqual({ x: 782, y: 502, side: 'right' });
  });

  it('keep their side however long they are at the moment', () => {
    const sides = [20, 40, 60, 90].map((height) => besidePlace(view, [570, 480], mostly, height));
    expect(new Set(sides.map(({ side }) => side)).size).toBe(1);
    expect(new Set(sides.map(({ x }) => x)).size).toBe(1);
  });

  it('stay in a view that has no room on either side', () => {
    const narrow = { widthPx: 390, heightPx: 600 };
    for (const x of [0, 100, 200, 300, 389]) {
      const place = besidePlace(narrow, [x, 300], mostly, 40);
      const left = place.side === 'left' ? place.x : place.x - mostly.widthPx;
      expect(left).toBeGreaterThanOrEqual(0);
      expect(left + mostly.widthPx).toBeLessThanOrEqual(narrow.widthPx);
    }
  });

  it('never leave the view at its head', () => {
    expect(besidePlace({ widthPx: 900, heightPx: 60 }, [10, 50], mostly, 90).y).toBe(4);
  });
});
