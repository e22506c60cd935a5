import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PersonEntity, PersonTokenEntity } from '#server/entities/person-entity.ts';
import type { Caller } from '#tests/support/caller.ts';
import { mailsTo, tokenMailedTo } from '#tests/support/mail-links.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addPerson, type TestPerson } from '#tests/support/test-people.ts';

let app: TestApp;
let admin: Caller;
let ada: TestPerson;
let now = new Date('2026-12-01T09:00:00Z');
const later = (minutes: number) => {
  now = new Date(now.getTime() + minutes * 60_000);
};

beforeAll(async () => {
  app = await createTestApp({ clock: { now: () => now } });
  const signedIn = await app.signIn('Ada Quist', { admin: true });
  admin = signedIn.caller;
  ada = signedIn.person;
});
afterAll(() => app.close());

const stranger = async () => {
  const caller = app.caller();
  await caller.open();
  return caller;
};
const NEW_PASSWORD = 'another long password';

describe('what happens apart from every dam', () => {
  it('is listed, newest first, to admins only', async () => {
    const email = 'ivo.marsh@harrow-fen.example';
    later(1);
    await admin.post('/people/invitations', { email, admin: false }).expect(201);
    await app.db.query('INSERT INTO event (id, dam_id, type, text) VALUES ($1, $2, $3, $4)', [
      uuidv7(),
      await addDam(app.db, ada.id),
      'dam.created',
      'made a dam',
    ]);
    const { items } = (await admin.get('/events').expect(200)).body;
    expect(items[0]).toMatchObject({ person: { name: ada.name }, drawingId: null, netId: null });
    expect(items[0].text).toContain(email);
    const rows = await app.db.query('SELECT id FROM event WHERE dam_id IS NOT NULL');
    expect(rows.length).toBeGreaterThan(0);
    const ids = items.map((item: { id: string }) => item.id);
    for (const { id } of rows) expect(ids).not.toContain(id);
    const member = await app.signIn('Nora Fell');
    await member.caller.get('/events').expect(403);
  });
});

describe('an invitation', () => {
  it('is mailed, looked up, accepted once, and signs the person in', async () => {
    const email = 'tove.lind@harrow-fen.example';
    const invited = await admin.post('/people/invitations', { email, admin: false }).expect(201);
    expect(invited.body).toMatchObject({ email, state: 'invited', admin: false });
    const [mail] = await mailsTo(app, email);
    expect(app.jobs.queued).toContainEqual({ name: 'send-mail', rowId: mail?.id, afterSeconds: 0 });
    const token = await tokenMailedTo(app, email);
    const caller = await stranger();
    const seen = await caller.post('/invitations/look-up', { token }).expect(200);
    expect(seen.body).toEqual({ email, invitedBy: ada.name, damName: null });
    const accepted = await caller
      .post('/invitations/accept', { token, name: 'Tove Lind', password: NEW_PASSWORD })
      .expect(200);
    expect(accepted.body.person).toMatchObject({ name: 'Tove Lind', email });
    expect((await caller.get('/session')).body.person.email).toBe(email);
    const again = await (await stranger()).post('/invitations/accept', {
      token,
      name: 'Somebody Else',
      password: NEW_PASSWORD,
    });
    expect(again.status).toBe(410);
    expect(again.body.code).toBe('token-invalid');
  });

  it('is given to only one of two who accept at once', async () => {
    const email = 'twice@harrow-fen.example';
    await admin.post('/people/invitations', { email, admin: false }).expect(201);
    const token = await tokenMailedTo(app, email);
    const callers = await Promise.all([stranger(), stranger()]);
    const outcomes = await Promise.all(
      callers.map(async (caller, n) => {
        const body = { token, name: `Person ${n}`, password: NEW_PASSWORD };
        return (await caller.post('/invitations/accept', body)).status;
      }),
    );
    expect(outcomes.sort()).toEqual([200, 410]);
  });

  it('keeps only a hash of its token', async () => {
    const email = 'hashed@harrow-fen.example';
    await admin.post('/people/invitations', { email, admin: false }).expect(201);
    const token = await tokenMailedTo(app, email);
    const rows = await app.db.getRepository(PersonTokenEntity).find();
    expect(JSON.stringify(rows)).not.toContain(token);
    expect(rows.every((row) => /^[0-9a-f]{64}$/.test(row.tokenHash))).toBe(true);
  });

  it('expires after seven days, and a second one replaces it', async () => {
    const email = 'late@harrow-fen.example';
    await admin.post('/people/invitations', { email, admin: false }).expect(201);
    const first = await tokenMailedTo(app, email);
    await admin.post('/people/invitations', { email, admin: true }).expect(201);
    const second = await tokenMailedTo(app, email);
    const caller = await stranger();
    await caller.post('/invitations/look-up', { token: first }).expect(410);
    later(7 * 24 * 60 - 1);
    await caller.post('/invitations/look-up', { token: second }).expect(200);
    later(2);
    await caller.post('/invitations/look-up', { token: second }).expect(410);
  });

  it('is refused for somebody who signs in already and for a password too short', async () => {
    const again = await admin.post('/people/invitations', { email: ada.email, admin: false });
    expect([again.status, again.body.code]).toEqual([409, 'already-exists']);
    const email = 'short@harrow-fen.example';
    await admin.post('/people/invitations', { email, admin: false }).expect(201);
    const token = await tokenMailedTo(app, email);
    const caller = await stranger();
    await caller.post('/invitations/accept', { token, name: 'S', password: 'short' }).expect(400);
    await caller.post('/invitations/accept', { token, name: ' ', password: NEW_PASSWORD }).expect(400);
    await caller.post('/invitations/accept', { token, name: 'S', password: NEW_PASSWORD }).expect(200);
  });

  it('is written by administrators only', async () => {
    const { caller } = await app.signIn('Plain Member');
    await caller.post('/people/invitations', { email: 'x@harrow-fen.example', admin: true }).expect(403);
    await (await stranger()).post('/people/invitations', { email: 'x@y.example', admin: true }).expect(401);
  });
});

