import { describe, expect, it } from 'vitest';
import { createCrosshairHand } from '#client/features/desk/components/crosshair-hand.ts';
import { createCrosshair } from '#client/features/desk/model/crosshair.ts';
import type { ToolId } from '#client/features/desk/model/tool-choice.ts';
import { createViewStore } from '#client/features/desk/model/view-store.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import { LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';
import { toolHand } from '#tests/support/desk/tool-hand.ts';

const line = tracedLine([
  [100, 100],
  [200, 100],
  [300, 140],
]);

/** A desk of which one pixel is one of the screen, worked by the crosshair alone. */
function keyHand(values: Record<string, DocumentEntity>, tool: ToolId = 'select') {
  const { store, host, points, chosen } = toolHand(values, { tool });
  const views = createViewStore({ widthPx: 600, heightPx: 400 }, [0, 0, 600, 400]);
  views.resize(632, 432);
  const crosshair = createCrosshair();
  const told: Array<SheetPx | null> = [];
  const element = Object.assign(new EventTarget(), { focus() {} }) as unknown as HTMLElement;
  const hand = createCrosshairHand({
    element,
    store,
    views,
    host,
    crosshair,
    hostView: () => ({ zoom: 1, reachPx: 8, balloons: [] }),
    onPointer: (at) => told.push(at),
  });
  const at = (x: number, y: number) => crosshair.setState({ at: sheetPx(x, y), exact: false });
  return { store, hand, crosshair, at, told, points, chosen, element };
}

describe('the hand that works by a crosshair', () => {
  it('draws a line point by point', () => {
    const { store, hand, at } = keyHand({}, 'equipotential');
    at(50, 60);
    hand.click({});
    hand.step(1, 0, 'ten');
    hand.step(0, 1, 'one');
    hand.click({});
    const [drawn] = Object.values(store.getState().document.entities).flatMap(({ value }) =>
      value.kind === 'line' ? [value.points] : [],
    );
    expect(drawn).toEqual([
      [50, 60],
      [60, 61],
    ]);
  });

  it('takes hold of a vertex where it stands, takes it along by the smallest step and lets go', () => {
    const { hand, at, crosshair, points, store, chosen } = keyHand({ [LINE_A]: line });
    store.select({ kind: 'line', ids: [LINE_A] });
    at(203, 98);
    hand.click({});
    expect(crosshair.getState()).toMatchObject({ holds: true, at: [200, 100] });
    hand.step(1, 0, 'tenth');
    hand.click({});
    expect(crosshair.getState().holds).toBe(false);
    expect(points(LINE_A)[1]?.[0]).toBeCloseTo(200.1, 9);
    expect(chosen()).toMatchObject({ ids: [LINE_A], vertex: 1 });
  });

  it('changes nothing where it lets go without having moved, or leaves what it held', () => {
    const { hand, at, points, store, crosshair } = keyHand({ [LINE_A]: line });
    store.select({ kind: 'line', ids: [LINE_A] });
    at(200, 100);
    hand.click({});
    hand.click({});
    hand.click({});
    hand.step(1, 0, 'ten');
    expect(hand.abandon()).toBe(true);
    expect(points(LINE_A)).toEqual(line.points);
    expect(store.getState().preview).toEqual({});
    expect(store.getState().history.undoLabel).toBeNull();
    expect(crosshair.getState().holds).toBe(false);
  });

  it('leaves what it holds when another tool is taken up', () => {
    const { hand, at, store, crosshair, points } = keyHand({ [LINE_A]: line });
    store.select({ kind: 'line', ids: [LINE_A] });
    at(200, 100);
    hand.click({});
    store.setTool('flowLine');
    expect(crosshair.getState().holds).toBe(false);
    hand.step(1, 0, 'ten');
    expect(points(LINE_A)).toEqual(line.points);
  });

  it('frames what is to be chosen from one click with Shift to the next', () => {
    const { hand, at, chosen } = keyHand({ [LINE_A]: line });
    at(60, 60);
    hand.click({ shift: true });
    at(340, 180);
    hand.click({ shift: true });
    expect(chosen().ids).toEqual([LINE_A]);
  });

  it('puts a point into the chosen line, and none where no line is chosen', () => {
    const { hand, at, store, points } = keyHand({ [LINE_A]: line });
    at(150, 100);
    expect(hand.insertVertex()).toBe(false);
    store.select({ kind: 'line', ids: [LINE_A] });
    expect(hand.insertVertex()).toBe(true);
    expect(points(LINE_A)[1]).toEqual([150, 100]);
  });

  it('gives way to a mouse that is moved, not to one that is knocked', () => {
    const { hand, at, element, told } = keyHand({ [LINE_A]: line });
    at(150, 100);
    const move = (clientX: number) =>
      element.dispatchEvent(
        Object.assign(new Event('pointermove'), { clientX, clientY: 0, pointerType: 'mouse' }),
      );
    move(10);
    move(14);
    expect(hand.isShown()).toBe(true);
    move(18);
    expect(hand.isShown()).toBe(false);
    expect(told.at(-1)).toBeNull();
  });

  it('comes up for an intent and goes by the next', () => {
    const { hand, store } = keyHand({});
    store.emitIntent({ type: 'crosshair', wants: 'toggle' });
    expect(hand.isShown()).toBe(true);
    store.emitIntent({ type: 'crosshair', wants: 'place' });
    expect(hand.isShown()).toBe(true);
    store.emitIntent({ type: 'crosshair', wants: 'toggle' });
    expect(hand.isShown()).toBe(false);
  });
});
