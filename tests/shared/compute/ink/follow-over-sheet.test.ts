import { describe, expect, it } from 'vitest';
import { INK_LOOKS, inkScan } from '#server/bench/ink-scan.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import {
  createInkFollower,
  frameAbout,
  type InkSheet,
  type LevelFrame,
} from '#shared/compute/ink/follow-over-sheet.ts';
import type { InkWindow } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [number, number];

/** A sheet of one scan, halved by the mean of four pixels as its tiles are; counts the windows asked for. */
function sheetOf(full: InkWindow, halvings: number): InkSheet & { asked: string[] } {
  const levels = [full];
  for (let level = 1; level <= halvings; level += 1) levels.push(halved(levels[level - 1]!));
  const asked: string[] = [];
  return {
    widthPx: full.width,
    heightPx: full.height,
    halvings,
    asked,
    async window(level, frame) {
      asked.push(`${level} ${frame.join(' ')}`);
      return cut(levels[level]!, frame);
    },
  };
}

function halved({ width, height, grey }: InkWindow): InkWindow {
  const [w, h] = [Math.ceil(width / 2), Math.ceil(height / 2)];
  const half = new Uint8Array(w * h);
  for (let y = 0; y < h; y += 1) {
    for (let x = 0; x < w; x += 1) {
      const at = (i: number, j: number) =>
        grey[Math.min(height - 1, 2 * y + j) * width + Math.min(width - 1, 2 * x + i)]!;
      half[y * w + x] = (at(0, 0) + at(1, 0) + at(0, 1) + at(1, 1)) / 4;
    }
  }
  return { width: w, height: h, grey: half };
}

function cut({ width, grey }: InkWindow, [left, top, w, h]: LevelFrame): InkWindow {
  const part = new Uint8Array(w * h);
  for (let y = 0; y < h; y += 1) {
    part.set(grey.subarray((top + y) * width + left, (top + y) * width + left + w), y * w);
  }
  return { width: w, height: h, grey: part };
}

/** One wide arc of 2 px over toned paper, with gaps, on a sheet of 3,000 by 900 px. */
function wideArc(): { window: InkWindow; middle: Place[] } {
  const [width, height] = [3000, 900];
  const grey = new Uint8Array(width * height).fill(225);
  const middle = Array.from({ length: 5401 }, (_, i): Place => {
    const x = 150 + i / 2;
    return [x, 800 - 600 * Math.sin((Math.PI * (x - 150)) / 2700)];
  });
  middle.forEach(([x, y], i) => {
    if (i % 300 < 24) return;
    for (let v = Math.floor(y) - 2; v <= Math.floor(y) + 2; v += 1) {
      for (let u = Math.floor(x) - 2; u <= Math.floor(x) + 2; u += 1) {
        const covered = Math.min(1, Math.max(0, 1.5 - Math.hypot(u + 0.5 - x, v + 0.5 - y)));
        const at = v * width + u;
        grey[at] = Math.min(grey[at]!, 225 - 150 * covered);
      }
    }
  });
  return { window: { width, height, grey }, middle };
}

function strays(line: readonly Place[], middle: readonly Place[]): number[] {
  return middle
    .filter((_, i) => i % 8 === 0)
    .map((place) =>
      Math.min(...line.slice(1).map((end, i) => distanceToSegment([...place], [...line[i]!], [...end]))),
    )
    .sort((a, b) => a - b);
}

describe('following the ink over a sheet', () => {
  it('tells that no line is found over bare paper, and gives the straight join', async () => {
    const sheet = sheetOf({ width: 600, height: 400, grey: new Uint8Array(240_000).fill(230) }, 2);
    const answer = await createInkFollower(sheet).follow({
      from: [50, 60],
      to: [500, 300],
      grip: 4,
      fine: true,
    });
    expect(answer).toEqual({
      found: false,
      fine: true,
      points: [
        [50, 60],
        [500, 300],
      ],
    });
  });

  it('works at full size where the window is small, and asks once for a window that is wanted again', async () => {
    const { window, middle } = inkScan({ ...INK_LOOKS.toned!, seed: 2 });
    const sheet = sheetOf(window, 2);
    const { follow } = createInkFollower(sheet);
    const [from, to] = [middle[200]!, middle[700]!];
    const answer = await follow({ from, to, grip: 4, fine: false });
    await follow({ from, to: middle[702]!, grip: 4, fine: true });
    expect(sheet.asked).toHaveLength(1);
    expect(sheet.asked[0]).toMatch(/^0 /);
    expect(answer.found).toBe(true);
    const off = strays(answer.points, middle.slice(210, 690));
    expect(off[Math.floor(0.95 * off.length)]).toBeLessThan(1.5);
  });

  it('finds a long line in a smaller level, then again at full size', async () => {
    const { window, middle } = wideArc();
    const sheet = sheetOf(window, 3);
    const question = { from: middle[40]!, to: middle[5360]!, grip: 8 } as const;
    const follower = createInkFollower(sheet);
    const look = await follower.follow({ ...question, fine: false });
    expect(sheet.asked.every((asked) => !asked.startsWith('0 '))).toBe(true);
    expect(look.fine).toBe(false);
    expect(strays(look.points, middle.slice(60, 5340)).at(-1)).toBeLessThan(12);
    const answer = await follower.follow({ ...question, fine: true });
    expect(answer.fine).toBe(true);
    const off = strays(answer.points, middle.slice(60, 5340));
    expect(off[Math.floor(0.95 * off.length)]).toBeLessThan(0.8);
    expect(off.at(-1)).toBeLessThan(2.5);
    // None of the windows at full size holds the whole line.
    for (const asked of sheet.asked.filter((each) => each.startsWith('0 '))) {
      expect(Number(asked.split(' ')[3])).toBeLessThan(1000);
    }
  });

  it('works in a smaller level while the finer one is not there yet', async () => {
    const { window, middle } = inkScan({ ...INK_LOOKS.clean!, seed: 1 });
    const sheet = sheetOf(window, 2);
    const { follow } = createInkFollower({
      ...sheet,
      window: async (level, frame) => {
        if (level === 0) throw new Error('The tile answered 404.');
        return sheet.window(level, frame);
      },
    });
    const answer = await follow({ from: middle[100]!, to: middle[900]!, grip: 4, fine: true });
    expect(answer.found).toBe(true);
    const off = strays(answer.points, middle.slice(110, 890));
    expect(off[Math.floor(0.95 * off.length)]).toBeLessThan(2.5);
  });

  it('asks again for a window that could not be fetched', async () => {
    const { window, middle } = inkScan({ ...INK_LOOKS.clean!, seed: 1 });
    const sheet = sheetOf(window, 1);
    let broken = true;
    const { follow } = createInkFollower({
      ...sheet,
      window: async (level, frame) => {
        if (broken) throw new Error('The tile answered 503.');
        return sheet.window(level, frame);
      },
    });
    const question = { from: middle[100]!, to: middle[500]!, grip: 4, fine: true };
    await expect(follow(question)).rejects.toThrow('503');
    broken = false;
    expect((await follow(question)).found).toBe(true);
  });

  it('keeps its windows on the sheet', () => {
    const sheet = { widthPx: 1000, heightPx: 700 };
    expect(
      frameAbout(
        sheet,
        0,
        [
          [-50, -20],
          [990, 690],
        ],
        48,
      ),
    ).toEqual([0, 0, 1000, 700]);
    expect(frameAbout(sheet, 1, [[5000, 5000]], 48)).toEqual([499, 349, 1, 1]);
  });
});
