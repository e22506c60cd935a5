import type { EntityManager } from 'typeorm';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { NetEntity } from '#server/entities/net-entity.ts';
import { invalidInput, notFound } from '#server/errors/app-error.ts';
import { type ReadNet, seepageTogether } from '#shared/compute/quantities/seepage-together.ts';
import { seepagePerMetre } from '#shared/compute/quantities/seepage-volume.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { DamSeepageDto, SeepageSection } from '#shared/contract/dam-seepage.ts';
import { singleOf } from '#shared/contract/document.ts';
import { drawingTitle } from './drawing-title.ts';
import { readDocument } from './net-document.ts';
import { type NetPlace, placeOfNet, putAwayRefusal } from './net-place.ts';
import { readingIfAny } from './schedule-queries.ts';

/**
 * Seepage over a length of dam from the nets that the engineer chose, one for each section, read as they stand; with no
 * net chosen, the sections and what may be chosen for them.
 * @throws AppError not-found for a net of another dam, invalid-input for two nets of one section
 */
export async function damSeepageOf(
  manager: EntityManager,
  damId: string,
  netIds: readonly string[],
): Promise<DamSeepageDto> {
  const dam = await manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  const places = await placesOf(manager, damId, netIds);
  const nets = await Promise.all(places.map((place) => readNetOf(manager, place)));
  const { unitSystem, datum } = dam;
  const sections = await sectionsInUse(manager, damId);
  return { damId, unitSystem, datum, sections, ...seepageTogether(nets, unitSystem) };
}

const NOT_OF_DAM = 'A net that was chosen does not exist, or belongs to another dam. Choose the nets again.';

async function placesOf(
  manager: EntityManager,
  damId: string,
  netIds: readonly string[],
): Promise<NetPlace[]> {
  const places = await Promise.all(netIds.map((netId) => placeOnDam(manager, damId, netId)));
  if (new Set(places.map(({ section }) => section.id)).size < places.length)
    throw invalidInput([{ path: 'nets', message: 'Choose one net only for each section.' }]);
  return places;
}

/** A net of another dam is answered as one that does not exist. */
async function placeOnDam(manager: EntityManager, damId: string, netId: string): Promise<NetPlace> {
  if (!(await manager.existsBy(NetEntity, { id: netId }))) throw notFound(NOT_OF_DAM);
  const place = await placeOfNet(manager, netId);
  if (place.dam.id !== damId) throw notFound(NOT_OF_DAM);
  return place;
}

/** What one net says of the seepage at its section; a net that cannot be read says nothing. */
async function readNetOf(manager: EntityManager, place: NetPlace): Promise<ReadNet> {
  const { net, section } = place;
  const reading = await readingIfAny(manager, place);
  const levels = singleOf(await readDocument(manager, place), 'waterLevels')?.value;
  const metres = metresPerLengthUnit(net.unitSystem);
  const inMetres = (level: number | null | undefined) => (level == null ? null : level * metres);
  const seepage = reading?.quantities.seepage ?? null;
  return {
    netId: net.id,
    netName: net.name,
    sectionId: section.id,
    sectionName: section.name,
    chainage: section.chainage,
    headwater: inMetres(levels?.headwater),
    tailwater: inMetres(levels?.tailwater),
    seepage: seepage === null ? null : seepagePerMetre(seepage, net.unitSystem),
    factor: seepage === null ? null : (reading?.doubt.seepageFactor ?? null),
    figures: reading?.quantities.seepageFigures ?? 1,
    tracedOnly: reading?.quantities.channelsComplete === false,
    putAway: putAwayRefusal({ ...place, dam: { ...place.dam, archivedAt: null } }) !== null,
  };
}

interface SectionRow {
  id: string;
  name: string;
  chainage: string;
  drawing_id: string;
  number: string;
  title: string;
  file_name: string;
  nets: Array<{ id: string; name: string }>;
}

/** The sections in use with their nets in use, in order of making. */
async function sectionsInUse(manager: EntityManager, damId: string): Promise<SeepageSection[]> {
  const rows: SectionRow[] = await manager.query(
    `SELECT c.id, c.name, c.chainage, w.id AS drawing_id, w.number, w.title, w.file_name,
      (SELECT coalesce(json_agg(json_build_object('id', n.id, 'name', n.name) ORDER BY n.id), '[]'::json)
        FROM net n WHERE n.section_id = c.id AND n.archived_at IS NULL) AS nets
      FROM section c JOIN sheet s ON s.id = c.sheet_id JOIN drawing w ON w.id = s.drawing_id
      WHERE w.dam_id = $1 AND w.archived_at IS NULL AND c.archived_at IS NULL ORDER BY c.id`,
    [damId],
  );
  return rows.map(({ id, name, chainage, nets, ...drawing }) => ({
    id,
    name,
    chainage,
    drawing: {
      id: drawing.drawing_id,
      title: drawingTitle({ number: drawing.number, title: drawing.title, fileName: drawing.file_name }),
    },
    nets,
  }));
}
