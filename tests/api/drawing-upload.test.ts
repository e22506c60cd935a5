import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import http from 'node:http';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DrawingEntity, RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { createMemoryStorage } from '#server/storage/memory-storage.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { MAX_UPLOAD_BYTES } from '#shared/contract/limits.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

async function someoneOnDam(...roles: DamRole[]) {
  const { person, caller } = await app.signIn('Nora Fell');
  const damId = await addDam(app.db, person.id);
  if (roles.length > 0) await addMember(app.db, damId, person.id, ...roles);
  return { person, caller, damId, address: `/dams/${damId}/drawings` };
}

const incoming = () => {
  const folder = path.join(app.storageDir, 'incoming');
  return existsSync(folder) ? readdirSync(folder) : [];
};
const originals = () => {
  const folder = path.join(app.storageDir, 'sha256');
  return existsSync(folder) ? readdirSync(folder) : [];
};

describe('an upload', () => {
  it('without a file says so', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const { body } = await caller.post(address).field('note', 'no file').expect(400);
    expect(body.errors[0]).toMatchObject({ path: 'file', message: 'no file was sent' });
  });

  it.each([
    ['an empty file', Buffer.alloc(0), 422, 'refused-file', /empty/],
    ['a web page named as a picture', Buffer.from('<!DOCTYPE html><html>'), 415, 'unsupported-file', /HTML/],
    [
      'an SVG picture',
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'),
      415,
      'unsupported-file',
      /SVG/,
    ],
    ['a CAD drawing', Buffer.from('AC1027\0\0\0'), 415, 'unsupported-file', /Plot it to PDF/],
    ['a word', Buffer.from('hello'), 415, 'unsupported-file', /not an image or a PDF/],
  ])('of %s is refused with the reason and leaves nothing', async (_name, bytes, status, code, words) => {
    const { caller, address, damId } = await someoneOnDam('engineer');
    const { body } = await caller.post(address).attach('file', bytes, 'scan.png').expect(status);
    expect(body.code).toBe(code);
    expect(body.detail).toMatch(words);
    expect(await app.db.getRepository(DrawingEntity).countBy({ damId })).toBe(0);
    expect(incoming()).toEqual([]);
  });

  it('of two files at once is refused and leaves nothing', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const png = await pngDrawing();
    await caller.post(address).attach('file', png, 'a.png').attach('file', png, 'b.png').expect(400);
    expect(incoming()).toEqual([]);
  });

  it('is refused to a colleague, a stranger and without the token, before its bytes count', async () => {
    const { caller, address } = await someoneOnDam('colleague', 'reviewer');
    const png = await pngDrawing({ seed: 7 });
    expect((await caller.post(address).attach('file', png, 'a.png')).status).toBe(403);
    const stranger = await app.signIn('Olaf Reed');
    expect((await stranger.caller.post(address).attach('file', png, 'a.png')).status).toBe(404);
    const engineer = await someoneOnDam('engineer');
    engineer.caller.csrfToken = 'stale';
    const { body } = await engineer.caller.post(engineer.address).attach('file', png, 'a.png').expect(403);
    expect(body.code).toBe('csrf');
    expect(originals()).not.toContain(createHash('sha256').update(png).digest('hex'));
    expect(incoming()).toEqual([]);
  });

  it('keeps the bytes, enters the drawing and queues its sheets, all at once', async () => {
    const { caller, person, address, damId } = await someoneOnDam('engineer');
    const png = await pngDrawing({ seed: 21 });
    const sha256 = createHash('sha256').update(png).digest('hex');
    const { body } = await caller.post(address).attach('file', png, 'HF-114 Section B–B.PNG').expect(201);
    expect(body).toMatchObject({
      damId,
      sha256,
      fileName: 'HF-114 Section B–B.PNG',
      mediaType: 'image/png',
      byteSize: png.length,
      uploadedBy: { id: person.id, name: 'Nora Fell' },
      job: { state: 'waiting', pagesTotal: null, pagesDone: 0, message: '' },
      sheets: [],
      sections: [],
    });
    expect(readFileSync(path.join(app.storageDir, 'sha256', sha256))).toEqual(png);
    expect(incoming()).toEqual([]);
    const job = await app.db.getRepository(RenderJobEntity).findOneByOrFail({ drawingId: body.id });
    expect(app.jobs.queued).toContainEqual({ name: 'render-drawing', rowId: job.id, afterSeconds: 0 });
    expect(app.live.published).toContainEqual({ type: 'drawing', damId, drawingId: body.id });
    const events = await app.db.query('SELECT type, text, person_id FROM event WHERE drawing_id = $1', [
      body.id,
    ]);
    expect(events).toEqual([
      { type: 'drawing.uploaded', text: 'uploaded HF-114 Section B–B.PNG', person_id: person.id },
    ]);
  });

  it('tells the kind by the content and keeps the name only as a name', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const png = await pngDrawing({ seed: 33 });
    const { body } = await caller.post(address).attach('file', png, '../../etc/passwd.pdf').expect(201);
    expect(body).toMatchObject({ mediaType: 'image/png', fileName: 'passwd.pdf' });
  });

  it('of the same file again is pointed out, and kept when asked', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const png = await pngDrawing({ seed: 41 });
    const first = await caller.post(address).attach('file', png, 'first.png').expect(201);
    await caller.patch(`/drawings/${first.body.id}`, { number: 'HF-114' }).expect(200);
    const second = await caller.post(address).attach('file', png, 'other name.png').expect(409);
    expect(second.body).toMatchObject({ code: 'already-uploaded', extra: { drawingId: first.body.id } });
    expect(second.body.detail).toContain('HF-114');
    expect(incoming()).toEqual([]);
    const third = await caller.post(`${address}?again=yes`).attach('file', png, 'other name.png').expect(201);
    expect(third.body.id).not.toBe(first.body.id);
    expect(third.body.sha256).toBe(first.body.sha256);
  });

  it('of the same file on another dam is not told', async () => {
    const one = await someoneOnDam('engineer');
    const other = await someoneOnDam('engineer');
    const png = await pngDrawing({ seed: 42 });
    await one.caller.post(one.address).attach('file', png, 'a.png').expect(201);
    await other.caller.post(other.address).attach('file', png, 'a.png').expect(201);
  });

  it('of one file twice at the same moment enters one drawing', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const png = await pngDrawing({ seed: 43 });
    const answers = await Promise.all(
      [1, 2, 3].map(() =>
        caller
          .post(address)
          .attach('file', png, 'a.png')
          .then(({ status }) => status),
      ),
    );
    expect(answers.sort()).toEqual([201, 409, 409]);
  });

  it('is refused on a dam that has been put away', async () => {
    const { caller, address, damId } = await someoneOnDam('engineer');
    await app.db.query('UPDATE dam SET archived_at = now() WHERE id = $1', [damId]);
    const png = await pngDrawing({ seed: 44 });
    const { body } = await caller.post(address).attach('file', png, 'a.png').expect(409);
    expect(body.detail).toContain('Bring the dam back');
    expect(incoming()).toEqual([]);
  });

  it('that announces more bytes than a file may have is refused at once', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const { status, body } = await rawUpload(await cookieOf(caller, address), MAX_UPLOAD_BYTES + 1_000_000);
    expect(status).toBe(413);
    expect(body.code).toBe('too-large');
    expect(body.detail).toContain('250 MB');
    expect(incoming()).toEqual([]);
  });

  it('that turns out longer than a file may be is refused and leaves nothing', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const before = originals().length;
    const request = startUpload(await cookieOf(caller, address), null);
    const answer = answerOf(request);
    request.write(formHead);
    const piece = Buffer.alloc(5 * 1024 * 1024, 0x41);
    for (let sent = 0; sent <= MAX_UPLOAD_BYTES; sent += piece.length) {
      if (!request.write(piece)) await new Promise((resolve) => request.once('drain', resolve));
    }
    request.end(`\r\n--${BOUNDARY}--\r\n`);
    expect(await answer).toMatchObject({ status: 413, body: { code: 'too-large' } });
    await until(() => incoming().length === 0);
    expect(originals().length).toBe(before);
  });

  it('that is broken off leaves nothing', async () => {
    const { caller, address } = await someoneOnDam('engineer');
    const before = originals().length;
    const request = startUpload(await cookieOf(caller, address), 5_000_000);
    request.on('error', () => undefined);
    request.write(formHead);
    request.write(Buffer.alloc(400_000, 0x41));
    await until(() => incoming().length === 1);
    request.destroy();
    await until(() => incoming().length === 0);
    expect(originals().length).toBe(before);
  });
});

