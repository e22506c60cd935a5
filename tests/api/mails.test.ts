import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { queueMail } from '#server/services/mail-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { mailKind } from '#shared/contract/mails.ts';
import type { Caller } from '#tests/support/caller.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { testLetter } from '#tests/support/test-letter.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

const TOKEN = 'T'.repeat(43);
let app: TestApp;
let admin: Caller;
let remi: { person: TestPerson; caller: Caller };

beforeAll(async () => {
  app = await createTestApp();
  admin = (await app.signIn('Ada Quist', { admin: true })).caller;
  remi = await app.signIn('Remi Okafor');
});
afterAll(() => app.close());

const write = (subject: string, personId: string | null = remi.person.id) =>
  inTransaction(app.deps, (tx) =>
    queueMail(tx, {
      personId,
      to: 'somebody@harrow-fen.example',
      ...testLetter({
        kind: 'passwordReset',
        subject,
        text: `http://tracehead.test/reset-password#${TOKEN}`,
        html: `<a href="http://tracehead.test/reset-password#${TOKEN}">Link</a>`,
      }),
    }),
  );
const subjects = async (caller: Caller) =>
  (await caller.get('/mails').expect(200)).body.items.map((mail: { subject: string }) => mail.subject);

describe('the mails', () => {
  it('are shown to administrators all, to others their own', async () => {
    const own = await write('to Remi');
    const other = await write('to nobody known', null);
    expect(await subjects(remi.caller)).toEqual(['to Remi']);
    expect((await subjects(admin)).slice(0, 2)).toEqual(['to nobody known', 'to Remi']);
    const seen = await remi.caller.get(`/mails/${own}`).expect(200);
    expect(seen.body).toMatchObject({ state: 'waiting', attempts: 0, to: 'somebody@harrow-fen.example' });
    await remi.caller.get(`/mails/${other}`).expect(404);
    await admin.get(`/mails/${other}`).expect(200);
    await app.caller().get('/mails').expect(401);
  });

  it('show working links in the demo only', async () => {
    const id = await write('with a link');
    expect((await admin.get(`/mails/${id}`)).body.text).toContain(TOKEN);
    app.deps.config.production = true;
    const inProduction = await admin.get(`/mails/${id}`);
    app.deps.config.production = false;
    app.deps.config.smtpUrl = 'smtp://127.0.0.1:25';
    const withServer = await admin.get(`/mails/${id}`);
    app.deps.config.smtpUrl = null;
    for (const { body } of [inProduction, withServer]) {
      expect(JSON.stringify(body)).not.toContain(TOKEN);
      expect(body.text).toContain('#(hidden)');
    }
  });

  it('are sent again by administrators only', async () => {
    const id = await write('again');
    await remi.caller.post(`/mails/${id}/send-again`).expect(403);
    app.jobs.queued.splice(0);
    await admin.post(`/mails/${id}/send-again`).expect(204);
    expect(app.jobs.queued).toEqual([{ name: 'send-mail', rowId: id, afterSeconds: 0 }]);
    await admin.post('/mails/01900000-0000-7000-8000-000000000000/send-again').expect(404);
  });

  it('that could not be delivered are counted, listed with their reason and sent again', async () => {
    const id = await write('to nowhere');
    const given = { state: 'failed' as const, attempts: 1, lastError: '550 no such mailbox' };
    await app.db.getRepository(OutboxMailEntity).update({ id }, given);
    const { body } = await admin.get('/mails?state=failed').expect(200);
    expect(body).toMatchObject({ failed: 1, items: [{ id, ...given }] });
    expect((await remi.caller.get('/mails').expect(200)).body.failed).toBe(1);
    await admin.post(`/mails/${id}/send-again`).expect(204);
    expect((await admin.get('/mails?state=failed')).body).toMatchObject({ failed: 0, items: [] });
    expect((await admin.get(`/mails/${id}`)).body).toMatchObject({ state: 'waiting', attempts: 0 });
    await admin.get('/mails?state=lost').expect(400);
  });

  it('have templates, which administrators see with sample data and nobody else', async () => {
    const { body } = await admin.get('/mail-templates').expect(200);
    const kinds = body.items.map((template: { kind: string }) => template.kind);
    expect([...kinds].sort()).toEqual([...mailKind.options].sort());
    const asked = body.items.find((template: { kind: string }) => template.kind === 'sentForChecking');
    expect(asked).toMatchObject({ mayWait: false, subject: expect.stringContaining('For checking') });
    expect(asked.html).toContain('<img src="data:image/svg+xml,');
    await remi.caller.get('/mail-templates').expect(403);
  });

  it('are listed page by page, each once', async () => {
    for (let n = 0; n < 60; n++) await write(`mail ${n}`);
    const seen: string[] = [];
    let cursor: string | null = null;
    do {
      const query: string = cursor ? `?cursor=${cursor}` : '';
      const { body } = await admin.get(`/mails${query}`).expect(200);
      seen.push(...body.items.map((mail: { id: string }) => mail.id));
      cursor = body.nextCursor;
    } while (cursor);
    expect(seen.length).toBeGreaterThan(60);
    expect(new Set(seen).size).toBe(seen.length);
  });
});
