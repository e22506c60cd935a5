import type { Page } from 'playwright-core';

interface UploadedFile {
  name: string;
  mimeType: string;
  buffer: Buffer;
}

/** Adds files on the dam's page, which has to be open, and waits until their sheets are there. */
export async function addDrawings(page: Page, files: UploadedFile[]): Promise<void> {
  await page.locator('input[type=file][aria-label="Add a drawing"]').setInputFiles(files);
  for (const { name } of files) {
    const entry = page.getByRole('listitem').filter({ has: page.getByRole('heading', { name }) });
    await entry.getByText('No section framed yet').waitFor({ timeout: 60_000 });
    // The first sheets are there while others are still made.
    await entry.getByText(/^Preparing/).waitFor({ state: 'detached', timeout: 60_000 });
  }
}

/** Opens a drawing of the register, makes a section of its whole first sheet with one net, and opens the desk. */
export async function openNewNet(
  page: Page,
  fileName: string,
  section: { name: string; chainage: string },
): Promise<void> {
  await page.getByRole('heading', { name: fileName }).getByRole('link').click();
  await page.getByRole('button', { name: 'New section' }).click();
  await page.getByLabel('Section', { exact: true }).fill(section.name);
  await page.getByLabel('Cut at chainage').fill(section.chainage);
  await page.getByRole('button', { name: 'Make the section' }).click();
  await page.getByRole('button', { name: /^New net/ }).click();
  await page.getByRole('button', { name: 'Make the net and open the desk' }).click();
  await page.getByRole('application').waitFor();
}
