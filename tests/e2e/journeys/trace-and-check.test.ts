import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
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
    const link = /https?:\/\/\S+\/revisions\/\S+/.exec(mail.text ?? '')?.[0] ?? '';

    reviewer = await world.pageOf(world.reviewer);
    await reviewer.goto(link);
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

  it('the next revision is accepted; the one before it stays as it was', async () => {
    await sendForChecking(engineer);
    await engineer.getByText(/^Revision B has been sent/).waitFor();
    const [revisionB] = await world.server.db.query("SELECT id FROM revision WHERE label = 'B'");
    await reviewer.goto(`/revisions/${revisionB.id}`);
    await signAs(reviewer, world.reviewer);
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
});

/** The newest mail to an address, once it has been delivered. */
async function mailTo(address: string) {
  const find = () =>
    smtp.received.findLast((mail) => [mail.to].flat().some((to) => to?.text.includes(address)));
  await expect.poll(find, { timeout: 15_000 }).toBeDefined();
  return find()!;
}
