import type { Page } from 'playwright-core';
import sharp from 'sharp';
import type { TestPerson } from '#tests/support/test-people.ts';

/** Signs in on the sign-in page, wherever it was asked for. */
export async function signIn(page: Page, person: TestPerson): Promise<void> {
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('Password').fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** A section drawn in code, as a scan would show it: an embankment on a flat base, another for each title. */
export function scanOfSection(title: string): Promise<Buffer> {
  const marks = [...title].map((letter, at) => `M${100 + at * 20} 100V${100 + (letter.codePointAt(0) ?? 0)}`);
  const lines = `<svg width="1500" height="800"><g stroke="#333" stroke-width="4" fill="none">
    <path d="M100 650H1400M200 650L650 250H750L1250 650"/><path d="${marks.join('')}"/></g></svg>`;
  return sharp({ create: { width: 1500, height: 800, channels: 3, background: '#efe9d8' } })
    .composite([{ input: Buffer.from(lines) }])
    .jpeg()
    .withMetadata({ density: 300 })
    .toBuffer();
}

export interface NamedFile {
  name: string;
  mimeType: string;
  buffer: Buffer;
}

/** Chooses files by the register's button. */
export async function addFiles(page: Page, files: NamedFile[]): Promise<void> {
  const [chooser] = await Promise.all([
    page.waitForEvent('filechooser'),
    page.getByRole('button', { name: 'Add a drawing' }).click(),
  ]);
  await chooser.setFiles(files);
}

/** Lets go of files over the page, as from a folder. */
export async function dropFile(page: Page, file: NamedFile, type: 'drop' | 'paste'): Promise<void> {
  const bytes = file.buffer.toString('base64');
  await page.evaluate(
    ({ bytes, name, mimeType, type }) => {
      const data = new DataTransfer();
      const content = Uint8Array.from(atob(bytes), (letter) => letter.charCodeAt(0));
      data.items.add(new File([content], name, { type: mimeType }));
      const event =
        type === 'drop'
          ? new DragEvent('drop', { dataTransfer: data, bubbles: true, cancelable: true })
          : new ClipboardEvent('paste', { clipboardData: data, bubbles: true, cancelable: true });
      document.body.dispatchEvent(event);
    },
    { bytes, name: file.name, mimeType: file.mimeType, type },
  );
}

/** A console line that stands for an answer a test asks for. */
export const answered = (status: number) => new RegExp(`Failed to load resource.*status of ${status}`);
