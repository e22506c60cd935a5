import { describe, expect, it } from 'vitest';
import { headwaterQuestion } from '#client/features/desk/components/headwater-question.ts';

const SI = { unitSystem: 'SI', datum: 'LD' } as const;
const US = { unitSystem: 'US', datum: 'NAVD' } as const;
const levels = (headwater: number | null, tailwater: number | null = null) => ({ headwater, tailwater });

describe('a headwater beside the full supply level of the dam', () => {
  it('is questioned more than 5 m above it', () => {
    expect(headwaterQuestion(levels(123.01), 118, SI)).toBe(
      'The headwater lies more than 5 m above the full supply level of the dam, 118.00 m LD. Check the figure.',
    );
    expect(headwaterQuestion(levels(123), 118, SI)).toBeNull();
  });

  it('is questioned more than 16 ft above it', () => {
    expect(headwaterQuestion(levels(416.5), 400, US)).toMatch(
      /more than 16 ft above the full supply level of the dam, 400\.00 ft NAVD\./,
    );
    expect(headwaterQuestion(levels(416), 400, US)).toBeNull();
  });

  it('is not questioned below it, without it or before it is typed', () => {
    expect(headwaterQuestion(levels(90), 118, SI)).toBeNull();
    expect(headwaterQuestion(levels(1180), null, SI)).toBeNull();
    expect(headwaterQuestion(levels(null, 101), 118, SI)).toBeNull();
  });

  it('is questioned below the tailwater before anything else', () => {
    expect(headwaterQuestion(levels(124, 125), 118, SI)).toMatch(/below the tailwater/);
  });
});
