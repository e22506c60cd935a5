import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { AxeResults } from 'axe-core';
import type { Page } from 'playwright-core';

const source = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/**
 * What axe finds wrong with the page as it stands now, one line for each element: rule, where, and what is the matter.
 * All its rules are asked, those of good practice besides WCAG 2.2 A and AA.
 */
export async function axeFaults(page: Page, state: string): Promise<string[]> {
  // Run by the debugger and not by the page, so that the page's own rules on scripts stand as they are.
  if (!(await page.evaluate(() => 'axe' in globalThis))) await page.evaluate(source);
  const { violations } = await page.evaluate(
    () =>
      (globalThis as unknown as { axe: { run(options: object): Promise<AxeResults> } }).axe.run({
        resultTypes: ['violations'],
        rules: { 'target-size': { enabled: true } },
      }) as Promise<AxeResults>,
  );
  return violations.flatMap(({ id, nodes }) =>
    nodes.map(
      ({ target, html, any, all, none }) =>
        `${state}: ${id} at ${target.join(' ')} (${html.slice(0, 160)}): ${[...any, ...all, ...none].map(({ message }) => message).join('; ')}`,
    ),
  );
}
