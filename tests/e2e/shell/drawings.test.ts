import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser, PHONE, type TestBrowser } from '#tests/support/browser.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addDam, addMember, addPerson, type TestPerson } from '#tests/support/test-people.ts';
import { addFiles, answered, dropFile, scanOfSection, signIn } from './support.ts';

let server: RealServer;
let browser: TestBrowser;
let iris: TestPerson;
let damId: string;
let page: Page;

beforeAll(async () => {
  server = await startRealServer();
  browser = await openBrowser(server.address);
  iris = await addPerson(server.db, 'Iris Marsh');
  damId = await addDam(server.db, iris.id);
  await addMember(server.db, damId, iris.id, 'engineer');
  page = await browser.newPage();
  page.context().setDefaultTimeout(40_000);
  await page.goto(`/dams/${damId}`);
  await signIn(page, iris);
});
afterEach(() => browser.checkConsole());
afterAll(async () => {
  await browser.close();
  await server.close();
});

const jpeg = async (name: string) => ({
  name,
  mimeType: 'image/jpeg',
  buffer: await scanOfSection(name),
});
const uploads = () => page.getByRole('region', { name: 'Files on their way' });
/** The entry of a drawing whose sheets are ready. */
const ready = (name: string) => page.getByRole('table', { name, exact: true });

describe('a drawing', () => {
  it('is added by the button, several at once, and becomes sheets while one watches', async () => {
    await page.getByText('No drawing yet.').waitFor();
    await addFiles(page, [await jpeg('first.jpg'), await jpeg('second.jpg')]);
    await ready('first.jpg').waitFor();
    await ready('second.jpg').waitFor();
  });

  it('that is no drawing is refused in words, and the others go on', async () => {
    browser.expectConsoleError(answered(415));
    const text = { name: 'letter.tif', mimeType: 'image/tiff', buffer: Buffer.from('Dear colleague') };
    const nothing = { name: 'nothing.pdf', mimeType: 'application/pdf', buffer: Buffer.alloc(0) };
    await addFiles(page, [text, nothing, await jpeg('third.jpg')]);
    await uploads().getByText('not an image or a PDF').waitFor();
    await uploads().getByText('The file is empty').waitFor();
    await ready('third.jpg').waitFor();
    await page.getByRole('button', { name: 'Close the line of letter.tif' }).click();
    await page.getByRole('button', { name: 'Close the line of nothing.pdf' }).click();
    await uploads().waitFor({ state: 'detached' });
  });

  it('that the dam holds already is pointed out, and can be kept as a second one', async () => {
    browser.expectConsoleError(answered(409));
    await addFiles(page, [{ ...(await jpeg('first.jpg')), name: 'first again.jpg' }]);
    await uploads().getByText('The same file is kept on this dam as').waitFor();
    await uploads().getByRole('link', { name: 'Open that drawing' }).waitFor();
    await uploads().getByRole('button', { name: 'Keep as a second drawing' }).click();
    await ready('first again.jpg').waitFor();
  });

  it('is added by letting it go anywhere on the page, and by pasting it', async () => {
    await dropFile(page, await jpeg('dropped.jpg'), 'drop');
    await ready('dropped.jpg').waitFor();
    await dropFile(page, await jpeg('pasted.jpg'), 'paste');
    await ready('pasted.jpg').waitFor();
  });

  it('on its way can be cancelled and leaves nothing', async () => {
    const slow = await page.context().newCDPSession(page);
    await slow.send('Network.enable');
    const throttle = { offline: false, latency: 0, downloadThroughput: -1, uploadThroughput: 40_000 };
    await slow.send('Network.emulateNetworkConditions', throttle);
    await addFiles(page, [{ name: 'long.png', mimeType: 'image/png', buffer: Buffer.alloc(3_000_000, 7) }]);
    await page.getByRole('progressbar', { name: 'long.png, sent' }).waitFor();
    await uploads()
      .getByText(/of 2\.9 MB sent/)
      .waitFor();
    await page.getByRole('button', { name: 'Cancel long.png' }).click();
    await uploads().waitFor({ state: 'detached' });
    await slow.send('Network.emulateNetworkConditions', { ...throttle, uploadThroughput: -1 });
    expect(await server.db.query(`SELECT 1 FROM drawing WHERE file_name = 'long.png'`)).toEqual([]);
  });
});

describe('a dam that others work on, too', () => {
  it('shows a new drawing without reloading', async () => {
    const remi = await addPerson(server.db, 'Remi Okafor');
    await addMember(server.db, damId, remi.id, 'reviewer');
    const watcher = await browser.newPage();
    await watcher.goto(`/dams/${damId}`);
    await signIn(watcher, remi);
    await watcher.getByRole('link', { name: 'first.jpg', exact: true }).waitFor();
    await addFiles(page, [await jpeg('seen by others.jpg')]);
    await watcher.getByRole('table', { name: 'seen by others.jpg', exact: true }).waitFor();
  });

  it('takes a file that was refused because the sign-in had ended, once one has signed in again', async () => {
    browser.expectConsoleError(answered(401));
    browser.expectConsoleError(answered(403));
    await server.db.query('DELETE FROM session');
    await addFiles(page, [await jpeg('after the end.jpg')]);
    const again = page.getByRole('dialog', { name: 'Sign in again' });
    await again.getByLabel('Password').fill(iris.password);
    await again.getByRole('button', { name: 'Sign in' }).click();
    await again.waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Try again with after the end.jpg' }).click();
    await ready('after the end.jpg').waitFor();
  });
});