describe('an upload on a nearly full disk', () => {
  it('is refused before anything is written', async () => {
    const storage = createMemoryStorage();
    storage.setFreeBytes(10_000_000);
    const full = await createTestApp({ config: { minFreeBytes: 20_000_000 }, deps: { storage } });
    try {
      const { person, caller } = await full.signIn('Nora Fell');
      const damId = await addDam(full.db, person.id);
      await addMember(full.db, damId, person.id, 'engineer');
      const png = await pngDrawing();
      const { body } = await caller.post(`/dams/${damId}/drawings`).attach('file', png, 'a.png').expect(507);
      expect(body.code).toBe('disk-full');
      expect(existsSync(path.join(full.storageDir, 'incoming'))).toBe(false);
      expect(storage.keys()).toEqual([]);
    } finally {
      await full.close();
    }
  });
});

interface Target {
  cookie: string;
  token: string;
  address: string;
}
const BOUNDARY = 'tracehead-test';
const formHead = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="file"; filename="a.png"\r\n\r\n`;

/** The cookie a browser would send, taken from a request that the caller makes. */
async function cookieOf(
  caller: Awaited<ReturnType<typeof someoneOnDam>>['caller'],
  address: string,
): Promise<Target> {
  const request = caller.get('/session');
  await request.expect(200);
  const { cookies } = request as unknown as { cookies: string };
  return { cookie: cookies, token: caller.csrfToken, address };
}

function startUpload({ cookie, token, address }: Target, contentLength: number | null): http.ClientRequest {
  return http.request(`${app.address}/api/v1${address}`, {
    method: 'POST',
    headers: {
      cookie,
      'x-csrf-token': token,
      'content-type': `multipart/form-data; boundary=${BOUNDARY}`,
      ...(contentLength === null ? {} : { 'content-length': contentLength }),
    },
  });
}

interface Answer {
  status: number;
  body: { code: string; detail: string };
}

function rawUpload(target: Target, contentLength: number): Promise<Answer> {
  const request = startUpload(target, contentLength);
  const answer = answerOf(request);
  request.write(formHead);
  return answer.finally(() => request.destroy());
}

function answerOf(request: http.ClientRequest): Promise<Answer> {
  return new Promise((resolve, reject) => {
    request.on('error', reject);
    request.on('response', async (response) => {
      const chunks: Buffer[] = [];
      for await (const chunk of response) chunks.push(chunk as Buffer);
      resolve({ status: response.statusCode ?? 0, body: JSON.parse(Buffer.concat(chunks).toString()) });
    });
  });
}

async function until(isTrue: () => boolean): Promise<void> {
  for (let tries = 0; tries < 200; tries++) {
    if (isTrue()) return;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error('it did not come true within five seconds');
}
