import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { EventEntity } from '#server/entities/dam-entity.ts';
import { allowsOnDam } from '#server/policies/dam-policy.ts';
import { listEvents } from '#server/services/event-queries.ts';
import { writeEvent } from '#server/services/event-writer.ts';
import { damRole } from '#shared/contract/actions.ts';
import type { Caller } from '#tests/support/caller.ts';
import { mailsTo, tokenMailedTo } from '#tests/support/mail-links.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember, addPerson, type TestPerson } from '#tests/support/test-people.ts';

let app: TestApp;
let admin: Caller;
let ada: TestPerson;

beforeAll(async () => {
  app = await createTestApp();
  const signedIn = await app.signIn('Ada Quist', { admin: true });
  admin = signedIn.caller;
  ada = signedIn.person;
});
afterAll(() => app.close());

const HARROW_FEN = {
  name: 'Harrow Fen Dam',
  unitSystem: 'SI',
  datum: 'local datum LD',
  fullSupplyLevel: 118,
  gammaW: 9.81,
};

/** A dam of its own with an engineer who is signed in. */
async function damWithEngineer(name = 'Engineer') {
  const damId = await addDam(app.db, ada.id);
  const { person, caller } = await app.signIn(name);
  await addMember(app.db, damId, person.id, 'engineer');
  return { damId, person, caller };
}

describe('a dam', () => {
  it('is entered by an administrator and announced', async () => {
    const { body } = await admin.post('/dams', HARROW_FEN).expect(201);
    expect(body).toMatchObject({
      ...HARROW_FEN,
      archivedAt: null,
      roles: [],
      drawingCount: 0,
      openNoteCount: 0,
      unreadNoteCount: 0,
    });
    expect(body.can).toContain('dam.edit');
    expect(body.can).not.toContain('net.trace');
    expect(app.live.published).toContainEqual({ type: 'dam', damId: body.id });
    const events = await admin.get(`/dams/${body.id}/events`).expect(200);
    expect(events.body.items).toMatchObject([{ type: 'dam.created', person: { name: ada.name } }]);
  });

  it('is not entered by a member', async () => {
    const { caller } = await app.signIn('Member');
    await caller.post('/dams', HARROW_FEN).expect(403);
  });

  it.each([
    ['SI', 62.4],
    ['US', 9.81],
    ['SI', 1000],
  ])('in %s units refuses a unit weight of water of %d', async (unitSystem, gammaW) => {
    const response = await admin.post('/dams', { ...HARROW_FEN, unitSystem, gammaW });
    expect(response.status).toBe(400);
    expect(JSON.stringify(response.body)).toContain('gammaW');
  });

  it('is changed by its engineer, not by its reviewer or colleague', async () => {
    const { damId, caller } = await damWithEngineer();
    const { body } = await caller.patch(`/dams/${damId}`, { fullSupplyLevel: 121.5 }).expect(200);
    expect(body).toMatchObject({ fullSupplyLevel: 121.5, name: 'Harrow Fen Dam' });
    for (const role of ['reviewer', 'colleague'] as const) {
      const other = await app.signIn(role);
      await addMember(app.db, damId, other.person.id, role);
      await other.caller.get(`/dams/${damId}`).expect(200);
      await other.caller.patch(`/dams/${damId}`, { name: 'Mine' }).expect(403);
    }
    await caller.patch(`/dams/${damId}`, {}).expect(200);
  });

  it('keeps its unit system once a net holds values in it', async () => {
    const { damId, person, caller } = await damWithEngineer();
    const toUs = { unitSystem: 'US', gammaW: 62.4, fullSupplyLevel: 387 };
    await caller.patch(`/dams/${damId}`, toUs).expect(200);
    await addNet(damId, person.id);
    const back = await caller.patch(`/dams/${damId}`, { unitSystem: 'SI', gammaW: 9.81 });
    expect([back.status, back.body.code]).toEqual([409, 'conflict']);
  });

  it('is put away and brought back, and is not changed meanwhile', async () => {
    const { damId, caller } = await damWithEngineer();
    const listed = async (archived: string) =>
      (await caller.get(`/dams?archived=${archived}`)).body.items.map((dam: { id: string }) => dam.id);
    const away = await caller.post(`/dams/${damId}/archive`).expect(200);
    expect(away.body.archivedAt).not.toBeNull();
    expect([await listed('no'), await listed('yes')]).toEqual([[], [damId]]);
    await caller.patch(`/dams/${damId}`, { name: 'Other' }).expect(409);
    await caller.post(`/dams/${damId}/archive`).expect(200);
    const back = await caller.post(`/dams/${damId}/restore`).expect(200);
    expect(back.body.archivedAt).toBeNull();
    expect([await listed('no'), await listed('yes')]).toEqual([[damId], []]);
  });

  it('does not exist for a stranger', async () => {
    const { damId } = await damWithEngineer();
    const { caller } = await app.signIn('Stranger');
    for (const path of ['', '/members', '/events'])
      expect((await caller.get(`/dams/${damId}${path}`)).body.code).toBe('not-found');
    expect((await caller.patch(`/dams/${damId}`, {})).status).toBe(404);
    expect((await caller.get('/dams/not-an-id')).status).toBe(404);
  });

  it('is in the list exactly when the policy lets it be read', async () => {
    const dams = await Promise.all([1, 2, 3, 4].map(() => addDam(app.db, ada.id)));
    const { person, caller } = await app.signIn('Lister');
    const parts = new Map(damRole.options.map((role, n) => [dams[n] as string, role]));
    for (const [damId, role] of parts) await addMember(app.db, damId, person.id, role);
    const idsSeenBy = async (who: Caller) =>
      (await who.get('/dams')).body.items.map((dam: { id: string }) => dam.id) as string[];
    const readable = (isAdmin: boolean) =>
      dams.filter((damId) => {
        const role = parts.get(damId);
        return allowsOnDam('dam.read', { admin: isAdmin, roles: role ? [role] : [] });
      });
    expect((await idsSeenBy(caller)).sort()).toEqual(readable(false).sort());
    expect(await idsSeenBy(admin)).toEqual(expect.arrayContaining(readable(true)));
    const { items } = (await caller.get('/dams')).body;
    for (const dam of items) expect(dam.roles).toEqual([parts.get(dam.id)]);
  });
});

