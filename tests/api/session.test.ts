import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addPerson, type TestPerson } from '#tests/support/test-people.ts';

let app: TestApp;
let iris: TestPerson;

beforeAll(async () => {
  app = await createTestApp();
  iris = await addPerson(app.db, 'Iris Marsh');
});
afterAll(() => app.close());

const cookieOf = (response: { headers: Record<string, unknown> }) =>
  String((response.headers['set-cookie'] as unknown as string[] | undefined)?.[0] ?? '');

describe('a session', () => {
  it('is given to a stranger with a token for writes and nobody in it', async () => {
    const response = await app.caller().get('/session').expect(200);
    expect(response.body).toMatchObject({ person: null, can: [], demoSignIns: [], outboxReadable: true });
    expect(response.body.csrfToken).toMatch(/^[0-9a-f]{64,}$/);
    expect(cookieOf(response)).toMatch(/HttpOnly/);
    expect(cookieOf(response)).toMatch(/SameSite=Lax/);
    expect(response.headers['cache-control']).toBe('no-store');
  });

  it('refuses a write without its token', async () => {
    const caller = app.caller();
    const response = await caller.post('/session', { email: iris.email, password: iris.password });
    expect(response.status).toBe(403);
    expect(response.body.code).toBe('csrf');
  });

  it('carries the person after signing in, under a new id and with a new token', async () => {
    const caller = app.caller();
    const before = await caller.get('/session');
    caller.csrfToken = before.body.csrfToken;
    const after = await caller.post('/session', {
      email: ` ${iris.email.toUpperCase()} `,
      password: iris.password,
    });
    expect(after.status).toBe(200);
    expect(after.body.person).toEqual({ id: iris.id, name: iris.name, email: iris.email, admin: false });
    expect(after.body.csrfToken).not.toBe(before.body.csrfToken);
    expect(cookieOf(after).split(';')[0]).not.toBe(cookieOf(before).split(';')[0]);
    // The token of before is worth nothing now.
    await caller.post('/session/end-all').expect(403);
    caller.csrfToken = after.body.csrfToken;
    await caller.post('/session/end-all').expect(200);
  });

  it('ends at signing out, and the old cookie stays worthless', async () => {
    const { caller, person } = await app.signIn('Sam Out');
    expect((await caller.get('/session')).body.person.id).toBe(person.id);
    const out = await caller.delete('/session').expect(200);
    expect(out.body.person).toBeNull();
    expect((await caller.get('/session')).body.person).toBeNull();
    const rows = await app.db.query(`SELECT 1 FROM session WHERE sess -> 'passport' ->> 'user' = $1`, [
      person.id,
    ]);
    expect(rows).toEqual([]);
  });

  it('ends everywhere when asked to', async () => {
    const { caller, person } = await app.signIn('Eve Rywhere');
    const phone = app.caller();
    await phone.signIn(person.email, person.password);
    await caller.post('/session/end-all').expect(200);
    expect((await phone.get('/session')).body.person).toBeNull();
    expect((await caller.get('/session')).body.person).toBeNull();
  });

  it('ends for a person who is deactivated meanwhile', async () => {
    const { caller, person } = await app.signIn('Gone Soon');
    await app.db.getRepository(PersonEntity).update({ id: person.id }, { deactivatedAt: new Date() });
    expect((await caller.get('/session')).body.person).toBeNull();
  });

  it('offers the demo sign-ins that the seed wrote, and none in production', async () => {
    const signIns = [
      { name: 'Iris Marsh', email: 'iris@harrow-fen.example', password: 'x', part: 'engineer' },
    ];
    await writeFile(path.join(app.storageDir, 'demo-sign-ins.json'), JSON.stringify(signIns));
    expect((await app.caller().get('/session')).body.demoSignIns).toEqual(signIns);
    app.deps.config.production = true;
    const { body } = await app.caller().get('/session');
    app.deps.config.production = false;
    expect(body).toMatchObject({ demoSignIns: [], outboxReadable: false });
  });
});

