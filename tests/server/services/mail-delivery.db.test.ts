import { setTimeout as delay } from 'node:timers/promises';
import { pino } from 'pino';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { createSendMailHandler } from '#server/jobs/handlers/send-mail.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import { createPgBossJobs } from '#server/jobs/pg-boss-jobs.ts';
import { MailRefused } from '#server/mail/mailer-port.ts';
import { createMemoryMailer } from '#server/mail/memory-mailer.ts';
import { createSmtpMailer } from '#server/mail/smtp-mailer.ts';
import {
  type DeliveryDeps,
  deliverMail,
  hideTokens,
  MAX_ATTEMPTS,
  RETRY_MINUTES,
  requeueWaitingMails,
} from '#server/services/mail-delivery.ts';
import { queueMail, sendAgain } from '#server/services/mail-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { createRecordingJobs, type RecordingJobs } from '#tests/support/recording-jobs.ts';
import { type SmtpStandIn, startSmtpStandIn } from '#tests/support/smtp-stand-in.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { testLetter } from '#tests/support/test-letter.ts';

const LETTER = testLetter();
const TO = 'remi.okafor@harrow-fen.example';

let app: TestApp;
let now = new Date('2026-12-01T09:00:00Z');
const clock = { now: () => now };
const pass = (minutes: number) => {
  now = new Date(now.getTime() + minutes * 60_000);
};

beforeAll(async () => {
  app = await createTestApp({ clock });
});
beforeEach(() => app.db.query('DELETE FROM outbox_mail'));
afterAll(() => app.close());

const write = (text = LETTER.text) =>
  inTransaction(app.deps, (tx) => queueMail(tx, { personId: null, to: TO, ...LETTER, text }));
const row = (id: string) => app.db.getRepository(OutboxMailEntity).findOneByOrFail({ id });

function delivery(overrides: Partial<DeliveryDeps> = {}) {
  const mailer = createMemoryMailer();
  const jobs: RecordingJobs = createRecordingJobs();
  const { config } = app.deps;
  const pictureOf = async () => null;
  const deps = { db: app.db, jobs, mailer, clock, config, pictureOf, forgetLinks: false, ...overrides };
  return { mailer, jobs, deps };
}

describe('a mail', () => {
  it('exists, with its wake-up, only when the change it announces is committed', async () => {
    const undone = inTransaction(app.deps, async (tx) => {
      await queueMail(tx, { personId: null, to: TO, ...LETTER });
      throw new Error('changed its mind');
    });
    await expect(undone).rejects.toThrow();
    expect(await app.db.getRepository(OutboxMailEntity).count()).toBe(0);
  });

  it('is sent once and noted, however often the worker is woken', async () => {
    const { deps, mailer } = delivery();
    const id = await write();
    await deliverMail(deps, id);
    await deliverMail(deps, id);
    expect(mailer.sent).toHaveLength(1);
    expect(await row(id)).toMatchObject({ state: 'sent', attempts: 1, sentAt: now, leaseUntil: null });
    expect(mailer.sent[0]?.messageId).toMatch(/^<[0-9a-f-]{36}@tracehead\.test>$/);
  });

  it('is sent once by two workers that take it at the same time', async () => {
    const { deps, mailer } = delivery();
    const id = await write();
    await Promise.all([deliverMail(deps, id), deliverMail(deps, id), deliverMail(deps, id)]);
    expect(mailer.sent).toHaveLength(1);
  });

  it('waits longer after each failure, keeps the reason, and is given up after ten attempts', async () => {
    const { deps, mailer, jobs } = delivery();
    const id = await write();
    for (const minutes of RETRY_MINUTES) {
      mailer.failNext(new Error('greylisted'));
      await deliverMail(deps, id);
      expect(await row(id)).toMatchObject({ state: 'waiting', lastError: 'greylisted' });
      expect(jobs.queued.at(-1)).toEqual({ name: 'send-mail', rowId: id, afterSeconds: minutes * 60 });
      // Woken too early it is not tried, only remembered.
      await deliverMail(deps, id);
      expect(jobs.queued.at(-1)?.afterSeconds).toBe(minutes * 60);
      pass(minutes);
    }
    mailer.failNext(new Error('still no'));
    await deliverMail(deps, id);
    expect(await row(id)).toMatchObject({ state: 'failed', attempts: MAX_ATTEMPTS, lastError: 'still no' });
    expect(mailer.sent).toHaveLength(0);
  });

  it('that the mail server refuses for good is given up at once, with its reason, to be sent again', async () => {
    const { deps, mailer, jobs } = delivery();
    const id = await write();
    mailer.failNext(new MailRefused('550 no such mailbox'));
    await deliverMail(deps, id);
    expect(await row(id)).toMatchObject({ state: 'failed', attempts: 1, lastError: '550 no such mailbox' });
    expect(jobs.queued).toEqual([]);
    await inTransaction(app.deps, (tx) => sendAgain(tx, id));
    await deliverMail(deps, id);
    expect(await row(id)).toMatchObject({ state: 'sent', attempts: 1, lastError: '' });
  });

  it('that was given up goes again when asked, under its own Message-ID; a sent one goes as a new mail', async () => {
    const { deps, mailer } = delivery();
    const id = await write();
    await app.db.getRepository(OutboxMailEntity).update({ id }, { state: 'failed', attempts: 10 });
    const { messageId } = await row(id);
    await inTransaction(app.deps, (tx) => sendAgain(tx, id));
    await deliverMail(deps, id);
    expect(mailer.sent.map((mail) => mail.messageId)).toEqual([messageId]);
    await inTransaction(app.deps, (tx) => sendAgain(tx, id));
    await deliverMail(deps, id);
    expect(mailer.sent[1]?.messageId).not.toBe(messageId);
  });

  it('that a worker died with is sent again under the same Message-ID once its lease is over', async () => {
    const id = await write();
    const crashed = delivery();
    const sent: string[] = [];
    // The server took it, and the process ended before that was noted.
    const dying = {
      ...crashed.deps,
      mailer: {
        ...crashed.mailer,
        send: async (mail: { messageId: string }) => {
          sent.push(mail.messageId);
          await new Promise(() => {});
        },
      },
    };
    void deliverMail(dying, id);
    while (sent.length === 0) await delay(10);
    const next = delivery();
    await requeueWaitingMails(next.deps);
    expect(next.jobs.queued).toEqual([{ name: 'send-mail', rowId: id, afterSeconds: 180 }]);
    await deliverMail(next.deps, id);
    expect(next.mailer.sent).toHaveLength(0);
    pass(4);
    await deliverMail(next.deps, id);
    expect(next.mailer.sent.map((mail) => mail.messageId)).toEqual(sent);
    expect(await row(id)).toMatchObject({ state: 'sent', attempts: 2 });
  });

  it('keeps no working link after it was sent to a real mailbox', async () => {
    const token = 'A'.repeat(43);
    const { deps, mailer } = delivery({ forgetLinks: true });
    const id = await write(`Follow http://tracehead.test/invitation#${token}\nand go on.`);
    await deliverMail(deps, id);
    expect(mailer.sent[0]?.text).toContain(token);
    expect((await row(id)).text).toBe('Follow http://tracehead.test/invitation#(hidden)\nand go on.');
    await expect(inTransaction(app.deps, (tx) => sendAgain(tx, id))).rejects.toMatchObject({
      code: 'conflict',
    });
  });

  it('keeps fragments that are no tokens', () => {
    expect(hideTokens('see #section-b and #P1')).toBe('see #section-b and #P1');
  });
});

