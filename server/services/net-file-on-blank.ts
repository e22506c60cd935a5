import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { invalidInput, notFound } from '#server/errors/app-error.ts';
import type { BlankSheet, SheetToMake } from '#server/http/blank-sheet.ts';
import type { Actor } from '#server/http/route-record.ts';
import { MAX_PDF_PIXELS } from '#shared/contract/limits.ts';
import type { netFileOnBlankInput } from '#shared/contract/net-files.ts';
import { createBlankDrawingService } from './blank-drawing-service.ts';
import { parseNetFile } from './net-file.ts';
import { askOpen, documentOf, questionsOf, refuseOtherUnits } from './net-file-refusals.ts';
import { createNetFileService } from './net-file-service.ts';
import { createSectionService } from './section-service.ts';
import type { ServiceDeps } from './service-deps.ts';
import { sheetIdOf } from './sheet-id.ts';

type Input = z.output<typeof netFileOnBlankInput>;

/** Pixels of a side; the longest page at 600 dots per inch has some 100,000. */
const LONGEST_SIDE_PX = 100_000;

/** The drawing of one empty sheet that a file asks for. */
export interface BlankPlan extends SheetToMake {
  drawingId: string;
  dpi: number | null;
}

/**
 * What sheet a file asks for, once nothing speaks against the file: it is all found before a sheet is made.
 * @throws AppError invalid-input, not-found, or conflict while a question is open
 */
export async function planBlankSheet(
  manager: EntityManager,
  damId: string,
  input: Input,
): Promise<BlankPlan> {
  const file = documentOf(parseNetFile(input.text));
  const dam = await manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  refuseOtherUnits(file, dam.unitSystem);
  refuseSize(file.sheet);
  askOpen(questionsOf(file, { ...file, datum: dam.datum, entities: {} }), input.accepted);
  const drawingId = uuidv7();
  return { ...file.sheet, drawingId, sheetId: sheetIdOf(drawingId, 1) };
}

function refuseSize({ widthPx, heightPx }: { widthPx: number; heightPx: number }): void {
  const isSide = (side: number) => Number.isInteger(side) && side > 0 && side <= LONGEST_SIDE_PX;
  if (isSide(widthPx) && isSide(heightPx) && widthPx * heightPx <= MAX_PDF_PIXELS) return;
  throw invalidInput([
    {
      path: 'sheet',
      message: `An empty sheet has whole pixels, up to ${LONGEST_SIDE_PX} a side and ${MAX_PDF_PIXELS / 1e6} million in all; the file says ${widthPx} × ${heightPx}. Upload the drawing it was traced on instead, and put the file on that.`,
    },
  ]);
}

/**
 * Enters the drawing, a section of the whole of its sheet, and on it the net of the file. Runs in a transaction of the
 * caller. Answers with what was done otherwise than the file says.
 */
export async function takeOnBlankSheet(
  deps: ServiceDeps,
  damId: string,
  { drawingId, dpi }: BlankPlan,
  blank: BlankSheet,
  input: Input,
  actor: Actor,
): Promise<string[]> {
  await createBlankDrawingService(deps).enter(damId, drawingId, blank, dpi, actor);
  const section = { id: uuidv7(), name: input.sectionName, chainage: '', frame: null };
  await createSectionService(deps).create(blank.sheetId, section, actor);
  return createNetFileService(deps).take(section.id, input, actor);
}
