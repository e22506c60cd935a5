import { describe, expect, it } from 'vitest';
import { chooseDpi } from '#server/imaging/pdf-dpi.ts';

const INCH = 72;
/** ISO 216: A1 is 594 × 841 mm, A0 841 × 1189 mm. */
const points = (mm: number) => (mm / 25.4) * INCH;

describe('the resolution of a PDF page', () => {
  it('is 300 when no scan is finer', () => {
    expect(chooseDpi(points(841), points(594), null)).toEqual({ dpi: 300, note: '' });
    expect(chooseDpi(points(841), points(594), 150)).toEqual({ dpi: 300, note: '' });
    expect(chooseDpi(points(1189), points(841), null)).toEqual({ dpi: 300, note: '' });
  });

  it('is that of a finer scan, up to 600', () => {
    expect(chooseDpi(8 * INCH, 11 * INCH, 400).dpi).toBe(400);
    expect(chooseDpi(8 * INCH, 11 * INCH, 2400).dpi).toBe(600);
  });

  it('is reduced for a page with too many pixels or too long for a canvas, and says so', () => {
    const large = chooseDpi(200 * INCH, 100 * INCH, null);
    // 140 million pixels on 20,000 square inches.
    expect(large.dpi).toBe(83);
    expect(large.note).toMatch(/^Drawn at 83 dots per inch instead of 300/);
    const long = chooseDpi(200 * INCH, 2 * INCH, null);
    expect(long.dpi).toBe(160);
  });

  it('is what was asked for as far as a scan of that size could be shown', () => {
    // A0 at 600 dpi has 558 million pixels, of the 600 million a scan may have.
    expect(chooseDpi(points(1189), points(841), null, 600)).toEqual({ dpi: 600, note: '' });
    // 600 million pixels on 3,600 square inches.
    expect(chooseDpi(60 * INCH, 60 * INCH, null, 600).dpi).toBe(408);
  });

  it('is never below one, whatever the page', () => {
    expect(chooseDpi(1e9, 1e9, null).dpi).toBe(1);
  });
});
