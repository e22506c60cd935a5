import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import type { AppDeps } from '#server/app-deps.ts';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { netFileOnBlankInput } from '#shared/contract/net-files.ts';
import { createBlankDrawingService } from './blank-drawing-service.ts';
import { refuseSize, storeBlankSheet } from './blank-sheet.ts';
import { parseNetFile } from './net-file.ts';
import { askOpen, documentOf, questionsOf, refuseOtherUnits } from './net-file-refusals.ts';
import { createNetFileService } from './net-file-service.ts';
import { createSectionService } from './section-service.ts';
import { inTransaction } from './service-deps.ts';

/**
 * Makes a drawing of one empty sheet, a section of the whole of it, and on it the net of a file. Everything that speaks
 * against the file is found before the sheet is made. Answers with what was done otherwise than the file says.
 */
export async function takeOnBlankSheet(
  deps: AppDeps,
  damId: string,
  input: z.output<typeof netFileOnBlankInput>,
  actor: Actor,
): Promise<string[]> {
  const file = documentOf(parseNetFile(input.text));
  const dam = await deps.db.manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  refuseOtherUnits(file, dam.unitSystem);
  refuseSize(file.sheet);
  askOpen(questionsOf(file, { ...file, datum: dam.datum, entities: {} }), input.accepted);
  const drawingId = uuidv7();
  const blank = await storeBlankSheet(deps, drawingId, file.sheet);
  return inTransaction(deps, async (tx) => {
    await createBlankDrawingService(tx).enter(damId, drawingId, blank, file.sheet.dpi, actor);
    const section = { id: uuidv7(), name: input.sectionName, chainage: '', frame: null };
    await createSectionService(tx).create(blank.sheetId, section, actor);
    return createNetFileService(tx).take(section.id, input, actor);
  });
}
