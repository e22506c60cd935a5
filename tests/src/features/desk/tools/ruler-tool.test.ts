import { describe, expect, it } from 'vitest';
import { rulerCopy } from '#client/features/desk/components/ruler-words.ts';
import { rulerOf } from '#client/features/desk/model/ruler.ts';
import { rulerFigures } from '#shared/compute/ruler.ts';
import { toolHand } from '#tests/support/desk/tool-hand.ts';

describe('the ruler in hand', () => {
  it('measures leg by leg, ends by Enter and begins anew', () => {
    const hand = toolHand({}, { tool: 'ruler' });
    const places = () => rulerOf(hand.store).getState().places;
    hand.click(100, 100);
    hand.click(200, 100);
    expect(hand.overlay(200, 300).rubber).toEqual([
      [200, 100],
      [200, 300],
    ]);
    hand.click(200, 200);
    hand.key('finish');
    expect(rulerOf(hand.store).getState()).toMatchObject({ done: true, closed: false });
    expect(hand.overlay(200, 300).rubber).toBeNull();
    hand.click(500, 500);
    expect(places()).toEqual([[500, 500]]);
  });

  it('closes the shape on its first place, and opens it again by Backspace', () => {
    const hand = toolHand({}, { tool: 'ruler' });
    for (const [x, y] of [
      [100, 100],
      [200, 100],
      [200, 200],
      [103, 102],
    ] as const)
      hand.click(x, y);
    expect(rulerOf(hand.store).getState()).toMatchObject({ closed: true, done: true });
    expect(rulerOf(hand.store).getState().places).toHaveLength(3);
    hand.key('takeBack');
    expect(rulerOf(hand.store).getState()).toMatchObject({ closed: false });
  });

  it('is cleared by Escape, laid down by the next, and never touches the document', () => {
    const hand = toolHand({}, { tool: 'ruler', readOnly: false });
    hand.click(100, 100);
    hand.click(200, 100);
    hand.key('cancel');
    expect(rulerOf(hand.store).getState().places).toEqual([]);
    expect(hand.store.getState().tool).toBe('ruler');
    hand.key('cancel');
    expect(hand.store.getState().tool).toBe('select');
    expect(hand.labels).toEqual([]);
  });

  it('measures a net that may only be looked at', () => {
    const hand = toolHand({}, { tool: 'ruler', readOnly: true });
    expect(hand.store.getState().tool).toBe('ruler');
    hand.click(100, 100);
    expect(rulerOf(hand.store).getState().places).toHaveLength(1);
  });

  it('keeps level with Shift', () => {
    const hand = toolHand({}, { tool: 'ruler' });
    hand.click(100, 100);
    hand.click(200, 108, { shift: true });
    expect(rulerOf(hand.store).getState().places[1]![1]).toBe(100);
  });

  it('is copied as a table', () => {
    const figures = rulerFigures(
      [
        [0, 0],
        [30, 40],
      ],
      false,
      null,
    );
    expect(rulerCopy(figures, 1, 'm')).toBe(
      'Leg\tpx\tSlope\tAngle, °\tCorner, °\n1\t50.0\t1 : 0.75\t53.1\t\nWhole\t50.0',
    );
  });
});
