import { describe, expect, it } from 'vitest';
import { CLOSED_FORM_RUNNERS } from '#tests/support/published/closed-form-runners.ts';
import { expectPublished } from '#tests/support/published/expect-published.ts';
import { LEFT_OUT, VALUES_LEFT_OUT } from '#tests/support/published/left-out.ts';
import { listedCases, PUBLISHED_CASES, publishedCase } from '#tests/support/published/published-cases.ts';
import { SOLVED_RUNNERS } from '#tests/support/published/solved-runners.ts';
import { PUBLISHED, sharedChecks } from '#tests/support/published-checks.ts';

const shared = sharedChecks();
const listed = listedCases();
const runs = { ...CLOSED_FORM_RUNNERS, ...SOLVED_RUNNERS };

describe(`published checks (shared list ${shared === null ? 'absent: the copies stand alone' : 'present'})`, () => {
  it('are copied as the shared list has them', () => {
    for (const [id, { source: _source, ...values }] of Object.entries(PUBLISHED)) {
      const known = shared?.find((entry) => entry.id === id)?.expected;
      for (const [name, value] of Object.entries<number>(values)) {
        const asListed = known?.[name]?.value ?? value;
        expect(Math.abs(value - asListed), `${id} ${name}`).toBeLessThanOrEqual(1e-6 * Math.abs(asListed));
      }
    }
  });

  it.skipIf(listed === null)('are all in the copy, with their values and tolerances', () => {
    expect(PUBLISHED_CASES.map(({ id }) => id)).toEqual(listed!.map(({ id }) => id));
    for (const { id, expected } of listed!) {
      const wanted = Object.entries(expected).map(([name, { value, tol_rel, tol_abs }]) => [
        name,
        {
          value,
          ...(tol_rel === undefined ? {} : { rel: tol_rel }),
          ...(tol_abs === undefined ? {} : { abs: tol_abs }),
        },
      ]);
      expect(publishedCase(id).expected, id).toEqual(Object.fromEntries(wanted));
    }
  });

  it('are each run or left out with a reason, none both', () => {
    const ids = PUBLISHED_CASES.map(({ id }) => id);
    expect(ids.filter((id) => !(id in runs) && !(id in LEFT_OUT))).toEqual([]);
    expect(Object.keys(runs).filter((id) => id in LEFT_OUT || !ids.includes(id))).toEqual([]);
    expect(Object.keys(LEFT_OUT).filter((id) => !ids.includes(id))).toEqual([]);
    const values = PUBLISHED_CASES.flatMap(({ id, expected }) =>
      Object.keys(expected).map((name) => `${id} ${name}`),
    );
    expect(Object.keys(VALUES_LEFT_OUT).filter((name) => !values.includes(name))).toEqual([]);
  });
});

describe('published cases left out, because they touch nothing that the product works out', () => {
  it.each(Object.entries(LEFT_OUT))('%s: %s', (id, reason) => {
    expect(publishedCase(id).source).not.toBe('');
    expect(reason).not.toBe('');
  });
});

describe('published cases answered by formulas, within the tolerance published', () => {
  it.each(
    Object.entries(CLOSED_FORM_RUNNERS).map(([id, run]) => ({ id, run, source: publishedCase(id).source })),
  )('$id ($source)', ({ id, run }) => {
    expectPublished(publishedCase(id), run);
  });
});
