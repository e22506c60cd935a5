import { spawn } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { median, percentile, repeated, rowOf } from '#server/bench/bench.ts';
import { peakOfTree } from '#server/bench/process-tree.ts';
import { tableOf } from '#server/bench/table.ts';
import { mainThreadFrames, mainThreadOf, type TraceEvent } from '#server/bench/trace-frames.ts';

describe('percentiles', () => {
  it('are refused without values', () => {
    expect(() => median([])).toThrow(RangeError);
  });

  it('lie between the neighbouring values, in whatever order they came', () => {
    // Linear between order statistics (Hyndman and Fan 1996, definition 7): by hand.
    expect(median([3, 1, 2])).toBe(2);
    expect(median([4, 1, 3, 2])).toBe(2.5);
    expect(percentile([10, 20, 30, 40, 50], 0.95)).toBeCloseTo(48, 12);
    expect(percentile([7], 0.95)).toBe(7);
  });
});

describe('a row', () => {
  it('has the medians of both sides and their ratio', () => {
    expect(rowOf('x', 's', [3, 1, 2], [4, 4, 5])).toEqual({
      name: 'x',
      value: 2,
      unit: 's',
      reference: 4,
      ratio: 0.5,
      samples: 3,
    });
  });

  it('says so when there is no reference', () => {
    const row = rowOf('x', 's', [1], null);
    expect([row.reference, row.ratio]).toEqual([null, null]);
    expect(tableOf([row])).toMatch(/x\s+1 {2}s\s+none\s+none\s+1$/);
  });
});

it('a repeated measurement throws its first run away', async () => {
  let runs = 0;
  expect(await repeated(3, async () => ++runs)).toEqual([2, 3, 4]);
});

it("a frame's main-thread time is that of the tasks until the next frame, on the thread that drew most", () => {
  const thread = (tid: number) => ({ pid: 1, tid });
  const named = (tid: number): TraceEvent => ({
    ...thread(tid),
    name: 'thread_name',
    ph: 'M',
    ts: 0,
    args: { name: 'CrRendererMain' },
  });
  const frame = (tid: number, ts: number): TraceEvent => ({
    ...thread(tid),
    name: 'AnimationFrame',
    ph: 'b',
    ts,
  });
  const task = (tid: number, ts: number, dur: number): TraceEvent => ({
    ...thread(tid),
    name: 'ThreadControllerImpl::RunTask',
    ph: 'X',
    ts,
    dur,
  });
  const events = [named(1), named(2), frame(2, 0), frame(1, 0), frame(1, 16_000), frame(1, 32_000)];
  const tasks = [task(1, 100, 3000), task(1, 9000, 2000), task(1, 17_000, 500), task(2, 100, 9000)];
  expect(mainThreadFrames([...events, ...tasks])).toEqual([5, 0.5]);
  expect(mainThreadOf([...events, ...tasks])).toEqual({ work: [5, 0.5], every: [16, 16], longestTask: 3 });
});

it('the peak of memory includes what a child took and gave back', async () => {
  const idle = await peakOfTree(process.pid, async () => {});
  const { bytes } = await peakOfTree(process.pid, async () => {
    const child = spawn(process.execPath, [
      '-e',
      'const b = Buffer.alloc(200e6, 1); setTimeout(() => b, 600)',
    ]);
    await new Promise((resolve) => child.on('exit', resolve));
  });
  // 200 MB were taken; the runner's own memory may shrink meanwhile.
  expect(bytes - idle.bytes).toBeGreaterThan(150e6);
});
