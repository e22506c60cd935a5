import { describe, expect, it } from 'vitest';
import { PUBLISHED, sharedChecks } from '#tests/support/published-checks.ts';

const shared = sharedChecks();

describe(`published checks (shared list ${shared === null ? 'absent: the copies stand alone' : 'present'})`, () => {
  it('are copied as the shared list has them', () => {
    for (const [id, { source: _source, ...values }] of Object.entries(PUBLISHED)) {
      const known = shared?.find((entry) => entry.id === id)?.expected;
      for (const [name, value] of Object.entries<number>(values)) {
        const listed = known?.[name]?.value ?? value;
        expect(Math.abs(value - listed), `${id} ${name}`).toBeLessThanOrEqual(1e-6 * Math.abs(listed));
      }
    }
  });
});
