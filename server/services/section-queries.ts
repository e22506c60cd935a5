import { type EntityManager, In } from 'typeorm';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import { DocumentEntityRow, SectionEntity } from '#server/entities/net-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { SectionDto } from '#shared/contract/drawings.ts';
import { assembleDocument } from './net-document.ts';
import { netSummariesBySection } from './net-summaries.ts';

/**
 * The sections of the sheets with their nets, in order of making; put-away ones carry `archivedAt`. With a reader the
 * nets say how many notes are new to them.
 */
export async function sectionsOfSheets(
  manager: EntityManager,
  sheetIds: readonly string[],
  readerId: string | null = null,
): Promise<SectionDto[]> {
  if (sheetIds.length === 0) return [];
  const sections = await manager.find(SectionEntity, {
    where: { sheetId: In([...sheetIds]) },
    order: { id: 'ASC' },
  });
  return present(manager, sections, readerId);
}

/** One section with its nets. @throws AppError not-found */
export async function sectionById(manager: EntityManager, sectionId: string): Promise<SectionDto> {
  const sections = await manager.findBy(SectionEntity, { id: sectionId });
  const [section] = await present(manager, sections);
  if (!section) throw notFound();
  return section;
}

async function present(
  manager: EntityManager,
  sections: SectionEntity[],
  readerId: string | null = null,
): Promise<SectionDto[]> {
  if (sections.length === 0) return [];
  const ids = sections.map((section) => section.id);
  const nets = await netSummariesBySection(manager, ids, readerId);
  const calibrated = await calibratedSections(manager, sections);
  return sections.map(({ id, sheetId, name, chainage, frame, archivedAt }) => ({
    id,
    sheetId,
    name,
    chainage,
    frame: frame as SectionDto['frame'],
    calibrated: calibrated.has(id),
    archivedAt: archivedAt?.toISOString() ?? null,
    nets: nets.get(id) ?? [],
  }));
}

/** Those of the sections whose known points give a fit; worked out afresh, never stored. */
async function calibratedSections(manager: EntityManager, sections: SectionEntity[]): Promise<Set<string>> {
  const sheets = await manager.findBy(SheetEntity, { id: In(sections.map((each) => each.sheetId)) });
  const rows = await manager.findBy(DocumentEntityRow, {
    sectionId: In(sections.map((each) => each.id)),
    removed: false,
  });
  const isFitted = ({ id, name, sheetId }: SectionEntity) => {
    const sheet = sheets.find((each) => each.id === sheetId);
    if (!sheet) return false;
    const own = rows.filter((row) => row.sectionId === id);
    // Whether there is a fit depends on no unit and no datum.
    const document = assembleDocument({ id, name, unitSystem: 'SI', datum: '', sheet }, own);
    return readSetOut(document).reading.state === 'fitted';
  };
  return new Set(sections.filter(isFitted).map((section) => section.id));
}
