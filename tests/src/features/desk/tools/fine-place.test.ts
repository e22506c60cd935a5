import { describe, expect, it } from 'vitest';
import { finelyPlaced, finePlaceOf } from '#client/features/desk/tools/fine-place.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { UNSAID } from '#shared/contract/document.ts';
import { documentWith, LINE_A, POINT_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const document = documentWith({
  [LINE_A]: tracedLine([
    [1, 1],
    [2, 2],
  ]),
  [POINT_A]: {
    kind: 'readingPoint',
    ...UNSAID.readingPoint,
    name: 'P1',
    place: { on: 'section', offset: 1, elevation: 2 },
    order: 1,
  },
});

describe('placing finely', () => {
  it('places nothing when nothing, a whole line or a typed point is chosen', () => {
    expect(finePlaceOf(document, { kind: 'none', ids: [], vertex: null })).toBeNull();
    expect(finePlaceOf(document, { kind: 'line', ids: [LINE_A], vertex: null })).toBeNull();
    expect(finePlaceOf(document, { kind: 'readingPoint', ids: [POINT_A], vertex: null })).toBeNull();
  });

  it('places a vertex to a tenth of a pixel', () => {
    const placed = finelyPlaced(document, { kind: 'line', ids: [LINE_A], vertex: 1 }, sheetPx(2.3456, 1.94));
    expect(placed?.op.value).toMatchObject({
      points: [
        [1, 1],
        [2.3, 1.9],
      ],
    });
  });
});
