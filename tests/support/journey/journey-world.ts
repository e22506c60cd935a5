import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import type { Page } from 'playwright-core';
import type { DamRole } from '#shared/contract/actions.ts';
import { openBrowser, type TestBrowser } from '#tests/support/browser.ts';
import { projectRoot, type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addDam, addMember, addPerson, type TestPerson } from '#tests/support/test-people.ts';

/** A running product with a dam, its people and a browser, for journeys of several people. */
export interface JourneyWorld {
  server: RealServer;
  browser: TestBrowser;
  damId: string;
  engineer: TestPerson;
  reviewer: TestPerson;
  colleague: TestPerson;
  /** A page of its own browser profile, signed in through the sign-in form. */
  pageOf(person: TestPerson): Promise<Page>;
  close(): Promise<void>;
}

export async function openWorld(env: Record<string, string> = {}): Promise<JourneyWorld> {
  const server = await startRealServer(env);
  const browser = await openBrowser(server.address);
  const add = async (name: string) => addPerson(server.db, name);
  const [engineer, reviewer, colleague] = [
    await add('Iris Marsh'),
    await add('Remi Okafor'),
    await add('Tove Lind'),
  ];
  const damId = await addDam(server.db, engineer.id);
  const parts: Array<[TestPerson, DamRole]> = [
    [engineer, 'engineer'],
    [reviewer, 'reviewer'],
    [colleague, 'colleague'],
  ];
  for (const [person, role] of parts) await addMember(server.db, damId, person.id, role);
  return {
    server,
    browser,
    damId,
    engineer,
    reviewer,
    colleague,
    async pageOf(person) {
      const page = await browser.newPage();
      await signIn(page, person);
      return page;
    },
    async close() {
      await browser.close();
      await server.close();
    },
  };
}

/** Signs in by the form. `address`: where the product is, for a browser that does not know it. */
export async function signIn(page: Page, { email, password }: TestPerson, address = ''): Promise<void> {
  await page.goto(`${address}/`);
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('heading', { name: 'Your dams' }).waitFor();
}

const inputs = path.resolve(projectRoot, '..', 'shared', 'inputs');

/** Bytes of a real file of the shared inputs; null, said plainly, where they are absent. */
export function realInput(folder: string, name: string): Buffer | null {
  const file = path.join(inputs, folder, name);
  if (existsSync(file)) return readFileSync(file);
  console.info(`The shared inputs are absent: ${folder}/${name} is replaced by a file made in code.`);
  return null;
}