describe('a forgotten password', () => {
  it('answers alike for known, unknown, invited and deactivated addresses, and mails only the known', async () => {
    const known = await addPerson(app.db, 'Forgetful');
    const gone = await addPerson(app.db, 'Gone');
    await app.db.getRepository(PersonEntity).update({ id: gone.id }, { deactivatedAt: now });
    const caller = await stranger();
    for (const email of [known.email, gone.email, 'nobody@harrow-fen.example', 'hashed@harrow-fen.example']) {
      const { status, text } = await caller.post('/password-resets', { email });
      expect([status, text]).toEqual([202, '']);
    }
    expect(await mailsTo(app, known.email)).toHaveLength(1);
    expect(await mailsTo(app, gone.email)).toHaveLength(0);
    expect(await mailsTo(app, 'nobody@harrow-fen.example')).toHaveLength(0);
    // The invited person has the mail of the invitation and no second one.
    expect(await mailsTo(app, 'hashed@harrow-fen.example')).toHaveLength(1);
  });

  it('is replaced once through the link, which ends every session', async () => {
    const { person, caller } = await app.signIn('Resetting');
    await (await stranger()).post('/password-resets', { email: person.email }).expect(202);
    const token = await tokenMailedTo(app, person.email);
    const other = await stranger();
    await other.post('/password-resets/complete', { token, password: NEW_PASSWORD }).expect(204);
    expect((await caller.get('/session')).body.person).toBeNull();
    await other.post('/password-resets/complete', { token, password: NEW_PASSWORD }).expect(410);
    await other.post('/session', { email: person.email, password: person.password }).expect(401);
    await other.post('/session', { email: person.email, password: NEW_PASSWORD }).expect(200);
  });

  it('has a link that lives for an hour and is no invitation', async () => {
    const person = await addPerson(app.db, 'Slow Reader');
    const caller = await stranger();
    await caller.post('/password-resets', { email: person.email }).expect(202);
    const token = await tokenMailedTo(app, person.email);
    await caller.post('/invitations/accept', { token, name: 'N', password: NEW_PASSWORD }).expect(410);
    later(61);
    await caller.post('/password-resets/complete', { token, password: NEW_PASSWORD }).expect(410);
  });

  it('mails one account three times at most in a quarter of an hour, without saying so', async () => {
    const person = await addPerson(app.db, 'Flooded');
    const caller = await stranger();
    for (let n = 0; n < 5; n++) await caller.post('/password-resets', { email: person.email }).expect(202);
    expect(await mailsTo(app, person.email)).toHaveLength(3);
  });
});

