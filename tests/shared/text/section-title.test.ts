import { describe, expect, it } from 'vitest';
import { sectionLabel } from '#shared/text/section-title.ts';

describe('the name of a section', () => {
  it.each([
    ['B–B', '212', 'Section B–B, chainage 212'],
    ['A', '', 'Section A'],
    ['C-C', '0+305', 'Section C-C, chainage 0+305'],
    ['Spillway axis', 'axis', 'Spillway axis'],
    ['Section B–B', '212', 'Section B–B, chainage 212'],
  ])('%j at %j is %j', (name, chainage, label) => {
    expect(sectionLabel({ name, chainage })).toBe(label);
  });
});