describe('the worker and a real mail server', () => {
  const logger = pino({ level: 'silent' });
  let jobs: JobsPort;
  let server: SmtpStandIn | undefined;

  async function work(smtpUrl: string): Promise<void> {
    now = new Date();
    jobs = createPgBossJobs({ url: app.database.appUrl, logger });
    const mailer = createSmtpMailer({ smtpUrl, from: 'Tracehead <tracehead@harrow-fen.example>' });
    const deps = { ...app.deps, jobs, mailer, clock: { now: () => new Date() }, forgetLinks: false };
    await jobs.start({
      'render-drawing': async () => {},
      'send-mail': createSendMailHandler(deps),
      'make-calculation-sheet': async () => {},
      'make-rendition': async () => {},
      'remind-reviewers': async () => {},
      'send-digest': async () => {},
    });
  }
  const writeReal = () =>
    inTransaction({ ...app.deps, jobs, clock: { now: () => new Date() } }, (tx) =>
      queueMail(tx, { personId: null, to: TO, ...LETTER }),
    );
  const until = async (isTrue: () => boolean | Promise<boolean>, seconds = 20) => {
    const end = Date.now() + seconds * 1000;
    while (!(await isTrue())) {
      if (Date.now() > end) throw new Error(`It did not happen within ${seconds} s.`);
      await delay(50);
    }
  };
  afterEach(async () => {
    await jobs.stop(1000);
    await server?.close();
    server = undefined;
  });

  it('deliver it within seconds of the change', async () => {
    server = await startSmtpStandIn();
    await work(server.url);
    const id = await writeReal();
    await until(() => server?.received.length === 1);
    expect(server.received[0]?.subject).toBe(LETTER.subject);
    await until(async () => (await row(id)).state === 'sent');
    expect((await row(id)).messageId).toBe(server.received[0]?.messageId);
  });

  it('try again what was refused, and go on when the server comes back', async () => {
    const first = await startSmtpStandIn();
    first.refuse(1, 451, 'greylisted, come back later');
    await work(first.url);
    const id = await writeReal();
    await until(async () => (await row(id)).lastError.includes('greylisted'));
    // The server goes away, and the time comes: the mail waits.
    await first.close();
    const due = () => app.db.getRepository(OutboxMailEntity).update({ id }, { nextAttemptAt: new Date(0) });
    await due();
    await jobs.enqueue(app.db.manager, 'send-mail', id);
    await until(async () => (await row(id)).lastError.includes('ECONNREFUSED'));
    expect(await row(id)).toMatchObject({ state: 'waiting', attempts: 2 });
    server = await startSmtpStandIn({ port: Number(new URL(first.url).port) });
    await due();
    await jobs.enqueue(app.db.manager, 'send-mail', id);
    await until(() => server?.received.length === 1);
    await until(async () => (await row(id)).state === 'sent');
    expect((await row(id)).attempts).toBe(3);
  });
});