describe('one’s own account', () => {
  it('changes the password with the current one, and only the other sessions end', async () => {
    const { person, caller } = await app.signIn('Careful');
    const phone = app.caller();
    await phone.signIn(person.email, person.password);
    const wrong = await caller.post('/me/password', { current: 'not it at all', next: NEW_PASSWORD });
    expect([wrong.status, wrong.body.code]).toEqual([422, 'wrong-credentials']);
    await caller.post('/me/password', { current: person.password, next: NEW_PASSWORD }).expect(204);
    expect((await caller.get('/session')).body.person.id).toBe(person.id);
    expect((await phone.get('/session')).body.person).toBeNull();
    await phone.signIn(person.email, NEW_PASSWORD);
  });

  it('changes the name', async () => {
    const { caller } = await app.signIn('Old Name');
    const { body } = await caller.patch('/me', { name: ' New Name ' }).expect(200);
    expect(body.name).toBe('New Name');
    expect((await caller.get('/session')).body.person.name).toBe('New Name');
  });
});

describe('keeping people', () => {
  it('lists everyone with their state, to administrators only', async () => {
    const { body } = await admin.get('/people').expect(200);
    const states = new Map<string, string>(
      body.items.map((each: { email: string; state: string }) => [each.email, each.state]),
    );
    expect(states.get(ada.email)).toBe('active');
    expect(states.get('late@harrow-fen.example')).toBe('invited');
    expect(JSON.stringify(body)).not.toMatch(/argon|passwordHash/i);
    const { caller } = await app.signIn('Curious');
    await caller.get('/people').expect(403);
  });

  it('ends a sign-in with its sessions and links, and lets it live again', async () => {
    const { person, caller } = await app.signIn('On Leave');
    await (await stranger()).post('/password-resets', { email: person.email }).expect(202);
    const token = await tokenMailedTo(app, person.email);
    const { body } = await admin.patch(`/people/${person.id}`, { active: false }).expect(200);
    expect(body.state).toBe('deactivated');
    expect((await caller.get('/session')).body.person).toBeNull();
    expect(app.live.published).toContainEqual({ type: 'person', personId: person.id });
    const other = await stranger();
    await other.post('/password-resets/complete', { token, password: NEW_PASSWORD }).expect(410);
    await other.post('/session', { email: person.email, password: person.password }).expect(401);
    await admin.patch(`/people/${person.id}`, { active: true }).expect(200);
    await other.post('/session', { email: person.email, password: person.password }).expect(200);
  });

  it('refuses to end one’s own sign-in and to leave no administrator', async () => {
    await admin.patch(`/people/${ada.id}`, { active: false }).expect(409);
    await admin.patch(`/people/${ada.id}`, { admin: false }).expect(409);
    const { person } = await app.signIn('Second Admin');
    const made = await admin.patch(`/people/${person.id}`, { admin: true }).expect(200);
    expect(made.body.admin).toBe(true);
    await admin.patch(`/people/${person.id}`, { admin: false }).expect(200);
  });

  it('lets one of two administrators stay who remove each other at once', async () => {
    const second = await app.signIn('Other Admin', { admin: true });
    const outcomes = await Promise.all([
      admin.patch(`/people/${second.person.id}`, { admin: false }),
      second.caller.patch(`/people/${ada.id}`, { admin: false }),
    ]);
    const admins = await app.db.getRepository(PersonEntity).countBy({ admin: true });
    expect(outcomes.filter((each) => each.status === 200).length).toBeLessThanOrEqual(1);
    expect(admins).toBeGreaterThanOrEqual(1);
    await app.db.getRepository(PersonEntity).update({ id: ada.id }, { admin: true });
  });

  it('answers 404 for a person who is not there', async () => {
    await admin.patch('/people/01900000-0000-7000-8000-000000000000', { active: false }).expect(404);
  });
});
