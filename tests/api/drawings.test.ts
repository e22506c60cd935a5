import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DamRole } from '#shared/contract/actions.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

async function damWithDrawing() {
  const engineer = await app.signIn('Nora Fell');
  const damId = await addDam(app.db, engineer.person.id);
  await addMember(app.db, damId, engineer.person.id, 'engineer');
  const png = await pngDrawing();
  const { body } = await engineer.caller
    .post(`/dams/${damId}/drawings`)
    .attach('file', png, 'scan.png')
    .expect(201);
  const joined = async (name: string, ...roles: DamRole[]) => {
    const other = await app.signIn(name);
    await addMember(app.db, damId, other.person.id, ...roles);
    return other.caller;
  };
  return { damId, drawingId: body.id as string, caller: engineer.caller, joined };
}

const particulars = {
  number: 'HF-114',
  title: 'Section B–B',
  revision: 'C',
  drawnOn: '1961',
  stage: 'asBuilt',
  source: 'Archive room 2, roll 17',
};

describe('a drawing', () => {
  it('refuses particulars that are none', async () => {
    const { caller, drawingId } = await damWithDrawing();
    const { body } = await caller
      .patch(`/drawings/${drawingId}`, { stage: 'maybe', revision: 'x'.repeat(21) })
      .expect(400);
    expect(body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['revision', 'stage']);
  });

  it('takes its particulars, and an empty change writes no event', async () => {
    const { caller, drawingId } = await damWithDrawing();
    const { body } = await caller.patch(`/drawings/${drawingId}`, particulars).expect(200);
    expect(body).toMatchObject(particulars);
    await caller.patch(`/drawings/${drawingId}`, {}).expect(200);
    const events = await app.db.query('SELECT type, text FROM event WHERE drawing_id = $1 ORDER BY id', [
      drawingId,
    ]);
    expect(events).toEqual([
      { type: 'drawing.uploaded', text: 'uploaded scan.png' },
      { type: 'drawing.changed', text: 'changed the particulars of HF-114' },
    ]);
  });

  it('is listed until it is put away, and again when it is brought back', async () => {
    const { caller, damId, drawingId } = await damWithDrawing();
    const ids = async (query: string) =>
      (await caller.get(`/dams/${damId}/drawings${query}`).expect(200)).body.items.map(
        (item: { id: string }) => item.id,
      );
    expect(await ids('')).toEqual([drawingId]);
    const { body } = await caller.post(`/drawings/${drawingId}/archive`).expect(200);
    expect(body.archivedAt).not.toBeNull();
    expect(await ids('')).toEqual([]);
    expect(await ids('?archived=yes')).toEqual([drawingId]);
    await caller.patch(`/drawings/${drawingId}`, { number: 'HF-1' }).expect(409);
    await caller.post(`/drawings/${drawingId}/archive`).expect(200);
    await caller.post(`/drawings/${drawingId}/restore`).expect(200);
    expect(await ids('?archived=no')).toEqual([drawingId]);
    const events = await app.db.query('SELECT type FROM event WHERE drawing_id = $1 ORDER BY id', [
      drawingId,
    ]);
    expect(events.map((event: { type: string }) => event.type)).toEqual([
      'drawing.uploaded',
      'drawing.archived',
      'drawing.restored',
    ]);
  });

  it('is read by everybody on the dam and changed by its engineers', async () => {
    const { damId, drawingId, joined } = await damWithDrawing();
    for (const role of ['reviewer', 'colleague'] as const) {
      const caller = await joined('Ida Brook', role);
      await caller.get(`/drawings/${drawingId}`).expect(200);
      await caller.get(`/dams/${damId}/drawings`).expect(200);
      await caller.patch(`/drawings/${drawingId}`, particulars).expect(403);
      await caller.post(`/drawings/${drawingId}/archive`).expect(403);
      await caller.post(`/drawings/${drawingId}/restore`).expect(403);
    }
    const engineer = await joined('Jon Weir', 'engineer');
    await engineer.patch(`/drawings/${drawingId}`, particulars).expect(200);
  });
});
