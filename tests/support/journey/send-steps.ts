import type { Page } from 'playwright-core';

/** Opens the dialog on the desk, gives a reason for all that is still open, and sends the net for checking. */
export async function sendForChecking(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Send for checking' }).click();
  const dialog = page.getByRole('dialog');
  const send = dialog.getByRole('button', { name: 'Send', exact: true });
  await send.waitFor();
  const reasons = dialog.getByLabel(/^Reason why this stays/);
  if ((await reasons.count()) > 0) {
    await reasons.first().fill('Known to the office.');
    const rest = dialog.getByRole('button', { name: 'Use this reason for all without one' });
    if ((await reasons.count()) > 1) await rest.click();
  }
  await send.click();
  await dialog.waitFor({ state: 'detached' });
}

/** Fills in what a decision is signed with. */
export async function signAs(page: Page, { password }: { password: string }): Promise<void> {
  await page.getByLabel('In what capacity you sign').fill('Reviewing engineer');
  await page.getByLabel('Your password, to sign').fill(password);
}
