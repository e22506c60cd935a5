import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { createSendMailHandler } from '#server/jobs/handlers/send-mail.ts';
import { createMemoryMailer } from '#server/mail/memory-mailer.ts';
import { tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import { type ReadyNet, readyToSend, sendInputFor } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

/** The sheet's finest tiles, of blank paper. */
async function layTiles(sheetId: string): Promise<string> {
  const sheet = await app.db.getRepository(SheetEntity).findOneByOrFail({ id: sheetId });
  const size = sheet.tileSizePx;
  const tile = await sharp({ create: { width: size, height: size, channels: 3, background: '#fff' } })
    .png()
    .toBuffer();
  const prefix = tilePrefix(sheetId, sheet.rendition);
  for (let x = 0; x * size < sheet.widthPx; x += 1)
    for (let y = 0; y * size < sheet.heightPx; y += 1) {
      const file = path.join(app.storageDir, tileKey(prefix, sheet.maxZoom, x, y, sheet.tileFormat));
      mkdirSync(path.dirname(file), { recursive: true });
      writeFileSync(file, tile);
    }
  return path.join(app.storageDir, prefix);
}

async function mailedFor(place: ReadyNet, more: object = {}) {
  const input = { ...(await sendInputFor(place, place.reviewer.person.id)), ...more };
  await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  const mail = await app.db
    .getRepository(OutboxMailEntity)
    .findOneByOrFail({ personId: place.reviewer.person.id, revisionId: input.id });
  const mailer = createMemoryMailer();
  const send = createSendMailHandler({ ...app.deps, mailer, forgetLinks: false });
  await send(mail.id, new AbortController().signal);
  return mailer.sent[0]!;
}

describe('the mail to the reviewer', () => {
  it('brings a small picture of the section, named for who does not see it', async () => {
    const place = await readyToSend(app);
    await layTiles(place.sheetId);
    const sent = await mailedFor(place);
    const [picture] = sent.pictures;
    expect(picture?.jpeg.length).toBeLessThanOrEqual(150_000);
    const { format, width = 0, height = 0 } = await sharp(picture?.jpeg).metadata();
    expect(format).toBe('jpeg');
    expect(Math.min(width, height)).toBeGreaterThan(100);
    expect(sent.html).toContain(`<img src="cid:${picture?.contentId}"`);
    expect(sent.html).toMatch(
      /alt="Section B–B as frozen with revision A: the traced net over the scan, with \d+ equipotentials, \d+ flow lines, \d+ reading points?\."/,
    );
    // The traces are coloured, the paper is not.
    const { channels } = await sharp(picture?.jpeg).stats();
    expect(Math.abs((channels[0]?.mean ?? 0) - (channels[2]?.mean ?? 0))).toBeGreaterThan(0.05);
  });

  it('goes without the picture when the sheet’s tiles are away, and says nothing of one', async () => {
    const place = await readyToSend(app);
    rmSync(await layTiles(place.sheetId), { recursive: true });
    const sent = await mailedFor(place);
    expect(sent.pictures).toEqual([]);
    expect(sent.html).not.toMatch(/<img|cid:|picture|<!--/);
    expect(sent.text).not.toMatch(/picture/i);
    expect(sent.text).toContain('Pore pressure');
  });

  it('tells no figures to who is to read the net alone first', async () => {
    const place = await readyToSend(app);
    const sent = await mailedFor(place, { blindFirst: true });
    for (const part of [sent.text, sent.html]) {
      expect(part).not.toMatch(/Pore pressure|figures above/);
      expect(part).toContain('/revisions/');
    }
  });
});
