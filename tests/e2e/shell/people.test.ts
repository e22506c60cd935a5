import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { digestStopPage, digestStopToken } from '#server/services/digest-link.ts';
import { openBrowser, type TestBrowser } from '#tests/support/browser.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addDam, addMember, addPerson, type TestPerson } from '#tests/support/test-people.ts';
import { answered, signIn } from './support.ts';

let server: RealServer;
let browser: TestBrowser;
let iris: TestPerson;
let remi: TestPerson;
let ada: TestPerson;
let damId: string;

beforeAll(async () => {
  server = await startRealServer();
  browser = await openBrowser(server.address);
  iris = await addPerson(server.db, 'Iris Marsh');
  remi = await addPerson(server.db, 'Remi Okafor');
  ada = await addPerson(server.db, 'Ada Quist', { admin: true });
  damId = await addDam(server.db, iris.id);
  await addMember(server.db, damId, iris.id, 'engineer');
  await addMember(server.db, damId, remi.id, 'reviewer');
});
afterEach(() => browser.checkConsole());
afterAll(async () => {
  await browser.close();
  await server.close();
});

const endSessions = () => server.db.query('DELETE FROM session');

async function newestLinkTo(address: string): Promise<string> {
  const [mail] = await server.db
    .getRepository(OutboxMailEntity)
    .find({ where: { toAddress: address }, order: { createdAt: 'DESC' }, take: 1 });
  const link = /https?:\/\/\S+/.exec(mail?.text ?? '')?.[0];
  if (!link) throw new Error(`No link was mailed to ${address}.`);
  return link;
}

describe('signing in', () => {
  it('refuses a wrong password in words, keeps the address, and leads to the page that was asked for', async () => {
    browser.expectConsoleError(answered(401));
    const page = await browser.newPage();
    await page.goto(`/dams/${damId}/activity`);
    await signIn(page, { ...iris, password: 'not the password' });
    await page.getByRole('alert').getByText('do not belong together').waitFor();
    expect(await page.getByLabel('E-mail address').inputValue()).toBe(iris.email);
    await signIn(page, iris);
    await page.getByRole('heading', { name: 'Activity', level: 1 }).waitFor();
    expect(new URL(page.url()).pathname).toBe(`/dams/${damId}/activity`);
  });

  it('is done with the keyboard alone', async () => {
    const page = await browser.newPage();
    await page.goto('/sign-in');
    await page.getByLabel('E-mail address').focus();
    await page.keyboard.type(iris.email);
    await page.keyboard.press('Tab');
    await page.keyboard.type(iris.password);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Your dams' }).waitFor();
    await page.getByRole('button', { name: 'Account of Iris Marsh' }).press('Enter');
    await page.keyboard.press('Escape');
    expect(await page.getByRole('button', { name: 'Sign out' }).count()).toBe(0);
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Sign out' }).press('Enter');
    await page.waitForURL(/sign-in/);
  });

  it('leads with the keyboard from page to page, and past the bar to the content', async () => {
    const page = await browser.newPage();
    await page.goto('/');
    await signIn(page, iris);
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).press('Enter');
    await page.getByRole('heading', { name: 'Harrow Fen Dam', level: 1 }).waitFor();
    const focused = () => page.evaluate(() => document.activeElement?.textContent ?? '');
    await expect.poll(focused).toBe('Harrow Fen Dam');
    await page.keyboard.press('Tab');
    await expect.poll(focused).toBe('Seepage along the dam');
    await page.keyboard.press('Tab');
    await expect.poll(focused).toBe('Compare nets');
    await page.keyboard.press('Tab');
    await expect.poll(focused).toBe('Settings and people');
    await page.getByRole('link', { name: 'Skip to the content' }).press('Enter');
    expect(await page.evaluate(() => document.activeElement?.id)).toBe('content');
  });

  it('again over the page keeps what was typed and goes on', async () => {
    browser.expectConsoleError(answered(401));
    browser.expectConsoleError(answered(403));
    const page = await browser.newPage();
    await page.goto(`/dams/${damId}/settings`);
    await signIn(page, iris);
    await page.getByLabel('Name of the vertical datum').fill('LD 1958');
    await endSessions();
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    const again = page.getByRole('dialog', { name: 'Sign in again' });
    await again.getByLabel('Password').fill(iris.password);
    await again.getByRole('button', { name: 'Sign in' }).click();
    await again.waitFor({ state: 'detached' });
    expect(await page.getByLabel('Name of the vertical datum').inputValue()).toBe('LD 1958');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await page.getByText('The settings are saved.').waitFor();
  });

  it('again as somebody else shows nothing of the first person', async () => {
    browser.expectConsoleError(answered(401));
    const page = await browser.newPage();
    await page.goto('/account');
    await signIn(page, iris);
    await page.getByLabel('Name', { exact: true }).fill('Somebody Else');
    await endSessions();
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    const again = page.getByRole('dialog', { name: 'Sign in again' });
    await again.getByLabel('E-mail address').fill(remi.email);
    await again.getByLabel('Password').fill(remi.password);
    await again.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('heading', { name: 'Your dams' }).waitFor();
    await page.getByRole('button', { name: 'Account of Remi Okafor' }).waitFor();
  });

  it('anew in another tab does not break a write in the first', async () => {
    browser.expectConsoleError(answered(403));
    const page = await browser.newPage();
    await page.goto('/account');
    await signIn(page, iris);
    const name = page.getByLabel('Name', { exact: true });
    await name.waitFor();
    const other = await page.context().newPage();
    await other.goto('/');
    await other.getByRole('button', { name: 'Account of Iris Marsh' }).click();
    await other.getByRole('button', { name: 'Sign out' }).click();
    await other.waitForURL(/sign-in/);
    await signIn(other, iris);
    await other.getByRole('heading', { name: 'Your dams' }).waitFor();
    await name.fill('Iris J. Marsh');
    await page.getByRole('button', { name: 'Save', exact: true }).click();
    await page.getByText('The name is saved.').waitFor();
  });
});

