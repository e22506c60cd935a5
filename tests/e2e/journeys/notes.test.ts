import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SheetPoint } from '#shared/contract/document.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { takeDesk } from '#tests/support/journey/desk-hand.ts';
import { cell } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';

let world: JourneyWorld;
/** The engineer's page and the colleague's, each in a browser of its own, on one net. */
let page: Page;
let other: Page;

/** Seen by the other within 2 s on a machine at rest; a shared one takes its time. */
const WITHIN = { timeout: 15_000 };

beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  await page.goto(`/dams/${world.damId}`);
  const scan = await pngDrawing({ width: 1400, height: 900 });
  await addDrawings(page, [{ name: 'noted.png', mimeType: 'image/png', buffer: scan }]);
  await openNewNet(page, 'noted.png', { name: 'A–A', chainage: '10' });
  other = await world.pageOf(world.colleague);
  await other.goto(new URL(page.url()).pathname);
  await cell(other, 'Headwater').waitFor();
});
afterAll(() => world.close());

const notesOf = (on: Page) => on.getByRole('region', { name: 'Notes' });
const itemOf = (on: Page, text: string) => notesOf(on).getByRole('listitem').filter({ hasText: text });

describe('a colleague who comments while the engineer traces', () => {
  it('names the engineer, attaches a photograph, and is seen while the line is being drawn', async () => {
    const hand = await takeDesk(page);
    await hand.sheet.focus();
    await page.keyboard.press('e');
    const points: SheetPoint[] = [
      [400, 200],
      [400, 500],
    ];
    await page.keyboard.down('Control');
    await hand.click(points[0]!);
    await page.keyboard.up('Control');

    await other.getByRole('button', { name: 'Note on the drawing' }).click();
    const text = other.getByLabel(/^Write a note on the drawing/);
    await text.pressSequentially('Seen on site, @ir');
    await other.getByRole('option', { name: 'Iris Marsh' }).waitFor();
    await text.press('Enter');
    expect(await text.inputValue()).toBe('Seen on site, @Iris Marsh ');
    const photo = { name: 'weir.png', mimeType: 'image/png', buffer: await pngDrawing() };
    await other.getByLabel('Attach photographs or files').setInputFiles(photo);
    await other.getByRole('button', { name: 'Leave weir.png out' }).waitFor();
    await notesOf(other).getByText('sending', { exact: true }).waitFor({ state: 'hidden' });
    await other.getByRole('button', { name: 'Write note' }).click();

    const seen = itemOf(page, 'Seen on site');
    await seen.waitFor(WITHIN);
    await seen.getByRole('button', { name: 'View weir.png' }).click();
    await page.getByRole('dialog').getByRole('img', { name: 'weir.png' }).waitFor();
    await page.getByRole('dialog').getByRole('button', { name: 'Close' }).click();
    // The line under way has been left as it was.
    await hand.sheet.focus();
    await page.keyboard.down('Control');
    await hand.click(points[1]!);
    await page.keyboard.up('Control');
    await page.keyboard.press('Enter');
    await page.getByText(/^Saved/).waitFor();
  });

  it('writes on the line once it is there, and reads the answer', async () => {
    const hand = await takeDesk(other);
    await hand.sheet.focus();
    await other.keyboard.press('n');
    // Until the line has come, the same press means the bare place.
    const beginsAtLine = async () => {
      await hand.click([400, 350]);
      return other.getByLabel('Write a note at a line').isVisible();
    };
    await expect.poll(beginsAtLine, { ...WITHIN, interval: 700 }).toBe(true);
    await other.getByLabel('Write a note at a line').fill('Is this the third drop?');
    await other.getByRole('button', { name: 'Write note' }).click();
    // The line just drawn is chosen, and its form stands where the notes are.
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    const asked = itemOf(page, 'Is this the third drop?');
    await asked.waitFor(WITHIN);
    await asked.getByRole('button', { name: 'Answer' }).click();
    await page.getByLabel('Answer to note 2').fill('The second.');
    await page.getByRole('button', { name: 'Write answer' }).click();
    await itemOf(other, 'Is this the third drop?')
      .getByText(/^answered by I. Marsh/)
      .waitFor(WITHIN);
  });

  it('goes from open note to open note by the key, and begins one on a figure of the title block', async () => {
    await other.keyboard.press('Escape');
    await other.getByRole('heading', { name: 'Notes' }).click();
    await other.keyboard.press('.');
    await expect
      .poll(() => itemOf(other, 'Seen on site').getAttribute('class'), WITHIN)
      .toContain('bg-chosen');
    await cell(other, 'Headwater').hover();
    await other.getByRole('button', { name: 'Write a note on headwater' }).click();
    await other.getByLabel(/^Write a note on the headwater/).fill('Which survey is this level from?');
    await other.getByRole('button', { name: 'Write note' }).click();
    await page.getByRole('button', { name: 'Show note 3 on headwater' }).waitFor(WITHIN);
  });
});
