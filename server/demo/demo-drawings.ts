import { createHash } from 'node:crypto';
import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { AppDeps } from '#server/app-deps.ts';
import { DamEntity, MembershipEntity } from '#server/entities/dam-entity.ts';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { createRenderProcess } from '#server/imaging/render-process.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import { createDrawingService } from '#server/services/drawing-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { demoId } from './demo-ids.ts';
import { demoPeople, engineer } from './demo-people.ts';
import { crossSectionsTiff, raisingPdf, spillwayJpeg } from './drawing-files.ts';
import { FULL_SUPPLY } from './embankment.ts';

export const damId = demoId(10);

/** Adds the dam and everybody's part on it. */
export async function addDemoDam({ db }: AppDeps): Promise<void> {
  await db.transaction(async (manager) => {
    const dam = {
      id: damId,
      name: 'Harrow Fen Dam',
      unitSystem: 'SI' as const,
      datum: 'LD',
      fullSupplyLevel: FULL_SUPPLY,
      gammaW: 9.81,
      createdBy: engineer.id,
    };
    await manager.createQueryBuilder().insert().into(DamEntity).values(dam).orIgnore().execute();
    const members = demoPeople
      .filter(({ roles }) => roles.length > 0)
      .map(({ id, roles }) => ({ damId, personId: id, roles }));
    await manager.createQueryBuilder().insert().into(MembershipEntity).values(members).orIgnore().execute();
  });
}

type Particulars = Pick<DrawingDto, 'number' | 'title' | 'revision' | 'drawnOn' | 'stage' | 'source'>;

interface DemoFile {
  fileName: string;
  mediaType: string;
  draw: () => Promise<Buffer>;
  particulars: Particulars;
}

const FILES = {
  crossSections: {
    fileName: 'HF-114-C.tif',
    mediaType: 'image/tiff',
    draw: crossSectionsTiff,
    particulars: {
      number: 'HF-114',
      title: 'Cross-sections',
      revision: 'C',
      drawnOn: '1961',
      stage: 'asBuilt',
      source: 'Drawing store, roll 7',
    },
  },
  spillway: {
    fileName: 'HF-120.jpg',
    mediaType: 'image/jpeg',
    draw: spillwayJpeg,
    particulars: {
      number: 'HF-120',
      title: 'Spillway apron',
      revision: '',
      drawnOn: '1958',
      stage: 'design',
      source: 'Drawing store, roll 7',
    },
  },
  raising: {
    fileName: 'HF-131-A.pdf',
    mediaType: 'application/pdf',
    draw: raisingPdf,
    particulars: {
      number: 'HF-131',
      title: 'Raising scheme',
      revision: 'A',
      drawnOn: '1977',
      stage: 'design',
      source: 'Scanned by the owner',
    },
  },
} satisfies Record<string, DemoFile>;

export type DemoDrawing = keyof typeof FILES;

/** Takes a drawing in as an upload would be, unless it is there already; gives its id. */
async function takeIn(deps: AppDeps, { fileName, mediaType, draw, particulars }: DemoFile): Promise<string> {
  const there = await deps.db.manager.findOneBy(DrawingEntity, { damId, fileName });
  if (there) return there.id;
  const bytes = await draw();
  await mkdir(deps.config.storageDir, { recursive: true });
  const folder = await mkdtemp(path.join(deps.config.storageDir, 'demo-'));
  try {
    const file = path.join(folder, 'original');
    await writeFile(file, bytes);
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const arrived = { path: file, fileName, mediaType, byteSize: bytes.length, sha256 };
    return await inTransaction(deps, async (tx) => {
      const drawings = createDrawingService(tx);
      const { id } = await drawings.takeIn(damId, arrived, false, engineer);
      await drawings.change(id, particulars, engineer);
      return id;
    });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** Adds a drawing and turns it into sheets; gives the ids of the sheets in page order. */
export async function addDemoDrawing(deps: AppDeps, name: DemoDrawing): Promise<string[]> {
  const drawingId = await takeIn(deps, FILES[name]);
  const job = await deps.db.manager.findOneByOrFail(RenderJobEntity, { drawingId });
  const render = createRenderDrawingHandler(deps, () => createRenderProcess());
  await render(job.id, new AbortController().signal);
  const sheets = await deps.db.manager.find(SheetEntity, {
    where: { drawingId },
    order: { pageNumber: 'ASC' },
  });
  if (sheets.length === 0) throw new Error(`The demo drawing ${FILES[name].fileName} has no sheets.`);
  return sheets.map((sheet) => sheet.id);
}
