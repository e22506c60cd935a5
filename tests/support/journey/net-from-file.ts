import type { Page } from 'playwright-core';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { JourneyWorld } from './journey-world.ts';

/** Makes a net of a document on an empty sheet of the dam and opens it on the desk. */
export async function openNetFromFile(
  world: JourneyWorld,
  page: Page,
  document: FlowNetDocument,
  { section, loadCase }: { section: string; loadCase: string },
): Promise<void> {
  // Another datum than the dam's is asked about with this answer.
  world.browser.expectConsoleError(/status of 409/);
  await page.goto(`/dams/${world.damId}`);
  await page.getByRole('button', { name: 'Net from a file on an empty sheet' }).click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Section', { exact: true }).fill(section);
  await dialog.getByLabel('Load case').fill(loadCase);
  await dialog.getByLabel('Net file (JSON)').setInputFiles({
    name: 'net.json',
    mimeType: 'application/json',
    buffer: Buffer.from(JSON.stringify(document)),
  });
  await dialog.getByRole('button', { name: 'Make the net and open the desk' }).click();
  const allTheSame = dialog.getByRole('button', { name: 'Make the net all the same' });
  const sheet = page.getByRole('application', { name: / on drawing / });
  await allTheSame.or(sheet).first().waitFor();
  if (await allTheSame.isVisible()) await allTheSame.click();
  await sheet.waitFor();
}
