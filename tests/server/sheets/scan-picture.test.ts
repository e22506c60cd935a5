import { describe, expect, it } from 'vitest';
import { zoomFor } from '#server/sheets/scan-picture.ts';

describe('the level of tiles under the printed section', () => {
  it('is the coarsest that has as many pixels as are printed', () => {
    // 8000 px at full size: 4000, 2000, 1000 at the levels below.
    expect(zoomFor(5, 8000, 4000)).toBe(4);
    expect(zoomFor(5, 8000, 4001)).toBe(5);
    expect(zoomFor(5, 8000, 1000)).toBe(2);
    expect(zoomFor(5, 8000, 1)).toBe(0);
  });

  it('is the full size where no level has enough', () => {
    expect(zoomFor(3, 500, 4000)).toBe(3);
    expect(zoomFor(0, 500, 100)).toBe(0);
  });
});
