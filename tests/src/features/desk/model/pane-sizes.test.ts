import { describe, expect, it } from 'vitest';
import {
  draggedPane,
  foldedPane,
  panePx,
  parsePanes,
  resizedPane,
  USUAL_PANES,
  usualPane,
} from '#client/features/desk/model/pane-sizes.ts';

const desktop = { widthPx: 1440, heightPx: 900 };
const small = { widthPx: 900, heightPx: 600 };

describe('the panes about the sheet', () => {
  it('have their usual sizes where nothing was kept, or nothing that can be read', () => {
    for (const kept of [null, '', '{', '{"tools":3}', '{"tools":{"px":-1,"folded":false}}']) {
      expect(parsePanes(kept)).toEqual(USUAL_PANES);
    }
    expect(panePx('margin', desktop, USUAL_PANES)).toBe(372);
    expect(panePx('figures', { widthPx: 820, heightPx: 1180 }, USUAL_PANES)).toBe(344);
  });

  it('come back as they were left', () => {
    const left = foldedPane(resizedPane(USUAL_PANES, 'figures', 400, desktop), 'margin', true);
    expect(parsePanes(JSON.stringify(left))).toEqual(left);
  });

  it('leave room for the sheet, also in a smaller window than they were sized in', () => {
    const wide = resizedPane(USUAL_PANES, 'margin', 5000, desktop);
    expect(panePx('margin', desktop, wide)).toBe(1440 - 320 - 188);
    expect(panePx('margin', small, wide)).toBe(900 - 320 - 168);
    expect(panePx('figures', small, resizedPane(USUAL_PANES, 'figures', 5000, desktop))).toBe(600 - 47 - 160);
  });

  it('fold when dragged nearly away, take no place then, and come back in their size', () => {
    const sized = resizedPane(USUAL_PANES, 'figures', 300, desktop);
    const folded = draggedPane(sized, 'figures', 10, desktop);
    expect(panePx('figures', desktop, folded)).toBe(0);
    expect(panePx('figures', desktop, foldedPane(folded, 'figures', false))).toBe(300);
    expect(panePx('figures', desktop, usualPane(folded, 'figures'))).toBe(232);
  });
});
