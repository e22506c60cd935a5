import type { Page } from 'playwright-core';
import { demoId } from '#server/demo/demo-ids.ts';
import { fullSupply } from '#server/demo/seed-demo.ts';
import type { Screen } from './screens.ts';

const DAM = `/dams/${demoId(10)}`;
const NET = `/nets/${fullSupply}`;

/** A drawing that the demo has not: a page of vectors on which nothing lies yet. */
export const VECTORS = { name: 'vectors.pdf', page: { width: 842, height: 595 } } as const;

const main = (page: Page) => page.getByRole('main');
const sheet = (page: Page) => page.getByRole('application', { name: / on drawing / });

async function openDesk(page: Page): Promise<void> {
  await sheet(page).waitFor();
  await page
    .getByText(/^(Saved|You can read this net)/)
    .first()
    .waitFor();
}

async function openDrawing(page: Page, number: string): Promise<void> {
  await page
    .getByRole('heading', { level: 3 })
    .getByRole('link', { name: new RegExp(`^${number}`) })
    .click();
  await page.waitForURL(/drawings\/./);
  await page.getByRole('heading', { level: 1 }).first().waitFor();
}

const drawing = (name: string, number: string, bring: (page: Page) => Promise<void>): Screen => ({
  name,
  path: DAM,
  async open(page) {
    await openDrawing(page, number);
    await bring(page);
  },
});

const onDesk = (
  name: string,
  bring: (page: Page) => Promise<void>,
  more: Pick<Screen, 'covers' | 'goesOn'> = {},
): Screen => ({
  ...more,
  name: `desk, ${name}`,
  path: NET,
  async open(page) {
    if (!more.goesOn) await openDesk(page);
    await bring(page);
  },
});

const press = (page: Page, name: string | RegExp) => page.getByRole('button', { name }).first().click();
const pressAll = async (page: Page, ...keys: string[]) => {
  await sheet(page).focus();
  for (const key of keys) await page.keyboard.press(key);
};

/** Dialogs, forms, panels and lists of an engineer that are open only once somebody has asked for them. */
export const STATES: readonly Screen[] = [
  drawing('drawing of vectors, drawn again', VECTORS.name, (page) => page.getByLabel('Resolution').waitFor()),
  drawing('drawing, new section', VECTORS.name, async (page) => {
    await press(page, 'New section');
    await page.getByRole('button', { name: 'Cancel' }).waitFor();
  }),
  drawing('clean-up', 'HF-120', async (page) => {
    await press(page, 'Clean up');
    await page.getByRole('img', { name: /as it would become/ }).waitFor();
  }),
  drawing('clean-up, corners being set', 'HF-120', async (page) => {
    await press(page, 'Clean up');
    await page.getByRole('img', { name: /as it would become/ }).waitFor();
    await press(page, 'Rectify a photograph');
    await page.getByRole('button', { name: /^Top left corner/ }).waitFor();
  }),
  drawing('carry across', 'HF-120', async (page) => {
    await page
      .getByRole('link', { name: /^Carry/ })
      .first()
      .click();
    await page.waitForURL(/\/carry\//);
    await main(page).getByRole('combobox').first().waitFor();
  }),
  {
    name: 'net from a file',
    path: DAM,
    async open(page) {
      await press(page, 'Net from a file on an empty sheet');
      await page.getByRole('dialog').waitFor();
    },
  },
  {
    name: 'account menu',
    path: DAM,
    covers: true,
    async open(page) {
      await page.getByRole('button', { name: /Iris Marsh/ }).click();
      await page.getByRole('button', { name: 'Sign out' }).waitFor();
    },
  },
  { name: 'put away drawings', path: `${DAM}?show=put-away`, open: (page) => main(page).waitFor() },
  onDesk('answering a note', async (page) => {
    await press(page, 'Answer');
    await page.getByRole('textbox', { name: /^Answer to note/ }).fill('@');
    await page.getByRole('listbox').waitFor();
  }),
  onDesk('notes filtered', async (page) => {
    await press(page, 'Filter and search');
    await page.getByLabel('Written by').waitFor();
  }),
  onDesk('new note on the drawing', (page) => press(page, 'Note on the drawing')),
  onDesk('schedule with a row open', (page) => press(page, /^How counted/)),
  onDesk(
    'columns of the schedule',
    async (page) => {
      await press(page, 'Columns');
      await page.getByRole('dialog').waitFor();
    },
    { covers: true },
  ),
  onDesk('downloads', (page) => press(page, 'Download'), { covers: true }),
  onDesk('print or save', async (page) => {
    await press(page, 'Print or save');
    await page.getByRole('dialog').waitFor();
  }),
  onDesk('ruler with two legs', (page) =>
    pressAll(page, 'm', ...['ArrowRight', ' ', 'Shift+ArrowRight', ' ', 'Shift+ArrowDown', ' '], 'g'),
  ),
  onDesk('known point with its magnified view', (page) => pressAll(page, 'k', 'ArrowRight')),
  onDesk('an edit asked for', async (page) => {
    await pressAll(page, 'Shift+H');
    await page.getByRole('dialog').getByRole('button', { name: /^Show/ }).first().click();
    await pressAll(page, 't');
    await page.getByRole('button', { name: 'Leave', exact: true }).waitFor();
  }),
];

/** Parts of the desk on a telephone, by the buttons that bring them to the front. */
export const PHONE_STATES: readonly Screen[] = [
  ...['Sheet', 'Schedule', 'Notes', 'Title block'].map((pane, i) =>
    onDesk(
      `${pane.toLowerCase()} on a telephone`,
      (page) => page.getByRole('button', { name: pane, exact: true }).click(),
      i === 0 ? {} : { goesOn: true },
    ),
  ),
  onDesk(
    'a form on a telephone',
    async (page) => {
      await page.getByRole('button', { name: 'Title block', exact: true }).click();
      await page
        .getByRole('region', { name: 'Title block' })
        .getByRole('button', { name: /^Headwater/ })
        .click();
      await page.getByRole('button', { name: 'Form', exact: true }).waitFor();
    },
    { goesOn: true },
  ),
];
