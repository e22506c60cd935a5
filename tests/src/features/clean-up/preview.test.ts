import { describe, expect, it } from 'vitest';
import { previewOf, smallSheetOf } from '#client/features/clean-up/model/preview.ts';
import { projectiveInverse, throughPlane } from '#shared/compute/plane-map.ts';
import { renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import { AS_SCANNED, type RenditionSettings } from '#shared/contract/renditions.ts';

const base = { widthPx: 2000, heightPx: 1400 };
const SMALL = 0.25;
/** A dark square of 20 px in the small picture, of which the middle is known on the sheet. */
const MARK = [600, 400] as const;

function small() {
  const [widthPx, heightPx] = [base.widthPx * SMALL, base.heightPx * SMALL];
  const data = new Uint8ClampedArray(widthPx * heightPx * 4).fill(255);
  for (let y = 0; y < heightPx; y += 1)
    for (let x = 0; x < widthPx; x += 1) {
      const isMark = Math.abs(x + 0.5 - MARK[0] * SMALL) <= 10 && Math.abs(y + 0.5 - MARK[1] * SMALL) <= 10;
      data.fill(isMark ? 30 : 200, (y * widthPx + x) * 4, (y * widthPx + x) * 4 + 3);
    }
  return smallSheetOf({ data, widthPx, heightPx, channels: 4 }, base);
}

describe('the preview', () => {
  it('is none for settings that leave no picture', () => {
    expect(previewOf(small(), { ...AS_SCANNED, crop: [3000, 0, 10, 10] })).toBeNull();
  });

  it.each<[string, Partial<RenditionSettings>]>([
    ['as it is', {}],
    ['turned', { turnDeg: 12.5 }],
    [
      'rectified and cropped',
      {
        corners: [
          [100, 60],
          [1900, 120],
          [1950, 1350],
          [40, 1300],
        ],
        crop: [100, 80, 1500, 1000],
      },
    ],
  ])('has a mark where the full-size picture will have it: %s', (_, change) => {
    const settings = { ...AS_SCANNED, ...change, threshold: 100 };
    const { rows, full } = previewOf(small(), settings)!;
    const geometry = renditionGeometry(base, settings)!;
    expect(full).toEqual({ widthPx: geometry.widthPx, heightPx: geometry.heightPx });
    const [x, y] = throughPlane(projectiveInverse(geometry.toBase), ...MARK);
    let [sumX, sumY, count] = [0, 0, 0];
    for (let at = 0; at < rows.data.length; at += 4)
      if (rows.data[at] === 0) {
        sumX += ((at / 4) % rows.widthPx) + 0.5;
        sumY += Math.floor(at / 4 / rows.widthPx) + 0.5;
        count += 1;
      }
    const scale = rows.widthPx / full.widthPx;
    // To a pixel of the small picture, which is four of the sheet.
    expect(Math.abs(sumX / count / scale - x)).toBeLessThan(4);
    expect(Math.abs(sumY / count / scale - y)).toBeLessThan(4);
  });

  it('whitens the paper and leaves opacity alone', () => {
    const { rows } = previewOf(small(), { ...AS_SCANNED, whitenPaper: true })!;
    expect([...rows.data.subarray(0, 4)]).toEqual([255, 255, 255, 255]);
  });
});
