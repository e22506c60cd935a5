import { createHash, randomUUID } from 'node:crypto';
import { mkdir, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { AppDeps } from '#server/app-deps.ts';
import type { CalculationSheetEntity } from '#server/entities/calculation-sheet-entity.ts';
import { AppError } from '#server/errors/app-error.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { createCalculationSheetService, type MadeSheet } from '#server/services/calculation-sheet-service.ts';
import { sheetMaterial } from '#server/services/calculation-sheet-source.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { figurePlace } from '#server/sheets/draw-section.ts';
import { renderSheetPdf } from '#server/sheets/render-sheet-pdf.ts';
import { scanPicture } from '#server/sheets/scan-picture.ts';
import { artifactKey } from '#server/storage/storage-keys.ts';
import { sheetContent } from '#shared/text/calculation-sheet/content.ts';

type Rows = ReturnType<typeof createCalculationSheetService>;

/** Job `make-calculation-sheet`: the id is that of a row of `calculation_sheet`. A repeat gives the same file. */
export function createCalculationSheetHandler(deps: AppDeps): JobHandler {
  const rows = <T>(work: (rows: Rows) => Promise<T>) =>
    inTransaction(deps, (tx) => work(createCalculationSheetService(tx)));

  return async (sheetId, signal) => {
    const asked = await rows((each) => each.begin(sheetId));
    if (!asked) return;
    try {
      const pdf = await makeSheet(deps, asked, signal);
      const made = await keep(deps, pdf);
      await rows((each) => each.finish(asked, made));
    } catch (error) {
      // What the server says in words, such as that the record is damaged, will be no different next time.
      if (!(error instanceof AppError)) throw error;
      deps.logger.warn({ err: error, sheetId }, 'a calculation sheet was refused');
      await rows((each) => each.refuse(sheetId, error.detail));
    }
  };
}

async function makeSheet(deps: AppDeps, asked: CalculationSheetEntity, signal: AbortSignal): Promise<Buffer> {
  const { source, sheet, madeAt } = await sheetMaterial(deps.db.manager, asked, deps.clock.now());
  const content = sheetContent(source);
  const { paper } = asked;
  const { figure } = content;
  const part = figure && { crop: figure.crop, widthPt: figurePlace(paper, figure.crop).widthPt };
  const scan = part && (await scanPicture(deps.storage, sheet, part, signal));
  signal.throwIfAborted();
  return renderSheetPdf({ content, paper, scan, madeAt });
}

async function keep({ config, storage }: AppDeps, pdf: Buffer): Promise<MadeSheet> {
  const sha256 = createHash('sha256').update(pdf).digest('hex');
  const storageKey = artifactKey(sha256);
  const folder = path.join(config.storageDir, 'work', randomUUID());
  try {
    await mkdir(folder, { recursive: true });
    const file = path.join(folder, 'sheet.pdf');
    await writeFile(file, pdf);
    await storage.putFile(storageKey, file);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
  return { storageKey, sha256, byteSize: pdf.length };
}
