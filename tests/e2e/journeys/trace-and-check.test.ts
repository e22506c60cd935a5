import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import type { ParsedMail } from 'mailparser';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DESKTOP, PHONE } from '#tests/support/browser.ts';
import {
  apronScan,
  DROPS,
  downstreamBed,
  equipotential,
  exactPressure,
  flowLine,
  GROUND,
  HEADWATER,
  place,
  TAILWATER,
  underside,
  upstreamBed,
} from '#tests/support/journey/apron-sheet.ts';
import { takeDesk } from '#tests/support/journey/desk-hand.ts';
import {
  allSaved,
  cell,
  placeKnownPoints,
  scheduleRow,
  traceBoundary,
  typeReadingPoint,
  typeWaterLevels,
} from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';
import { sendForChecking, signAs } from '#tests/support/journey/send-steps.ts';
import { type SmtpStandIn, startSmtpStandIn } from '#tests/support/smtp-stand-in.ts';

let smtp: SmtpStandIn;
let world: JourneyWorld;
let engineer: Page;
let reviewer: Page;
let netAddress: string;
beforeAll(async () => {
  smtp = await startSmtpStandIn();
  world = await openWorld({ SMTP_URL: smtp.url });
});
afterAll(async () => {
  await world.close();
  await smtp.close();
});

const INSTRUMENTS = [
  { name: 'P1', offset: -6, elevation: 94.5 },
  { name: 'P2', offset: 0, elevation: 92 },
  { name: 'P3', offset: 7, elevation: 93.5 },
];
/** 0.25 drop of 1 m head each, in kPa: what the ratio between neighbouring lines may be off at worst. */
const QUARTER_DROP_KPA = 0.25 * ((HEADWATER - TAILWATER) / DROPS) * 9.81;

