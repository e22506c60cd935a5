import { describe, expect, it } from 'vitest';
import { boxAbout, shapeOf } from '#client/features/desk/components/conflict-picture.tsx';
import { canKeepBoth } from '#client/features/desk/model/conflict-copy.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import { LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine([
  [100, 100],
  [500, 300],
]);
const conflict = (mine: DocumentEntity | null, theirs: DocumentEntity | null) => ({
  entityId: LINE_A,
  mine,
  theirs,
  version: 2,
  changedBy: null,
});

describe('the picture of two versions', () => {
  it('shows nothing of what has no place on the sheet', () => {
    expect(shapeOf(null)).toEqual([]);
  });

  it('holds both shapes with a margin, in its own proportions', () => {
    const [left, top, width, height] = boxAbout([...shapeOf(line), [600, 110]]);
    expect(width / height).toBeCloseTo(2);
    expect([left < 100, top < 100, left + width > 600, top + height > 300]).toEqual([true, true, true, true]);
  });

  it('does not blow up a single place', () => {
    expect(boxAbout([[50, 60]])[3]).toBeGreaterThan(40);
  });
});

describe('keeping both versions', () => {
  it('is offered where both are there', () => {
    expect(canKeepBoth(conflict(line, line))).toBe(true);
    expect(canKeepBoth(conflict(null, line))).toBe(false);
    expect(canKeepBoth(conflict(line, null))).toBe(false);
  });
});
