import type { Page } from 'playwright-core';
import { demoId } from '#server/demo/demo-ids.ts';
import { admin, colleague, DEMO_PASSWORD, engineer, reviewer } from '#server/demo/demo-people.ts';
import { apron, fullSupply } from '#server/demo/seed-demo.ts';

/** A screen of the demo in one of its main states. */
export interface Screen {
  readonly name: string;
  readonly path: string;
  /** Comes from the screen before it, which has the same address, without loading the page again. */
  readonly goesOn?: true;
  /** Shows something that covers a part of the rest, as an open menu does. */
  readonly covers?: true;
  /** Waits until the screen is there, and brings it into the state. */
  open(page: Page): Promise<void>;
}

const DAM = demoId(10);
const SECTION_C_NET = demoId(32);
const REVISION = demoId(70);

const heading = (name: string | RegExp) => async (page: Page) =>
  page.getByRole('heading', { name, level: 1 }).first().waitFor();
const pressed = (name: string | RegExp) => async (page: Page) => {
  await page.getByRole('main').getByRole('button', { name }).first().click();
};

async function desk(page: Page): Promise<void> {
  await page.getByRole('application', { name: / on drawing / }).waitFor();
  await page
    .getByText(/^(Saved|You can read this net)/)
    .first()
    .waitFor();
}

async function sheetKeys(page: Page, ...keys: string[]): Promise<void> {
  await desk(page);
  await page.getByRole('application', { name: / on drawing / }).focus();
  for (const key of keys) await page.keyboard.press(key);
}

const dialog = async (page: Page) => page.getByRole('dialog').waitFor();

/** A cell of the title block with the form that it opens. */
const cells = [
  'Section',
  'Scale',
  'Residual',
  'Headwater',
  'Drops',
  'Permeability',
  'Seepage',
  'Net check',
  'Drawn',
];

export const PUBLIC_SCREENS: readonly Screen[] = [
  { name: 'sign-in', path: '/sign-in', open: heading(/./) },
  {
    name: 'sign-in refused',
    path: '/sign-in',
    async open(page) {
      await page.getByLabel('E-mail address').fill('nobody@harrow-fen.example');
      await page.getByLabel('Password').fill('not the password');
      await page.getByRole('button', { name: 'Sign in', exact: true }).click();
      await page.getByRole('alert').waitFor();
    },
  },
  { name: 'forgotten password', path: '/forgot-password', open: heading(/./) },
  { name: 'new password', path: '/reset-password?token=none', open: heading(/./) },
  { name: 'invitation', path: '/invitation?token=none', open: heading(/./) },
  { name: 'stop the digest', path: '/stop-digest?token=none', open: heading(/./) },
];