describe('the members of a dam', () => {
  it('are invited by its engineer; a new person gets a link that names the dam', async () => {
    const { damId, person, caller } = await damWithEngineer('Iris Marsh');
    const email = 'remi.okafor@harrow-fen.example';
    const { body } = await caller
      .post(`/dams/${damId}/members/invitations`, { email, roles: ['reviewer', 'colleague', 'reviewer'] })
      .expect(201);
    expect(body).toMatchObject({ email, state: 'invited', roles: ['reviewer', 'colleague'] });
    const [mail] = await mailsTo(app, email);
    expect(mail?.text).toContain('as reviewer and colleague');
    const token = await tokenMailedTo(app, email);
    const guest = app.caller();
    await guest.open();
    const seen = await guest.post('/invitations/look-up', { token }).expect(200);
    expect(seen.body).toEqual({ email, invitedBy: person.name, damName: 'Harrow Fen Dam' });
    const joined = await guest.post('/invitations/accept', {
      token,
      name: 'Remi Okafor',
      password: 'a very long password',
    });
    guest.csrfToken = joined.body.csrfToken;
    expect((await guest.get(`/dams/${damId}`)).body.roles).toEqual(['reviewer', 'colleague']);
  });

  it('are added at once when known, keep the parts they have, and are told by mail', async () => {
    const { damId, caller } = await damWithEngineer();
    const known = await addPerson(app.db, 'Well Known');
    await addMember(app.db, damId, known.id, 'colleague');
    const { body } = await caller
      .post(`/dams/${damId}/members/invitations`, { email: known.email, roles: ['reviewer'] })
      .expect(201);
    expect(body).toMatchObject({ state: 'active', roles: ['reviewer', 'colleague'] });
    const mails = await mailsTo(app, known.email);
    expect(mails.map((mail) => mail.subject)).toEqual(['You now belong to Harrow Fen Dam']);
    expect(mails[0]?.text).toContain(`/dams/${damId}`);
  });

  it('change their parts and lose them, and with them their sight of the dam', async () => {
    const { damId, caller } = await damWithEngineer();
    const other = await app.signIn('Other');
    await caller.put(`/dams/${damId}/members/${other.person.id}`, { roles: ['engineer'] }).expect(200);
    await other.caller.patch(`/dams/${damId}`, { name: 'Renamed' }).expect(200);
    await caller.put(`/dams/${damId}/members/${other.person.id}`, { roles: ['colleague'] }).expect(200);
    await other.caller.patch(`/dams/${damId}`, { name: 'Again' }).expect(403);
    await caller.delete(`/dams/${damId}/members/${other.person.id}`).expect(204);
    await other.caller.get(`/dams/${damId}`).expect(404);
    await caller.delete(`/dams/${damId}/members/${other.person.id}`).expect(404);
    expect(app.live.published).toContainEqual({ type: 'person', personId: other.person.id });
  });

  it('always have an engineer among them, unless an administrator decides otherwise', async () => {
    const { damId, person, caller } = await damWithEngineer();
    await caller.delete(`/dams/${damId}/members/${person.id}`).expect(409);
    await caller.put(`/dams/${damId}/members/${person.id}`, { roles: ['reviewer'] }).expect(409);
    await admin.put(`/dams/${damId}/members/${person.id}`, { roles: ['reviewer'] }).expect(200);
  });

  it('are not managed by a colleague, and roles cannot be empty or invented', async () => {
    const { damId, person, caller } = await damWithEngineer();
    const { person: tove, caller: colleague } = await app.signIn('Tove');
    await addMember(app.db, damId, tove.id, 'colleague');
    await colleague.put(`/dams/${damId}/members/${tove.id}`, { roles: ['engineer'] }).expect(403);
    await colleague.get(`/dams/${damId}/members`).expect(200);
    await caller.put(`/dams/${damId}/members/${person.id}`, { roles: [] }).expect(400);
    await caller.put(`/dams/${damId}/members/${person.id}`, { roles: ['owner'] }).expect(400);
  });
});

