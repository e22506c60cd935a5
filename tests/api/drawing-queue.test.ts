import { pino } from 'pino';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import { createPgBossJobs } from '#server/jobs/pg-boss-jobs.ts';
import { requeueRenderJobs } from '#server/services/render-job-service.ts';
import { readingDeps } from '#server/services/service-deps.ts';
import { g4Drawing, pdfDrawing } from '#tests/support/drawing-files.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

/** The queue itself, from the upload's transaction to the sheets, and over a restart of the server. */
let app: TestApp;
let jobs: JobsPort;
let caller: Awaited<ReturnType<TestApp['signIn']>>['caller'];
let damId: string;

const queue = () => createPgBossJobs({ url: app.database.appUrl, logger: pino({ level: 'silent' }) });
const start = async () => {
  jobs = queue();
  app.deps.jobs = jobs;
  await jobs.start({
    'render-drawing': createRenderDrawingHandler(app.deps),
    'send-mail': async () => undefined,
    'make-calculation-sheet': async () => undefined,
    'make-rendition': async () => undefined,
    'remind-reviewers': async () => undefined,
    'send-digest': async () => undefined,
  });
};

beforeAll(async () => {
  app = await createTestApp();
  await start();
  const engineer = await app.signIn('Nora Fell');
  caller = engineer.caller;
  damId = await addDam(app.db, engineer.person.id);
  await addMember(app.db, damId, engineer.person.id, 'engineer');
});
afterAll(async () => {
  await jobs.stop(10_000);
  await app.close();
});

async function upload(bytes: Buffer): Promise<string> {
  const { body } = await caller.post(`/dams/${damId}/drawings`).attach('file', bytes, 'scan').expect(201);
  return body.id;
}

async function ended(drawingId: string) {
  for (let tries = 0; tries < 240; tries++) {
    const { body } = await caller.get(`/drawings/${drawingId}`).expect(200);
    if (['done', 'refused', 'failed'].includes(body.job.state)) return body;
    await new Promise((resolve) => setTimeout(resolve, 250));
  }
  throw new Error('the drawing was not ready within a minute');
}

it('an upload becomes sheets without being asked for again', async () => {
  const drawing = await ended(await upload(await g4Drawing({ seed: 61 })));
  expect(drawing.job).toMatchObject({ state: 'done', pagesTotal: 1, pagesDone: 1 });
  expect(drawing.sheets).toHaveLength(1);
}, 90_000);

it('a job that was under way when the server died is finished by the next one', async () => {
  await jobs.stop(10_000);
  const idle = queue();
  app.deps.jobs = idle;
  const drawingId = await upload(pdfDrawing([1, 2].map(() => ({ width: 72, height: 72 }))));
  await idle.stop(0);
  const rows = app.db.getRepository(RenderJobEntity);
  const dead = { state: 'running', attempts: 1, leaseUntil: new Date(Date.now() - 1000) } as const;
  await rows.update({ drawingId }, { ...dead, runId: '01890000-0000-7000-8000-000000000003' });
  await app.db.query(`DELETE FROM pgboss.job WHERE name = 'render-drawing'`);
  await start();
  await requeueRenderJobs(readingDeps(app.deps));
  const drawing = await ended(drawingId);
  expect(drawing.job).toMatchObject({ state: 'done', pagesDone: 2 });
}, 120_000);
