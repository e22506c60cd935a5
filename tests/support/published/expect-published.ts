import { expect } from 'vitest';
import type { Runner } from './closed-form-runners.ts';
import { VALUES_LEFT_OUT } from './left-out.ts';
import { allowance, type PublishedCase } from './published-cases.ts';

/**
 * Holds what the engine gives for a case against every value published for it. A value that is neither given nor listed
 * as left out fails. `within` widens the tolerance of a formula's code to what is promised of a solution.
 */
export function expectPublished(
  published: PublishedCase,
  run: Runner,
  within: (name: string, value: number) => number = () => 0,
): void {
  const given = run(published);
  for (const [name, expected] of Object.entries(published.expected)) {
    const about = `${published.id} ${name} (${published.source})`;
    if (`${published.id} ${name}` in VALUES_LEFT_OUT) continue;
    const value = given[name];
    if (value === undefined) throw new Error(`${about} is not worked out, and not listed as left out.`);
    const away = Math.abs(value - expected.value);
    expect(away, `${about}: ${value}`).toBeLessThanOrEqual(
      Math.max(allowance(expected), within(name, expected.value)) * (1 + 1e-9),
    );
  }
}
