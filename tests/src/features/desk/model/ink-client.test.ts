import { describe, expect, it } from 'vitest';
import { createInkClient } from '#client/features/desk/model/ink-client.ts';
import type { InkAnswer, InkQuestion } from '#client/features/desk/model/ink-worker.ts';
import { sheetPx } from '#shared/compute/frames.ts';

const SHEET = {
  id: 's',
  widthPx: 1000,
  heightPx: 700,
  tiles: { rendition: 'base', tileSizePx: 512, maxZoom: 1, format: 'webp' },
} as const;
const reach = (x: number) => ({ from: sheetPx(0, 0), to: sheetPx(x, 0), grip: 4 });
const settled = () => new Promise((resolve) => setTimeout(resolve));

/** A worker that answers when told to. */
function stand() {
  const asked: InkQuestion[] = [];
  let ended = 0;
  const worker = {
    onmessage: null as ((event: MessageEvent<InkAnswer>) => void) | null,
    onerror: null as ((event: ErrorEvent) => void) | null,
    postMessage: (question: InkQuestion) => void asked.push(question),
    terminate: () => {
      ended += 1;
    },
  };
  return {
    asked,
    worker,
    ended: () => ended,
    async answer(i: number, fine = true) {
      const { number, from, to } = asked[i]!;
      worker.onmessage?.({
        data: { number, path: { points: [from, to], found: true, fine } },
      } as MessageEvent);
      await settled();
    },
    async fail() {
      worker.onerror?.({ preventDefault() {} } as ErrorEvent);
      await settled();
    },
  };
}

describe('asking where the ink runs', () => {
  it('starts nothing before the first question', () => {
    let started = 0;
    const desk = stand();
    createInkClient(SHEET, () => {
      started += 1;
      return desk.worker;
    }).close();
    expect(started).toBe(0);
  });

  it('looks for one place at a time and then only for the newest', async () => {
    const desk = stand();
    const client = createInkClient(SHEET, () => desk.worker);
    for (const x of [10, 20, 30, 40]) client.look(reach(x));
    expect(desk.asked.map(({ to }) => to[0])).toEqual([10]);
    await desk.answer(0);
    expect(client.newest()?.to[0]).toBe(10);
    expect(desk.asked.map(({ to }) => to[0])).toEqual([10, 40]);
    await desk.answer(1);
    expect(client.newest()?.to[0]).toBe(40);
    expect(desk.asked.every(({ fine }) => !fine)).toBe(true);
  });

  it('asks for a clicked line at once, finely', async () => {
    const desk = stand();
    const client = createInkClient(SHEET, () => desk.worker);
    client.look(reach(10));
    const line = client.follow(reach(50));
    expect(desk.asked.map(({ fine }) => fine)).toEqual([false, true]);
    await desk.answer(1);
    expect((await line)?.points).toHaveLength(2);
  });

  it('takes what was shown for a click where that was found at full size, and asks where it was not', async () => {
    const desk = stand();
    const client = createInkClient(SHEET, () => desk.worker);
    client.look(reach(10));
    await desk.answer(0, true);
    expect(await client.follow(reach(10))).toBe(client.newest()!.path);
    expect(desk.asked).toHaveLength(1);
    client.look(reach(900));
    await desk.answer(1, false);
    void client.follow(reach(900));
    void client.follow(reach(20));
    expect(desk.asked).toHaveLength(4);
  });

  it('answers nothing when the worker fails, and starts another for the next question', async () => {
    const desk = stand();
    const client = createInkClient(SHEET, () => desk.worker);
    const line = client.follow(reach(50));
    await desk.fail();
    expect(await line).toBeNull();
    const again = client.follow(reach(60));
    await desk.answer(1);
    expect(await again).not.toBeNull();
    client.close();
    expect(desk.ended()).toBe(2);
  });
});