describe('an address that leads nowhere', () => {
  it('is told from a page that failed, and both lead back', async () => {
    browser.expectConsoleError(answered(404));
    browser.expectConsoleError(/does not exist, or you do not belong/);
    const page = await browser.newPage();
    await page.goto(`/dams/${iris.id}`);
    await signIn(page, iris);
    await page.getByRole('heading', { name: 'Not found' }).waitFor();
    await page.getByRole('link', { name: 'Go to your dams' }).click();
    await page.getByRole('heading', { name: 'Your dams' }).waitFor();
  });

  it('a server that is not running is said in words, with a way to try again', async () => {
    browser.expectConsoleError(/ERR_|Failed to load|could not be reached/);
    const page = await browser.newPage();
    await page.goto('/');
    await signIn(page, iris);
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).waitFor();
    // The page's own script is there already; only the server's answers are missing.
    await page.goto(`/dams/${damId}`);
    await page.getByRole('heading', { name: 'Harrow Fen Dam' }).waitFor();
    await page.getByRole('link', { name: 'Dams', exact: true }).click();
    await page.context().setOffline(true);
    await page.getByRole('link', { name: 'Show what was put away' }).click();
    await page.getByText('The server could not be reached').waitFor({ timeout: 30_000 });
    await page.context().setOffline(false);
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByText('No dam has been put away.').waitFor();
  });
});