export const SCREENS_OF: ReadonlyArray<{ readonly person: string; readonly screens: readonly Screen[] }> = [
  {
    person: engineer.email,
    screens: [
      { name: 'dams', path: '/', open: heading('Your dams') },
      { name: 'register', path: '/register', open: heading('Register') },
      {
        name: 'register, searched',
        path: '/register?q=blanket&sort=newest',
        open: async (page) => page.locator('mark').first().waitFor(),
      },
      { name: 'new dam', path: '/dams/new', open: heading(/./) },
      { name: 'dam', path: `/dams/${DAM}`, open: heading('Harrow Fen Dam') },
      { name: 'dam settings', path: `/dams/${DAM}/settings`, open: heading(/./) },
      { name: 'dam activity', path: `/dams/${DAM}/activity`, open: heading(/./) },
      {
        name: 'nets compared',
        path: `/dams/${DAM}/compare?one=net:${fullSupply}&other=revision:${REVISION}`,
        async open(page) {
          await page.getByRole('region', { name: 'Reading points' }).waitFor();
        },
      },
      { name: 'seepage of the dam', path: `/dams/${DAM}/seepage`, open: heading(/./) },
      {
        name: 'drawing',
        path: `/dams/${DAM}`,
        async open(page) {
          await page.getByRole('heading', { level: 3 }).getByRole('link').first().click();
          await page.waitForURL(/drawings\/./);
          await heading(/./)(page);
        },
      },
      { name: 'account', path: '/account', open: heading(/./) },
      { name: 'not found', path: '/nowhere', open: heading(/./) },
      { name: 'dam that is not there', path: `/dams/${demoId(999)}`, open: heading(/./) },
      { name: 'desk', path: `/nets/${fullSupply}`, open: desk },
      ...cells.map((cell) => ({
        name: `desk, ${cell}`,
        path: `/nets/${fullSupply}`,
        goesOn: true as const,
        async open(page: Page) {
          const block = page.getByRole('region', { name: 'Title block' });
          await block.getByRole('button', { name: new RegExp(`^${cell}`) }).click();
          await page.getByRole('complementary').getByRole('heading').first().waitFor();
        },
      })),
      {
        name: 'desk, everything chosen, crosshair',
        path: `/nets/${fullSupply}`,
        open: (page) => sheetKeys(page, 'c', 'ArrowRight', 'Control+a'),
      },
      {
        name: 'desk, drawing',
        path: `/nets/${fullSupply}`,
        open: (page) => sheetKeys(page, 'b', 'ArrowRight', ' ', 'Shift+ArrowRight', 'Shift+ArrowDown'),
      },
      {
        name: 'desk, keys',
        path: `/nets/${fullSupply}`,
        async open(page) {
          await sheetKeys(page, '?');
          await dialog(page);
        },
      },
      {
        name: 'desk, table',
        path: `/nets/${fullSupply}`,
        async open(page) {
          await sheetKeys(page, 'Shift+H');
          await dialog(page);
          await page
            .getByRole('button', { name: /points of .*: show their figures/ })
            .first()
            .click();
        },
      },
      {
        name: 'desk, lines',
        path: `/nets/${fullSupply}`,
        open: (page) => sheetKeys(page, 'h', 'Escape', 'h'),
      },
      {
        name: 'desk, snapping',
        path: `/nets/${fullSupply}`,
        async open(page) {
          await desk(page);
          await pressed('Snap to')(page);
        },
      },
      {
        name: 'desk, view',
        path: `/nets/${fullSupply}`,
        async open(page) {
          await desk(page);
          await pressed('View')(page);
        },
      },
      {
        name: 'desk, send for checking',
        path: `/nets/${fullSupply}`,
        async open(page) {
          await desk(page);
          await page.getByRole('button', { name: 'Send for checking' }).click();
          await dialog(page);
        },
      },
      {
        name: 'desk, not set out',
        path: `/nets/${SECTION_C_NET}`,
        open: (page) => sheetKeys(page, 'k', 'ArrowLeft'),
      },
      { name: 'desk, being checked', path: `/nets/${apron}`, open: desk },
      { name: 'calculation sheet', path: `/revisions/${REVISION}/sheet`, open: heading(/./) },
      {
        name: 'check, run again',
        path: `/revisions/${REVISION}`,
        async open(page) {
          await page.getByRole('button', { name: 'Run again' }).click();
          await page.getByRole('button', { name: 'Run again' }).click();
          await page.getByText(/figures are equal to the last digit shown/).waitFor();
        },
      },
      {
        name: 'check, independent solution',
        path: `/revisions/${REVISION}`,
        async open(page) {
          await page.getByRole('button', { name: 'Independent solution' }).click();
          await page.getByRole('button', { name: 'Solve the section' }).click();
          await page.getByRole('alert').waitFor({ timeout: 60_000 });
        },
      },
    ],
  },
  {
    person: reviewer.email,
    screens: [{ name: 'check', path: `/revisions/${REVISION}`, open: heading(/./) }],
  },
  {
    person: colleague.email,
    screens: [{ name: 'desk of a colleague', path: `/nets/${fullSupply}`, open: desk }],
  },
  {
    person: admin.email,
    screens: [
      { name: 'no dams', path: '/', open: heading('Your dams') },
      { name: 'people', path: '/people', open: heading(/./) },
      { name: 'mails', path: '/mails', open: heading(/./) },
      { name: 'mail templates', path: '/mails/templates', open: heading('Mail templates') },
      {
        name: 'mail',
        path: '/mails',
        async open(page) {
          await page.getByRole('main').getByRole('table').getByRole('link').first().click();
          await page.waitForURL(/mails\/./);
          await heading(/./)(page);
        },
      },
    ],
  },
];

export async function signInToDemo(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password').fill(DEMO_PASSWORD);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.getByRole('heading', { name: 'Your dams' }).waitFor();
}
