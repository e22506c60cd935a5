import { describe, expect, it } from 'vitest';
import {
  exponentText,
  fixedText,
  plainText,
  plusMinusText,
  powerParts,
  signedText,
} from '#shared/text/number-text.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

describe('numbers as text', () => {
  it('have a proper minus sign, fixed decimals and ungrouped thousands', () => {
    expect(fixedText(-24, 1)).toBe('−24.0');
    expect(fixedText(250_000.126, 2)).toBe('250000.13');
    expect(fixedText(null, 2)).toBe('–');
    expect(fixedText(Number.NaN, 2)).toBe('–');
  });

  it('have no sign when they round to nothing', () => {
    expect(fixedText(-0.004, 2)).toBe('0.00');
    expect(signedText(0.004, 2)).toBe('0.00');
    expect(signedText(11, 1)).toBe('+11.0');
  });

  it('pair with their ±', () => {
    expect(plusMinusText(114.841, 0.14, 2)).toBe('114.84 ± 0.14');
    expect(plusMinusText(114.841, null, 2)).toBe('114.84');
    expect(plusMinusText(null, 0.1, 2)).toBe('–');
  });

  it('part into mantissa and power of ten', () => {
    expect(powerParts(1.24e-6, 2)).toEqual({ mantissa: '1.2', exponent: -6 });
    expect(powerParts(-2e-7, 1)).toEqual({ mantissa: '−2', exponent: -7 });
    expect(powerParts(9.96e-6, 2)).toEqual({ mantissa: '1.0', exponent: -5 });
    expect(powerParts(0, 2)).toEqual({ mantissa: '0.0', exponent: 0 });
    expect(powerParts(null, 2)).toBeNull();
    expect(exponentText(-6)).toBe('−6');
  });

  it('are plain where they are counts', () => {
    expect(plainText(10)).toBe('10');
    expect(plainText(4.25)).toBe('4.25');
  });
});

describe('units as text', () => {
  it('follow the unit system and name the datum', () => {
    expect(unitNames('US').pressure).toBe('lb/ft²');
    expect(elevationUnit('SI', 'LD')).toBe('m LD');
    expect(elevationUnit('US', '')).toBe('ft');
  });
});

describe('the decimal mark', () => {
  it('is the point unless another one is asked for', () => {
    expect(fixedText(118.25, 2)).toBe('118.25');
    expect(fixedText(118.25, 2, ',')).toBe('118,25');
    expect(plusMinusText(-1.5, 0.25, 2, ',')).toBe('−1,50 ± 0,25');
    expect(powerParts(-2.5e-7, 2, ',')).toEqual({ mantissa: '−2,5', exponent: -7 });
    expect(plainText(10, 3, ',')).toBe('10');
  });

  it('keeps the sign of a value that rounds to zero away', () => {
    expect(fixedText(-0.001, 2, ',')).toBe('0,00');
    expect(signedText(0.001, 2, ',')).toBe('0,00');
  });
});