describe('a section', () => {
  it('is framed by a drag on the sheet, named, and given a net whose desk opens', async () => {
    await page.getByRole('link', { name: 'first.jpg', exact: true }).click();
    await page.getByRole('heading', { name: 'first.jpg', level: 1 }).waitFor();
    await page.getByLabel('Drawing number').fill('HF-114');
    await page.getByLabel('Revision').fill('C');
    await page.getByRole('button', { name: 'Save the title' }).click();
    await page.getByRole('heading', { name: 'HF-114 rev C', level: 1 }).waitFor();

    await page.getByRole('button', { name: 'New section' }).click();
    const box = await page.getByRole('img', { name: 'HF-114 rev C, sheet 1' }).boundingBox();
    if (!box) throw new Error('The sheet is not shown.');
    await page.mouse.move(box.x + 0.1 * box.width, box.y + 0.25 * box.height);
    await page.mouse.down();
    await page.mouse.move(box.x + 0.9 * box.width, box.y + 0.85 * box.height, { steps: 4 });
    await page.mouse.up();
    await page.getByText(/^Frame of 12\d\d × 48\d px\.$/).waitFor();
    await page.getByLabel('Section', { exact: true }).fill('B–B');
    await page.getByLabel('Cut at chainage').fill('212');
    await page.getByRole('button', { name: 'Make the section' }).click();
    await page.getByRole('heading', { name: 'Section B–B, chainage 212' }).waitFor();

    await page.getByRole('button', { name: 'New net for Section B–B, chainage 212' }).click();
    await page.getByRole('button', { name: 'Make the net and open the desk' }).click();
    await page.waitForURL(/\/nets\//);
    // The address changes before the desk's parts are there.
    await page.getByRole('application').waitFor();
    await page.goBack();
  });

  it('is framed without a pointer by typing', async () => {
    await page.getByRole('button', { name: 'Change Section B–B, chainage 212' }).press('Enter');
    await page.getByText('Type the frame').press('Enter');
    await page.getByLabel('Width, px').fill('900');
    await page.getByLabel('Width, px').press('Tab');
    await page.getByText(/^Frame of 900 × 48\d px\.$/).waitFor();
    await page.getByRole('button', { name: 'Save', exact: true }).press('Enter');
    await page.getByText('The section is saved.').waitFor();
  });

  it('has its net copied for another load case, put away and brought back', async () => {
    await page.getByRole('button', { name: 'More for Full supply' }).click();
    await page.getByRole('button', { name: 'Copy for another load case' }).click();
    await page.getByRole('textbox', { name: 'Load case' }).fill('Flood 119.40');
    await page.getByRole('button', { name: 'Make the copy' }).click();
    await page.getByRole('link', { name: 'Flood 119.40' }).waitFor();
    await page.getByRole('button', { name: 'More for Flood 119.40' }).click();
    await page.getByRole('button', { name: 'Put away', exact: true }).last().click();
    await page.getByRole('link', { name: 'Flood 119.40' }).waitFor({ state: 'detached' });
    await page.getByLabel('Show put-away sections and nets').check();
    await page.getByRole('button', { name: 'More for Flood 119.40' }).click();
    await page.getByRole('button', { name: 'Bring back', exact: true }).click();
    await page.getByText('Flood 119.40 is back.').waitFor();
  });

  it('stands in the register with its nets, and a drawing put away is found where it was put', async () => {
    await page.getByRole('button', { name: 'Put away HF-114 rev C' }).click();
    await page.getByText('This drawing was put away.').waitFor();
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).click();
    await ready('second.jpg').waitFor();
    expect(await page.getByRole('link', { name: 'HF-114 rev C' }).count()).toBe(0);
    await page.getByRole('link', { name: 'Show what was put away' }).click();
    await page.getByRole('link', { name: 'HF-114 rev C' }).click();
    await page.getByRole('button', { name: 'Bring back HF-114 rev C' }).click();
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).click();
    await page.getByText('Flood 119.40, known points needed').waitFor();
  });

  it('and its original is downloaded byte for byte', async () => {
    await page.getByRole('link', { name: 'HF-114 rev C' }).click();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Download the original' }).click(),
    ]);
    const chunks: Buffer[] = [];
    for await (const chunk of await download.createReadStream()) chunks.push(chunk as Buffer);
    expect(Buffer.concat(chunks).equals(await scanOfSection('first.jpg'))).toBe(true);
    expect(download.suggestedFilename()).toBe('first.jpg');
  });
});

describe('a phone', () => {
  it('adds a drawing from its camera, and everything to press is large enough for a finger', async () => {
    const phone = await browser.newPage({ viewport: PHONE, hasTouch: true, isMobile: true });
    await phone.goto(`/dams/${damId}`);
    await signIn(phone, iris);
    const [chooser] = await Promise.all([
      phone.waitForEvent('filechooser'),
      phone.getByRole('button', { name: 'Take a photo' }).tap(),
    ]);
    expect(await chooser.element().getAttribute('capture')).toBe('environment');
    await chooser.setFiles([await jpeg('photo.jpg')]);
    await phone.getByRole('table', { name: 'photo.jpg', exact: true }).waitFor();
    const small = await phone.evaluate(() =>
      [...document.querySelectorAll('button, select, input:not([type=file], [type=checkbox])')]
        .filter((each) => each.getClientRects().length > 0 && each.getBoundingClientRect().height < 40)
        .map((each) => each.textContent),
    );
    expect(small).toEqual([]);
    const overflow = await phone.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    expect(overflow).toBeLessThanOrEqual(0);
  });
});