describe('from a scan to a decision', () => {
  it('an engineer traces a flow net and gets the pore pressures at the instruments', async () => {
    engineer = await world.pageOf(world.engineer);
    await engineer.goto(`/dams/${world.damId}`);
    await addDrawings(engineer, [{ name: 'apron.png', mimeType: 'image/png', buffer: await apronScan() }]);
    await openNewNet(engineer, 'apron.png', { name: 'Spillway axis', chainage: '' });
    netAddress = new URL(engineer.url()).pathname;
    const hand = await placeKnownPoints(engineer, [
      { at: place(-30, GROUND), offset: '-30', elevation: String(GROUND) },
      { at: place(30, GROUND), offset: '30', elevation: String(GROUND) },
    ]);
    await typeWaterLevels(engineer, String(HEADWATER), String(TAILWATER));
    await traceBoundary(engineer, hand, 'Face under headwater', upstreamBed);
    await traceBoundary(engineer, hand, 'Face under tailwater', downstreamBed);
    await traceBoundary(engineer, hand, 'Impervious', underside);
    await hand.sheet.focus();
    await engineer.keyboard.press('e');
    for (let drop = 1; drop < DROPS; drop += 1) await hand.trace(equipotential(drop));
    await engineer.keyboard.press('f');
    for (const channel of [1, 2, 3]) await hand.trace(flowLine(channel));
    await engineer.keyboard.press('Escape');
    for (const { name, offset, elevation } of INSTRUMENTS)
      await typeReadingPoint(engineer, name, String(offset), String(elevation));

    // Until the count is stated there is no figure.
    await expect.poll(() => scheduleRow(engineer, 'P1').textContent()).not.toMatch(/\d ± \d/);
    await cell(engineer, 'Drops').click();
    const count = engineer.getByRole('region', { name: 'Count of drops and channels' });
    await count.getByRole('button', { name: `Take ${DROPS}` }).click();
    await count.getByRole('button', { name: 'Close' }).click();
    await expect.poll(() => cell(engineer, 'Head per drop').textContent()).toContain('1.00 m');
    for (const { name, offset, elevation } of INSTRUMENTS) {
      const figure = scheduleRow(engineer, name).getByRole('cell').filter({ hasText: '±' }).last();
      const shown = (await figure.textContent()) ?? '';
      // Closed form after Harr (1962), u = γw(h − z).
      const error = Number.parseFloat(shown) - exactPressure(offset, elevation);
      expect(Math.abs(error), `${name} shows ${shown}`).toBeLessThan(QUARTER_DROP_KPA);
    }
    await allSaved(engineer);
  });

  it('a colleague comments on a point, and the engineer sees it without reloading', async () => {
    const colleague = await world.pageOf(world.colleague);
    await colleague.goto(netAddress);
    await scheduleRow(colleague, 'P2').waitFor();
    const hand = await takeDesk(colleague);
    await hand.sheet.focus();
    await colleague.keyboard.press('n');
    await hand.click([0, 92]);
    await colleague.getByText('Write a note at P2').waitFor();
    await colleague.getByRole('textbox', { name: 'Note' }).fill('The apron was underpinned in 1974.');
    await colleague.getByRole('button', { name: 'Write note' }).click();
    const seen = engineer.getByText('The apron was underpinned in 1974.');
    await seen.waitFor({ timeout: 5000 });
    await engineer.getByRole('button', { name: 'Answer' }).click();
    await engineer.getByLabel('Answer to note 1').fill('Then the underside stands as drawn.');
    await engineer.getByRole('button', { name: 'Write answer' }).click();
    await colleague.getByText('Then the underside stands as drawn.').waitFor({ timeout: 5000 });
    await colleague.context().close();
  });

  it('the reviewer gets a mail whose link leads to the frozen net, and returns it with a note', async () => {
    await sendForChecking(engineer);
    await engineer.getByText(/^Revision A has been sent/).waitFor();
    const mail = await mailTo(world.reviewer.email);
    expect(mail.subject).toContain('Harrow Fen Dam');
    expect(mail.subject).toContain('Spillway axis');
    // With a picture of the section in it, made of the sheet's tiles.
    const [picture] = mail.attachments;
    expect(picture).toMatchObject({ contentType: 'image/jpeg', related: true });
    expect(picture?.size).toBeLessThanOrEqual(150_000);
    expect(mail.html).toContain('alt="Spillway axis as frozen with revision A: the traced net over the scan');
    for (const { name } of INSTRUMENTS) expect(mail.text).toMatch(new RegExp(`^${name} .*±`, 'm'));
    keepToLookAt('reviewer-mail.html', String(mail.html));

    reviewer = await world.pageOf(world.reviewer);
    await reviewer.goto(revisionLink(mail));
    // The figures are kept back until the reviewer has said how the revision is to be read.
    await reviewer.getByRole('button', { name: 'Show the figures without reading blind' }).click();
    await reviewer.getByRole('button', { name: 'Show the figures', exact: true }).click();
    await reviewer.getByText('Revision A, shown here').waitFor();
    await scheduleRow(reviewer, 'P2').waitFor();
    await reviewer.getByText('The apron was underpinned in 1974.').waitFor();
    await reviewer.getByLabel('Note to the engineer').fill('Trace the last equipotential again.');
    await signAs(reviewer, world.reviewer);
    await reviewer.getByRole('button', { name: 'Return' }).click();
    await reviewer
      .getByText(/^Returned by/)
      .first()
      .waitFor();
    const answer = await mailTo(world.engineer.email);
    expect(answer.text).toContain('Trace the last equipotential again.');
  });

  it('the reviewer holds the frozen figures against a solution and the present engine, which touches no record', async () => {
    const records = () => world.server.db.query('SELECT id, payload, payload_hash FROM revision');
    const before = await records();
    const written: string[] = [];
    reviewer.on('request', (request) => request.method() !== 'GET' && written.push(request.url()));

    await reviewer.getByRole('button', { name: 'Independent solution' }).click();
    await reviewer.getByText(/no part of the record of revision A/).waitFor();
    await reviewer.getByRole('button', { name: 'Solve the section' }).click();
    // The ground below the apron goes on without a traced end.
    await reviewer.getByText(/The outline of the section is not closed/).waitFor();

    await reviewer.getByRole('button', { name: 'Run again' }).click();
    await reviewer.getByRole('button', { name: 'Run again' }).click();
    await reviewer.getByText(/^All \d+ figures are equal to the last digit shown/).waitFor();
    expect(await records()).toEqual(before);
    expect(written.filter((url) => url.includes('/revisions'))).toEqual([]);
  });

  it('the next revision is read blind first, which then stands beside the engineer’s figures', async () => {
    await sendForChecking(engineer);
    await engineer.getByText(/^Revision B has been sent/).waitFor();
    const mail = await mailTo(world.reviewer.email, 'revision B');
    expect(mail.text).toContain('Since the revision before:');
    const answers: string[] = [];
    reviewer.on('response', async (response) => {
      if (response.url().includes('/api/')) answers.push(await response.text().catch(() => ''));
    });
    await reviewer.goto(revisionLink(mail));
    const hand = await takeDesk(reviewer);
    await reviewer.getByLabel('Drops of the whole net').fill(String(DROPS));
    // One point by its coordinates, one by a press on the sheet where the calibration gives its place.
    await reviewer.getByLabel('Read P2').check();
    await reviewer.getByLabel('Elevation z of P2').fill('92');
    await reviewer.getByLabel('Drops lost of P2').fill('3');
    await reviewer.getByLabel('Read P1').check();
    await reviewer.getByRole('button', { name: 'Place P1 on the sheet' }).click();
    await hand.click([-6, 94.5]);
    await expect
      .poll(async () => Number.parseFloat(await reviewer.getByLabel('Elevation z of P1').inputValue()))
      .toBeCloseTo(94.5, 0);
    await reviewer.getByLabel('Drops lost of P1').fill('1.5');
    expect(answers.join()).not.toMatch(/porePressure|dropsLost/);
    await reviewer.getByRole('button', { name: 'Seal the reading and show the figures' }).click();
    const beside = reviewer.getByRole('region', { name: 'Read blind' });
    await beside.getByRole('table').waitFor();
    const own = 9.81 * (HEADWATER - 3 * ((HEADWATER - TAILWATER) / DROPS) - 92);
    const point = beside.getByRole('rowgroup').filter({ hasText: 'P2' });
    const row = point.getByRole('row').filter({ hasText: /^u/ });
    expect(await row.first().textContent()).toContain(own.toFixed(1));
  });

  it('figures are ticked by key, the check list is answered, and the revision is accepted', async () => {
    await signAs(reviewer, world.reviewer);
    await reviewer.getByRole('button', { name: 'Accept', exact: true }).click();
    await reviewer.getByText(/items of the check list are not answered/).waitFor();
    const tick = (what: string) => reviewer.getByRole('checkbox', { name: `Checked: ${what}` });
    await tick('P1, elevation').focus();
    await reviewer.keyboard.press('Space');
    await reviewer.keyboard.press('ArrowRight');
    await reviewer.keyboard.press('Space');
    await tick('Title block, Drops Nd').check();
    await reviewer.getByText(/^3 of \d+ ticked$/).waitFor();
    for (const yes of await reviewer.getByRole('radio', { name: 'Yes' }).all()) await yes.check();
    // What is typed of the decision stays when a tablet is turned.
    await reviewer.setViewportSize({ width: 820, height: 1180 });
    await reviewer.setViewportSize(PHONE);
    await reviewer.setViewportSize(DESKTOP);
    expect(await reviewer.getByLabel('Your password, to sign').inputValue()).toBe(world.reviewer.password);
    await reviewer.getByText('13 of 13 answered').waitFor();
    // Kept on the server: another visit finds them.
    await expect
      .poll(async () => {
        const [draft] = await world.server.db.query(
          'SELECT cardinality(ticks) AS ticks, jsonb_array_length(answers) AS answers FROM check_draft',
        );
        return draft;
      })
      .toEqual({ ticks: 3, answers: 13 });
    await reviewer.getByRole('button', { name: 'Accept', exact: true }).click();
    await reviewer
      .getByText(/^Accepted by/)
      .first()
      .waitFor();
    const decisions = await world.server.db.query(
      'SELECT r.label, d.decision FROM decision d JOIN revision r ON r.id = d.revision_id ORDER BY r.number',
    );
    expect(decisions).toEqual([
      { label: 'A', decision: 'returned' },
      { label: 'B', decision: 'accepted' },
    ]);
  });

  it('the two revisions stand beside one another, by figures and over the same sheet', async () => {
    await reviewer.getByRole('link', { name: /^Compare: revision A/ }).click();
    await reviewer.getByRole('heading', { name: 'Compare nets', level: 1 }).waitFor();
    // The schedule of the page that is left is called as the table of the next.
    await reviewer.getByRole('application', { name: /^Sheet of .*revision A/ }).waitFor();
    const points = reviewer.getByRole('region', { name: 'Reading points' });
    const row = points.getByRole('row').filter({ hasText: 'P2' });
    await row.waitFor();
    const cells = (await row.getByRole('cell').allTextContents()).map(Number.parseFloat);
    // Elevation, total head and pressure of both, each with its difference; nothing was changed between them.
    expect(cells.slice(0, 3)).toEqual([92, 92, 0]);
    expect(cells[3]).toBe(cells[4]);
    expect([cells[5], cells[8]]).toEqual([0, 0]);
    await reviewer.getByLabel('Show', { exact: true }).selectOption('Side by side');
    await reviewer.getByText(/Both views show the same offsets and elevations/).waitFor();
    await reviewer.getByRole('application', { name: /^Sheet of .*revision B/ }).waitFor();
  });

  it('the engineer follows the mail about the acceptance and takes the signed calculation sheet', async () => {
    const mail = await mailTo(world.engineer.email, 'Accepted');
    expect(mail.text).toContain('Signed: Remi Okafor, Reviewing engineer');
    await engineer.goto(revisionLink(mail));
    const panel = engineer.getByRole('region', { name: 'Calculation sheet' });
    await panel.getByRole('button', { name: 'Calculation sheet' }).click();
    const link = panel.getByRole('link', { name: /^Download PDF/ });
    await link.waitFor({ timeout: 60_000 });
    const answer = await engineer.request.get((await link.getAttribute('href')) ?? '');
    // Where a line of the sheet ends is no matter here.
    const text = (await textOfPdf(await answer.body())).replaceAll(/\s+/g, '');
    const [{ payload_hash }] = await world.server.db.query(
      "SELECT payload_hash FROM revision WHERE label = 'B'",
    );
    expect(text).toContain(payload_hash);
    for (const signed of ['RemiOkafor', 'Reviewingengineer']) expect(text).toContain(signed);
    for (const checked of [/Readblind/, /3of\d+/, /Checklistofthedam,asitstood/])
      expect(text).toMatch(checked);
    expect(text).not.toContain('DRAFT');
  });
});