describe('people', () => {
  it('are invited to a dam by mail, accept with a name and a password, and find the dam', async () => {
    const page = await browser.newPage();
    await page.goto(`/dams/${damId}/settings`);
    await signIn(page, iris);
    await page.getByRole('heading', { name: 'Settings and people' }).waitFor();
    const address = 'tove.lind@harrow-fen.example';
    await page.getByLabel('E-mail address').fill(address);
    const addition = page.getByRole('group', { name: 'Parts', exact: true });
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await page.getByText('Choose at least one part').waitFor();
    await addition.getByLabel('colleague').check();
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await page.getByText(`${address} has been written to.`).waitFor();

    const guest = await browser.newPage();
    await guest.goto(await newestLinkTo(address));
    await guest.getByText('Harrow Fen Dam').waitFor();
    await guest.getByLabel('Name', { exact: true }).fill('Tove Lind');
    await guest.getByLabel('Password').fill('a password of my own');
    await guest.getByRole('button', { name: 'Accept and sign in' }).click();
    await guest.getByRole('link', { name: 'Harrow Fen Dam' }).click();
    await guest.getByText('You are a colleague on this dam.').waitFor();
    expect(await guest.getByRole('button', { name: 'Add a drawing' }).count()).toBe(0);
  });

  it('learn that an invitation was used already', async () => {
    browser.expectConsoleError(answered(410));
    browser.expectConsoleError(answered(404));
    browser.expectConsoleError(answered(400));
    browser.expectConsoleError(/caught the following error/);
    const guest = await browser.newPage();
    await guest.goto(await newestLinkTo('tove.lind@harrow-fen.example'));
    await guest.getByRole('heading', { name: 'This link does not work' }).waitFor();
  });

  it('reset a forgotten password by a link that is mailed', async () => {
    const page = await browser.newPage();
    await page.goto('/sign-in');
    await page.getByRole('link', { name: 'Forgotten your password?' }).click();
    await page.getByRole('heading', { name: 'Reset your password' }).waitFor();
    await page.getByLabel('E-mail address').fill(remi.email);
    await page.getByRole('button', { name: 'Send the link' }).click();
    await page.getByText('a mail with a link is on its way').waitFor();
    await page.goto(await newestLinkTo(remi.email));
    await page.getByLabel('New password').fill('another long password');
    await page.getByRole('button', { name: 'Set the password' }).click();
    await page.getByText('The password is set.').waitFor();
    await page.getByRole('link', { name: 'Go to the sign-in page' }).click();
    await signIn(page, { ...remi, password: 'another long password' });
    await page.getByRole('heading', { name: 'Your dams' }).waitFor();
  });

  it('of the office make a dam, and read the mails while no mail server is set', async () => {
    const page = await browser.newPage();
    await page.goto('/');
    await signIn(page, ada);
    await page.getByRole('link', { name: 'New dam' }).click();
    await page.getByLabel('Name of the dam').fill('Lower Weir');
    await page.getByLabel('Unit system').selectOption('US');
    expect(await page.getByLabel('Unit weight of water').inputValue()).toBe('62.4');
    await page.getByLabel('Full supply level').fill('1,234');
    await page.getByRole('button', { name: 'Make the dam' }).click();
    await page.getByText('1,234 may be 1234 or a decimal').waitFor();
    await page.getByLabel('Full supply level').fill('387,5');
    await page.getByRole('button', { name: 'Make the dam' }).click();
    await page.getByRole('heading', { name: 'Settings and people' }).waitFor();
    await page.getByRole('link', { name: 'Lower Weir' }).click();
    await page.getByText('Full supply level 387.50 ft').waitFor();

    await page.getByRole('button', { name: 'Account of Ada Quist' }).click();
    await page.getByRole('link', { name: 'Mails' }).click();
    await page
      .getByRole('link', { name: /Harrow Fen Dam/ })
      .first()
      .click();
    await page.getByRole('link', { name: /invitation#/ }).waitFor();
  });

  it('who are deactivated cannot sign in any more', async () => {
    browser.expectConsoleError(answered(401));
    const leaver = await addPerson(server.db, 'Gone Soon');
    const page = await browser.newPage();
    await page.goto('/people');
    await signIn(page, ada);
    await page.getByRole('button', { name: 'Deactivate Gone Soon' }).click();
    await page.getByRole('button', { name: 'Activate Gone Soon' }).waitFor();
    const other = await browser.newPage();
    await other.goto('/');
    await signIn(other, leaver);
    await other.getByText('do not belong together').waitFor();
  });

  it('who follow the link of their digest stop it by one press, without a sign-in', async () => {
    const reader = await addPerson(server.db, 'Reads Daily');
    const timing = async () => {
      const query = 'SELECT mail_timing AS timing FROM person WHERE id = $1';
      return (await server.db.query(query, [reader.id]))[0].timing;
    };
    await server.db.query("UPDATE person SET mail_timing = 'daily' WHERE id = $1", [reader.id]);
    const config = { publicUrl: server.address, sessionSecret: String(server.env.SESSION_SECRET) };
    const page = await browser.newPage();
    await page.goto(digestStopPage(config, digestStopToken(config, reader.id)));
    const stop = page.getByRole('button', { name: 'Stop the digest' });
    await stop.waitFor();
    expect(await timing()).toBe('daily');
    await stop.click();
    await page.getByText('The daily digest is stopped.').waitFor();
    expect(await timing()).not.toBe('daily');
  });
});