describe('the activity of a dam', () => {
  it('is read page by page, each line once, newest first', async () => {
    const { damId, person, caller } = await damWithEngineer();
    await app.db.transaction(async (manager) => {
      // All in one transaction and so at one time: only the id tells them apart.
      for (let n = 0; n < 120; n++)
        await writeEvent(manager, { damId, personId: person.id, type: 'test.line', text: `line ${n}` });
    });
    const texts: string[] = [];
    let cursor: string | null = null;
    do {
      const query: string = cursor ? `?cursor=${cursor}` : '';
      const { body } = await caller.get(`/dams/${damId}/events${query}`).expect(200);
      texts.push(...body.items.map((each: { text: string }) => each.text));
      cursor = body.nextCursor;
    } while (cursor);
    expect(texts).toEqual(Array.from({ length: 120 }, (_, n) => `line ${119 - n}`));
  });

  it('shows a long run of work on one net as its newest line', async () => {
    const { damId, person } = await damWithEngineer();
    const netId = await addNet(damId, person.id);
    const work = { damId, netId, personId: person.id, type: 'net.changed' };
    for (let n = 0; n < 30; n++)
      await writeEvent(app.db.manager, { ...work, text: `moved a vertex of line ${n}` });
    await writeEvent(app.db.manager, { ...work, type: 'note.written', text: 'wrote note 1' });
    for (let n = 0; n < 20; n++) await writeEvent(app.db.manager, { ...work, text: `moved point ${n}` });
    const { items, nextCursor } = await listEvents(app.db.manager, damId, undefined);
    expect(items.map((each) => each.text)).toEqual([
      'moved point 19',
      'wrote note 1',
      'moved a vertex of line 29',
    ]);
    expect(nextCursor).toBeNull();
    expect(await app.db.getRepository(EventEntity).countBy({ damId })).toBe(51);
  });

  it('refuses a cursor it did not make', async () => {
    const { damId, caller } = await damWithEngineer();
    await caller.get(`/dams/${damId}/events?cursor=nonsense`).expect(400);
  });
});

/** A net on a drawing of the dam, written straight into the database. */
async function addNet(damId: string, personId: string): Promise<string> {
  const [{ id }] = await app.db.query(
    `WITH w AS (INSERT INTO drawing (id, dam_id, sha256, file_name, media_type, byte_size, uploaded_by)
        VALUES (gen_random_uuid(), $1, 'x', 'a.png', 'image/png', 1, $2) RETURNING id),
      s AS (INSERT INTO sheet (id, drawing_id, page_number, width_px, height_px, rendition, tile_size_px, max_zoom, tile_format)
        SELECT gen_random_uuid(), id, 1, 10, 10, 'base', 512, 0, 'png' FROM w RETURNING id),
      c AS (INSERT INTO section (id, sheet_id, name, created_by)
        SELECT gen_random_uuid(), id, 'B–B', $2 FROM s RETURNING id)
      INSERT INTO net (id, section_id, name, unit_system, created_by)
        SELECT gen_random_uuid(), id, 'as drawn', 'SI', $2 FROM c RETURNING id`,
    [damId, personId],
  );
  return id;
}