const revisionLink = ({ text = '' }: ParsedMail) => /https?:\/\/\S+\/revisions\/\S+/.exec(text)?.[0] ?? '';

/** With MAIL_FOLDER set mails are kept there, to be looked at. */
function keepToLookAt(name: string, html: string): void {
  const folder = process.env.MAIL_FOLDER;
  if (!folder) return;
  mkdirSync(folder, { recursive: true });
  writeFileSync(path.join(folder, name), html);
}

async function textOfPdf(pdf: Buffer): Promise<string> {
  const document = await getDocument({ data: new Uint8Array(pdf), verbosity: 0 }).promise;
  const pages = Array.from({ length: document.numPages }, async (_, i) => {
    const { items } = await (await document.getPage(i + 1)).getTextContent();
    return items.map((item) => ('str' in item ? item.str : '')).join(' ');
  });
  return (await Promise.all(pages)).join('\n');
}

/** The newest mail to an address whose subject says this, once it has been delivered. */
async function mailTo(address: string, subject = ''): Promise<ParsedMail> {
  const find = () =>
    smtp.received.findLast(
      (mail) => mail.subject?.includes(subject) && [mail.to].flat().some((to) => to?.text.includes(address)),
    );
  await expect.poll(find, { timeout: 15_000 }).toBeDefined();
  return find()!;
}
