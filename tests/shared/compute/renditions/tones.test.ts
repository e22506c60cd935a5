import { describe, expect, it } from 'vitest';
import { paperToneOf, whitenPaper } from '#shared/compute/renditions/paper-tone.ts';
import { removeSpecks } from '#shared/compute/renditions/specks.ts';
import {
  applyTable,
  brightness,
  endTable,
  levelTable,
  makeGrey,
  type PixelRows,
} from '#shared/compute/renditions/tones.ts';

function picture(widthPx: number, heightPx: number, toneAt: (x: number, y: number) => number): PixelRows {
  const data = Uint8Array.from({ length: widthPx * heightPx }, (_, i) =>
    Math.round(toneAt(i % widthPx, Math.floor(i / widthPx))),
  );
  return { data, widthPx, heightPx, channels: 1 };
}

describe('tones', () => {
  it('are spread between what becomes black and what becomes white', () => {
    const table = levelTable({ black: 50, white: 150 });
    expect([table[0], table[50], table[100], table[150], table[255]]).toEqual([0, 0, 128, 255, 255]);
    expect(levelTable({ black: 0, white: 255 })).toEqual(Uint8Array.from({ length: 256 }, (_, i) => i));
  });

  it('are cut at the threshold and turned about', () => {
    const cut = endTable({ threshold: 100, invert: false });
    expect([cut[99], cut[100]]).toEqual([0, 255]);
    const turned = endTable({ threshold: null, invert: true });
    expect([turned[0], turned[60]]).toEqual([255, 195]);
    expect(endTable({ threshold: 100, invert: true })[99]).toBe(255);
  });

  it('leave opacity alone, and colours become as grey as they are bright', () => {
    const rows: PixelRows = {
      data: new Uint8ClampedArray([200, 100, 50, 255]),
      widthPx: 1,
      heightPx: 1,
      channels: 4,
    };
    applyTable(rows, endTable({ threshold: null, invert: true }));
    expect([...rows.data]).toEqual([55, 155, 205, 255]);
    makeGrey(rows);
    const grey = brightness(55, 155, 205);
    expect([...rows.data]).toEqual([grey, grey, grey, 255]);
    expect(brightness(255, 255, 255)).toBe(255);
  });
});

describe('the paper’s tone', () => {
  const shade = (x: number, y: number) => 240 - 0.2 * x - 0.1 * y;

  it('is told apart from the ink on it, and becomes white where it is bare', () => {
    const isInk = (x: number, y: number) => x % 20 === 0 || y % 25 === 0;
    const rows = picture(480, 320, (x, y) => (isInk(x, y) ? 0.3 : 1) * shade(x, y));
    whitenPaper(rows, paperToneOf(rows), { left: 0, top: 0, widthPx: 480, heightPx: 320 });
    for (let y = 5; y < 315; y += 7)
      for (let x = 5; x < 475; x += 7) {
        const tone = rows.data[y * 480 + x]!;
        // 0.3 of the paper's tone is 76 of 255.
        if (isInk(x, y)) expect(Math.abs(tone - 76)).toBeLessThanOrEqual(4);
        else expect(tone).toBeGreaterThanOrEqual(250);
      }
  });

  it('divides a part of the sheet as it divides the whole', () => {
    const whole = picture(400, 300, shade);
    const paper = paperToneOf(whole);
    const part = picture(100, 80, (x, y) => shade(x + 250, y + 120));
    whitenPaper(part, paper, { left: 250, top: 120, widthPx: 400, heightPx: 300 });
    whitenPaper(whole, paper, { left: 0, top: 0, widthPx: 400, heightPx: 300 });
    for (let y = 0; y < 80; y += 1)
      expect(part.data.subarray(y * 100, y * 100 + 100)).toEqual(
        whole.data.subarray((y + 120) * 400 + 250, (y + 120) * 400 + 350),
      );
  });

  it('of ground that is black all over is taken from the rest of the sheet', () => {
    const rows = picture(480, 480, (x) => (x < 200 ? 20 : 220));
    const { tones } = paperToneOf(rows);
    expect(Math.min(...tones)).toBeGreaterThan(150);
  });
});

describe('specks', () => {
  const tone = 128;

  it('go when they are small enough, and leave the paper about them', () => {
    const rows = picture(40, 40, (x, y) => (x >= 10 && x < 13 && y >= 10 && y < 13 ? 0 : 230));
    removeSpecks(rows, 8, tone);
    expect(rows.data[11 * 40 + 11]).toBe(0);
    removeSpecks(rows, 9, tone);
    expect([...rows.data].every((value) => value === 230)).toBe(true);
  });

  it('are joined over corners: a thin slanting line stays', () => {
    const rows = picture(40, 40, (x, y) => (x === y && y > 5 && y < 35 ? 0 : 255));
    const before = rows.data.slice();
    removeSpecks(rows, 20, tone);
    expect(rows.data).toEqual(before);
  });

  it('that may go on beyond the band are left to it', () => {
    const rows = picture(20, 20, (x, y) => (x === 5 && y < 3 ? 0 : 255));
    removeSpecks(rows, 5, tone);
    expect(rows.data[5]).toBe(0);
  });
});
