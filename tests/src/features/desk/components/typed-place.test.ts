import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { PlaceOnSheet } from '#client/features/desk/components/known-point-facts.tsx';
import { extentOf, withTyped } from '#client/features/desk/components/typed-place.ts';

const sheet = { widthPx: 4740, heightPx: 1260, dpi: null };

describe('the typed place of a known point', () => {
  it('changes in the figure typed and in no other', () => {
    expect(withTyped([484.3, 728.1], 0, 485)).toEqual([485, 728.1]);
    expect(withTyped([484.3, 728.1], 1, 727.9)).toEqual([484.3, 727.9]);
  });

  it('lies on the sheet, across and down', () => {
    expect(extentOf(sheet, 0)).toMatchObject({ least: 0, greatest: 4740 });
    expect(extentOf(sheet, 1)).toMatchObject({ least: 0, greatest: 1260 });
    expect(extentOf(sheet, 1).fault).toContain('0 to 1260 px');
  });

  it('is shown to a tenth and typed as it is kept', () => {
    const html = renderToStaticMarkup(
      createElement(PlaceOnSheet, { at: [484.26, 728], sheet, disabled: false, onCommit: () => {} }),
    );
    expect(html).toContain('x 484.3, y 728.0 px');
    expect(html).toMatch(/value="484\.26"/);
    expect(html).toMatch(/value="728"/);
  });
});
