import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { documentEntity, flowNetDocument, sheetPoint, UNSAID } from '#shared/contract/document.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';

const waterLevels = (headwater: number) => ({
  kind: 'waterLevels',
  ...UNSAID.waterLevels,
  headwater,
  tailwater: null,
  gammaW: 9.81,
  source: '',
});

describe('figures that no drawing has are refused at the door', () => {
  it('places farther from the sheet than any sheet is long', () => {
    expect(sheetPoint.safeParse([1e6, -1e6]).success).toBe(true);
    for (const place of [
      [1.01e6, 0],
      [0, -1e308],
      [Number.NaN, 0],
      [Number.POSITIVE_INFINITY, 0],
    ]) {
      expect(sheetPoint.safeParse(place).success, String(place)).toBe(false);
    }
  });

  it('levels higher or lower than any ground', () => {
    expect(documentEntity.safeParse(waterLevels(-430.5)).success).toBe(true);
    expect(documentEntity.safeParse(waterLevels(1.1e7)).success).toBe(false);
  });
});

it('the documents that the properties are tried on are such as the schema admits', () => {
  fc.assert(
    fc.property(arbitraryDocument(), (document) => {
      flowNetDocument.parse(document);
    }),
    { numRuns: 100 },
  );
});