describe('signing in', () => {
  const answerTo = async (email: string, password: string) => {
    const caller = app.caller();
    await caller.open();
    const { status, body } = await caller.post('/session', { email, password });
    return { status, title: body.title, detail: body.detail, code: body.code, person: body.person };
  };

  it('gives unknown, invited and deactivated people the answer of a wrong password', async () => {
    const invited = await addPerson(app.db, 'In Vited');
    await app.db.getRepository(PersonEntity).update({ id: invited.id }, { passwordHash: null });
    const gone = await addPerson(app.db, 'Gone Already');
    await app.db.getRepository(PersonEntity).update({ id: gone.id }, { deactivatedAt: new Date() });
    const wrong = await answerTo(iris.email, 'not the password');
    expect(wrong).toMatchObject({ status: 401, code: 'wrong-credentials' });
    expect(await answerTo('nobody@harrow-fen.example', 'not the password')).toEqual(wrong);
    expect(await answerTo(invited.email, invited.password)).toEqual(wrong);
    expect(await answerTo(gone.email, gone.password)).toEqual(wrong);
  });

  it('takes as long for an unknown address as for a known one', async () => {
    const { hashPassword } = await import('#server/services/password-service.ts');
    const known = await addPerson(app.db, 'Known');
    const passwordHash = await hashPassword(known.password);
    expect(passwordHash).toMatch(/^\$argon2id\$/);
    await app.db.getRepository(PersonEntity).update({ id: known.id }, { passwordHash });
    await answerTo('warm@harrow-fen.example', 'up the dummy hash');
    const timed = async (email: string) => {
      const started = performance.now();
      await answerTo(email, 'not the password');
      return performance.now() - started;
    };
    const times = { known: [] as number[], unknown: [] as number[] };
    for (let round = 0; round < 5; round++) {
      times.known.push(await timed(known.email));
      times.unknown.push(await timed(`nobody${round}@harrow-fen.example`));
    }
    // Without the dummy hash the unknown address answers in a fifth of the time; a busy machine blurs the rest.
    expect(Math.min(...times.unknown)).toBeGreaterThan(Math.min(...times.known) * 0.6);
  });

  it('stops after ten wrong passwords for one account, says when to try again, and lets colleagues in', async () => {
    const target = await addPerson(app.db, 'Target');
    const colleague = await addPerson(app.db, 'Colleague');
    const outcomes: number[] = [];
    for (let n = 0; n < 11; n++) outcomes.push((await answerTo(target.email, `wrong ${n}`)).status);
    expect(outcomes).toEqual([...Array(10).fill(401), 429]);
    const caller = app.caller();
    await caller.open();
    const refused = await caller.post('/session', { email: target.email, password: target.password });
    expect(refused.status).toBe(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(600);
    expect(refused.body.code).toBe('too-many-requests');
    expect((await answerTo(colleague.email, colleague.password)).status).toBe(200);
    // A quarter of an hour later.
    await app.db.query('UPDATE sign_in_failure SET expire = $1', [Date.now() - 1]);
    expect((await answerTo(target.email, target.password)).status).toBe(200);
  });

  it('throttles an unknown address like a known one', async () => {
    const outcomes: number[] = [];
    for (let n = 0; n < 11; n++) outcomes.push((await answerTo('ghost@harrow-fen.example', `w${n}`)).status);
    expect(outcomes.at(-1)).toBe(429);
  });

  it('lets no more through when many attempts come at once', async () => {
    const target = await addPerson(app.db, 'Rushed');
    const caller = app.caller();
    await caller.open();
    const outcomes = await Promise.all(
      Array.from({ length: 25 }, async (_, n) => {
        const one = await caller.post('/session', { email: target.email, password: `wrong ${n}` });
        return one.status;
      }),
    );
    expect(outcomes.filter((status) => status === 401)).toHaveLength(10);
  });

  it('does not count what succeeds: an office behind one address signs in all morning', async () => {
    const person = await addPerson(app.db, 'Many Times');
    for (let n = 0; n < 12; n++) expect((await answerTo(person.email, person.password)).status).toBe(200);
    const [left] = await app.db.query(`SELECT points FROM sign_in_failure WHERE key = 'address:127.0.0.1'`);
    const failed = left.points;
    expect((await answerTo(person.email, person.password)).status).toBe(200);
    const [after] = await app.db.query(`SELECT points FROM sign_in_failure WHERE key = 'address:127.0.0.1'`);
    expect(after.points).toBe(failed);
  });
});
