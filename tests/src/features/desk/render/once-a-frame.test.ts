import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { onceAFrame } from '#client/features/desk/render/once-a-frame.ts';

let asked: (() => void)[] = [];
/** The browser shows a frame. */
const nextFrame = () => {
  const now = asked;
  asked = [];
  for (const run of now) run();
};

beforeEach(() => vi.stubGlobal('requestAnimationFrame', (run: () => void) => asked.push(run)));
afterEach(() => {
  while (asked.length > 0) nextFrame();
  vi.unstubAllGlobals();
});

describe('work for a frame', () => {
  it('is done once, however often it fell due, and asks for no frame of its own', () => {
    const done: string[] = [];
    const paint = onceAFrame(() => done.push('painted'));
    const scene = onceAFrame(() => {
      done.push('made up');
      paint.due();
    }, 'scene');
    scene.due();
    scene.due();
    expect(asked).toHaveLength(1);
    nextFrame();
    expect(done).toEqual(['made up', 'painted']);
    expect(asked).toHaveLength(0);
  });

  it('takes turns with what else explains the pointer, and none of it is left undone', () => {
    const done: string[] = [];
    const magnified = onceAFrame(() => done.push('magnified'), 'magnified');
    const told = onceAFrame(() => done.push('told'), 'told');
    for (let frame = 0; frame < 4; frame += 1) {
      magnified.due();
      told.due();
      nextFrame();
      expect(done).toHaveLength(frame + 1);
    }
    expect(done.filter((each) => each === 'told')).toHaveLength(2);
    // The pointer rests: what was due last is done still.
    nextFrame();
    expect(done).toHaveLength(5);
    expect(new Set(done.slice(-2)).size).toBe(2);
    expect(asked).toHaveLength(0);
  });

  it('waits for no turn when it is the only one', () => {
    const done: number[] = [];
    const told = onceAFrame(() => done.push(done.length), 'told');
    for (let frame = 0; frame < 3; frame += 1) {
      told.due();
      nextFrame();
    }
    expect(done).toHaveLength(3);
  });

  it('is not done once it has ended', () => {
    const done: string[] = [];
    const work = onceAFrame(() => done.push('done'));
    work.due();
    work.end();
    nextFrame();
    expect(done).toEqual([]);
  });

  it('is done although other work fails, which is told', () => {
    const told = vi.fn();
    vi.stubGlobal('reportError', told);
    const done: string[] = [];
    onceAFrame(() => {
      throw new Error('a fault');
    }).due();
    onceAFrame(() => done.push('done')).due();
    nextFrame();
    expect(done).toEqual(['done']);
    expect(told).toHaveBeenCalledOnce();
  });
});
