import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { MailDigestEntity, OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { createMemoryMailer } from '#server/mail/memory-mailer.ts';
import { requeueDigests } from '#server/services/digest-queue.ts';
import { deliverMail } from '#server/services/mail-delivery.ts';
import { makeDigest } from '#server/services/make-digest.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import type { MailChoiceDto, MailTiming } from '#shared/contract/mails.ts';
import { addNet, type NetPlaceFixture } from '#tests/support/net-fixture.ts';
import { createRecordingJobs } from '#tests/support/recording-jobs.ts';
import {
  addRolePerson,
  readyToDecide,
  readyToSend,
  SIGNATURE,
  type SignedIn,
  sendInputFor,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

/** A reader in Vienna, who has seven o'clock at 06:00 UTC in December. */
const ZONE = 'Europe/Vienna';
const EVENING = new Date('2026-12-01T18:00:00Z');
const MORNING = '2026-12-02T06:00:00.000Z';

let app: TestApp;
let now = EVENING;
beforeAll(async () => {
  app = await createTestApp({ clock: { now: () => now } });
});
beforeEach(() => {
  now = EVENING;
});
afterAll(() => app.close());

let scenes = 0;
/** Names part the readers: A, B, C … */
function nextLetter(): string {
  scenes += 1;
  return String.fromCharCode('A'.charCodeAt(0) + scenes);
}

interface Scene {
  net: NetPlaceFixture;
  reader: SignedIn;
}
/** A net, and a colleague who has chosen how notices come. */
async function scene(timing: MailTiming): Promise<Scene> {
  const net = await addNet(app);
  const reader = await addRolePerson(app, net.damId, `Reader ${nextLetter()}`, 'colleague');
  await choose(reader, timing);
  return { net, reader };
}
const choose = async ({ caller }: SignedIn, timing: MailTiming, timeZone = ZONE): Promise<MailChoiceDto> =>
  (await caller.put('/me/mail-choice', { timing, timeZone }).expect(200)).body;
const choiceOf = async ({ caller }: SignedIn): Promise<MailChoiceDto> =>
  (await caller.get('/me/mail-choice').expect(200)).body;
const nameIn = ({ net, reader }: Scene, text: string) =>
  net.caller
    .post(`/nets/${net.netId}/notes`, {
      id: uuidv7(),
      anchor: { on: 'drawing' },
      text: `@${reader.person.name} ${text}`,
    })
    .expect(201);
const mailsOf = ({ person }: SignedIn) =>
  app.db
    .getRepository(OutboxMailEntity)
    .find({ where: { personId: person.id }, order: { createdAt: 'ASC', id: 'ASC' } });
const statesOf = async (reader: SignedIn) => (await mailsOf(reader)).map(({ kind, state }) => [kind, state]);
const digestsOf = ({ person }: SignedIn) =>
  app.db.getRepository(MailDigestEntity).findBy({ personId: person.id });
async function make(reader: SignedIn): Promise<void> {
  for (const { id } of await digestsOf(reader)) await inTransaction(app.deps, (tx) => makeDigest(tx, id));
}
async function deliver(mailId: string) {
  const mailer = createMemoryMailer();
  const pictureOf = async () => null;
  await deliverMail({ ...app.deps, mailer, pictureOf, forgetLinks: true }, mailId);
  return mailer.sent[0];
}

describe('a notice for somebody who wants a daily digest', () => {
  it('is held in the transaction that writes it, and the digest is woken for the reader’s morning', async () => {
    const at = await scene('daily');
    app.jobs.queued.splice(0);
    await nameIn(at, 'was the drain open?');
    expect(await statesOf(at.reader)).toEqual([['namedInNote', 'held']]);
    const [digest] = await digestsOf(at.reader);
    expect(digest?.dueAt.toISOString()).toBe(MORNING);
    expect(app.jobs.queued).toEqual([{ name: 'send-digest', rowId: digest?.id, afterSeconds: 12 * 3600 }]);
    expect(await choiceOf(at.reader)).toEqual({
      timing: 'daily',
      timeZone: ZONE,
      nextDigestAt: MORNING,
      held: 1,
    });
  });

  it('comes with all others in one mail, in their order, each with its link', async () => {
    const at = await scene('daily');
    await nameIn(at, 'first');
    now = new Date(now.getTime() + 60_000);
    await nameIn(at, 'second');
    // Woken too early nothing is sent, only remembered.
    app.jobs.queued.splice(0);
    await make(at.reader);
    expect(app.jobs.queued).toEqual([expect.objectContaining({ name: 'send-digest', afterSeconds: 43140 })]);
    now = new Date(MORNING);
    await make(at.reader);
    const mails = await mailsOf(at.reader);
    expect(mails.map(({ kind, state }) => [kind, state])).toEqual([
      ['namedInNote', 'inDigest'],
      ['namedInNote', 'inDigest'],
      ['digest', 'waiting'],
    ]);
    const digest = mails[2]!;
    expect(digest.subject).toBe('Daily digest of 2 December 2026: 2 notices');
    expect(digest.text).toMatch(
      /1\. Note 1 names you: [\s\S]*first[\s\S]*2\. Note 2 names you: [\s\S]*second/,
    );
    expect(
      digest.text.match(new RegExp(`http://tracehead.test/nets/${at.net.netId}#note-`, 'g')),
    ).toHaveLength(2);
    expect(app.jobs.queued).toContainEqual({ name: 'send-mail', rowId: digest.id, afterSeconds: 0 });
  });

  it('is told once, however many workers make the digest and however often they start', async () => {
    const at = await scene('daily');
    await nameIn(at, 'only once');
    now = new Date(MORNING);
    await Promise.all([make(at.reader), make(at.reader), make(at.reader)]);
    const jobs = createRecordingJobs();
    await requeueDigests({ ...app.deps, jobs });
    await make(at.reader);
    expect((await mailsOf(at.reader)).filter(({ kind }) => kind === 'digest')).toHaveLength(1);
    const [done] = await digestsOf(at.reader);
    expect(jobs.queued.map(({ rowId }) => rowId)).not.toContain(done?.id);
  });

  it('is neither told nor lost when the making of the digest is taken back', async () => {
    const at = await scene('daily');
    await nameIn(at, 'kept');
    now = new Date(MORNING);
    const [digest] = await digestsOf(at.reader);
    const failing = inTransaction(app.deps, async (tx) => {
      await makeDigest(tx, digest?.id ?? '');
      throw new Error('the server ended here');
    });
    await expect(failing).rejects.toThrow();
    expect(await statesOf(at.reader)).toEqual([['namedInNote', 'held']]);
    const jobs = createRecordingJobs();
    await requeueDigests({ ...app.deps, jobs });
    expect(jobs.queued).toContainEqual({ name: 'send-digest', rowId: digest?.id, afterSeconds: 0 });
    await make(at.reader);
    expect((await statesOf(at.reader)).at(-1)).toEqual(['digest', 'waiting']);
  });

  it('that comes after the digest was made begins the next one', async () => {
    const at = await scene('daily');
    await nameIn(at, 'yesterday');
    now = new Date(MORNING);
    await make(at.reader);
    await nameIn(at, 'today');
    expect(await choiceOf(at.reader)).toMatchObject({ held: 1, nextDigestAt: '2026-12-03T06:00:00.000Z' });
  });

  it('of two writers at once is held by one digest', async () => {
    const at = await scene('daily');
    await Promise.all(Array.from({ length: 6 }, (_, n) => nameIn(at, `at once ${n}`)));
    expect(await digestsOf(at.reader)).toHaveLength(1);
    expect((await choiceOf(at.reader)).held).toBe(6);
  });

  it('of a dam that the reader was taken off is not told any more', async () => {
    const at = await scene('daily');
    const elsewhere = { net: await addNet(app), reader: at.reader };
    await app.db.query(`INSERT INTO membership (dam_id, person_id, roles) VALUES ($1, $2, '{colleague}')`, [
      elsewhere.net.damId,
      at.reader.person.id,
    ]);
    await nameIn(at, 'a secret of this dam');
    await nameIn(elsewhere, 'for those of the other dam');
    await at.net.caller.delete(`/dams/${at.net.damId}/members/${at.reader.person.id}`).expect(204);
    now = new Date(MORNING);
    await make(at.reader);
    const digest = (await mailsOf(at.reader)).find(({ kind }) => kind === 'digest');
    expect(digest?.text).toContain('for those of the other dam');
    expect(digest?.text).not.toContain('a secret of this dam');
    expect((await statesOf(at.reader)).filter(([, state]) => state === 'dropped')).toHaveLength(1);
  });
});

describe('what asks something of the reader', () => {
  it('never waits: a net to check comes at once, and so does a returned one', async () => {
    const place = await readyToSend(app);
    const engineer = { person: place.engineer, caller: place.caller };
    for (const person of [place.reviewer, engineer]) await choose(person, 'daily');
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    expect(await statesOf(place.reviewer)).toEqual([['sentForChecking', 'waiting']]);
    await readyToDecide(place.reviewer.caller, input.id);
    await place.reviewer.caller
      .post(`/revisions/${input.id}/decision`, { decision: 'returned', note: 'See line 3.', ...SIGNATURE })
      .expect((response) => expect(response.status, response.text).toBeLessThan(300));
    expect(await statesOf(engineer)).toEqual([['returned', 'waiting']]);
  });
});

describe('a changed choice', () => {
  it('is for what waits already: at once means now', async () => {
    const at = await scene('daily');
    await nameIn(at, 'waits');
    expect(await choose(at.reader, 'atOnce')).toMatchObject({ held: 1, nextDigestAt: EVENING.toISOString() });
    await make(at.reader);
    expect(await statesOf(at.reader)).toEqual([
      ['namedInNote', 'inDigest'],
      ['digest', 'waiting'],
    ]);
    await nameIn(at, 'comes by itself');
    expect((await statesOf(at.reader)).at(-1)).toEqual(['namedInNote', 'waiting']);
  });

  it('of the clock moves the digest', async () => {
    const at = await scene('daily');
    await nameIn(at, 'waits');
    expect((await choose(at.reader, 'daily', 'America/New_York')).nextDigestAt).toBe(
      '2026-12-02T12:00:00.000Z',
    );
    await at.reader.caller.put('/me/mail-choice', { timing: 'daily', timeZone: 'Nowhere/Land' }).expect(400);
  });

  it('to none keeps what is written unsent, to be found by administrators', async () => {
    const at = await scene('off');
    await nameIn(at, 'unsent');
    expect(await statesOf(at.reader)).toEqual([['namedInNote', 'dropped']]);
  });
});

describe('the link in a digest', () => {
  async function stopUrlOf(reader: SignedIn): Promise<URL> {
    const digest = (await mailsOf(reader)).find(({ kind }) => kind === 'digest');
    const sent = await deliver(digest?.id ?? '');
    const url = new URL(sent?.stopUrl ?? '');
    // In the mail itself stands the page.
    expect(sent?.text).toContain(`http://tracehead.test/stop-digest${url.search}`);
    return url;
  }
  async function withDigest(): Promise<Scene & { url: string }> {
    const at = await scene('daily');
    await nameIn(at, 'told');
    now = new Date(MORNING);
    await make(at.reader);
    const { pathname, search } = await stopUrlOf(at.reader);
    return { ...at, url: `${app.address}${pathname}${search}` };
  }

  it('stops the digests by one request without a sign-in, as a mail program sends it', async () => {
    const { url, ...at } = await withDigest();
    await nameIn(at, 'held for tomorrow');
    const body = new URLSearchParams({ 'List-Unsubscribe': 'One-Click' });
    const answer = await fetch(url, { method: 'POST', body, redirect: 'error' });
    expect(answer.status).toBe(204);
    expect((await choiceOf(at.reader)).timing).toBe('off');
    await make(at.reader);
    expect((await statesOf(at.reader)).slice(-1)).toEqual([['namedInNote', 'dropped']]);
    // Again is no error: mail programs repeat.
    expect((await fetch(url, { method: 'POST' })).status).toBe(204);
  });

  it('leads a browser to the page and stops nothing by being opened', async () => {
    const { url, reader } = await withDigest();
    const answer = await fetch(url, { redirect: 'manual' });
    expect(answer.status).toBe(303);
    expect(answer.headers.get('location')).toMatch(/^http:\/\/tracehead\.test\/stop-digest\?token=/);
    expect((await choiceOf(reader)).timing).toBe('daily');
  });

  it('changes nothing for who gets notices at once meanwhile, nor under another name', async () => {
    const { url, reader } = await withDigest();
    await choose(reader, 'atOnce');
    await fetch(url, { method: 'POST' });
    expect((await choiceOf(reader)).timing).toBe('atOnce');
    const forged = url.replace(reader.person.id, uuidv7());
    const answer = await fetch(forged, { method: 'POST' });
    expect(answer.status).toBe(410);
    expect((await answer.json()).code).toBe('token-invalid');
  });

  it('stands in no other mail', async () => {
    const at = await scene('atOnce');
    await nameIn(at, 'at once');
    const [mail] = await mailsOf(at.reader);
    expect(await deliver(mail?.id ?? '')).toMatchObject({ stopUrl: null });
  });
});
