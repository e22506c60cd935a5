import { v7 as uuidv7 } from 'uuid';
import { DocumentEntityRow, NetEntity } from '#server/entities/net-entity.ts';
import { invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import {
  type CarriedSetOut,
  carriedSetOut,
  carriedValue,
} from '#shared/compute/carry-across/carried-values.ts';
import {
  matched,
  matchResiduals,
  matchSheets,
  type SheetMatch,
} from '#shared/compute/carry-across/match-sheets.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import type { CarriedSectionDto, CarriedSectionInput } from '#shared/contract/carry-across.ts';
import { type DocumentEntity, singleOf } from '#shared/contract/document.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { drawingTitle } from './drawing-title.ts';
import { writeEvent } from './event-writer.ts';
import { assembleDocument } from './net-document.ts';
import { withIds } from './net-file-ops.ts';
import { lockSection } from './net-locks.ts';
import {
  placeOfSection,
  placeOfSheet,
  refusePutAway,
  type SectionPlace,
  type SheetPlace,
} from './net-place.ts';
import { insertRows } from './net-service.ts';
import { sectionById } from './section-queries.ts';
import { createSectionService } from './section-service.ts';
import type { ServiceDeps } from './service-deps.ts';

/** How the match moves values, and how well it is known. */
interface Carrying {
  match: SheetMatch;
  sigmaPx: number | null;
}

/** Sections carried with their nets to another sheet of the same dam. Runs in a transaction of the caller. */
export function createCarryAcrossService(deps: Pick<ServiceDeps, 'manager' | 'clock' | 'live'>) {
  const { manager, clock } = deps;

  /** The section to carry from and the sheet to carry to: both of one dam, neither put away. */
  async function placesOf(sheetId: string, fromSectionId: string): Promise<[SectionPlace, SheetPlace]> {
    const to = await placeOfSheet(manager, sheetId);
    await lockSection(manager, fromSectionId);
    const from = await placeOfSection(manager, fromSectionId);
    // Whether there is a section of another dam by this id is nobody's business here.
    if (from.dam.id !== to.dam.id) throw notFound();
    refusePutAway(from);
    return [from, to];
  }

  async function carrySetOut(
    from: SectionPlace,
    sectionId: string,
    match: SheetMatch,
  ): Promise<CarriedSetOut> {
    const rows = await manager.find(DocumentEntityRow, {
      where: { sectionId: from.section.id, removed: false },
      order: { entityId: 'ASC' },
    });
    const { id, name } = from.section;
    const document = assembleDocument({ id, name, unitSystem: 'SI', datum: '', sheet: from.sheet }, rows);
    const carried = carriedSetOut(singleOf(document, 'setOut')!.value, fittedMap(document), match);
    const carriedOf = (value: DocumentEntity) =>
      value.kind === 'setOut' ? carried.setOut : value.kind === 'knownPoint' ? carried.pointOf(value) : value;
    // The set-out that a new section is made with gives way to the carried one.
    await manager.delete(DocumentEntityRow, { sectionId });
    await insertRows(
      manager,
      rows.map((row) => ({
        ...anew(row, clock.now()),
        ownerId: sectionId,
        sectionId,
        value: carriedOf(row.value),
      })),
    );
    return carried;
  }

  async function carryNet(
    source: NetEntity,
    id: string,
    sectionId: string,
    carrying: Carrying,
    actor: Actor,
  ) {
    const at = clock.now();
    const rows = await manager.find(DocumentEntityRow, {
      where: { netId: source.id, removed: false },
      order: { entityId: 'ASC' },
    });
    const copies = rows.map((row) => anew(row, at));
    const ids = new Map(rows.map((row, i) => [row.entityId, copies[i]!.entityId]));
    await manager.insert(NetEntity, {
      id,
      sectionId,
      name: source.name,
      unitSystem: source.unitSystem,
      changeNumber: '0',
      copiedFrom: source.id,
      createdBy: actor.id,
      createdAt: at,
      updatedAt: at,
    });
    await insertRows(
      manager,
      copies.map((row) => ({
        ...row,
        ownerId: id,
        netId: id,
        value: withIds(carriedValue(row.value, carrying.match, carrying.sigmaPx), ids),
      })),
    );
  }

  async function netsToCarry(
    fromSectionId: string,
    asked: CarriedSectionInput['nets'],
  ): Promise<NetEntity[]> {
    const nets = await manager.findBy(NetEntity, { sectionId: fromSectionId });
    return asked.map(({ fromNetId }) => {
      const net = nets.find(({ id }) => id === fromNetId);
      if (!net) throw notFound();
      return net;
    });
  }

  return {
    /**
     * Makes a section of the sheet that is set out as the one carried from, with copies of its nets, everything moved by
     * the match of the two sheets. Who drew a net drew its copy.
     * @throws AppError invalid-input when the places give no match or put the section off the sheet
     */
    async carry(sheetId: string, input: CarriedSectionInput, actor: Actor): Promise<CarriedSectionDto> {
      const [from, to] = await placesOf(sheetId, input.fromSectionId);
      const match = matchSheets(input.places, input.shape);
      if (match === null) throw noMatch();
      const { each, sigmaPx } = matchResiduals(match, input.places);
      const sources = await netsToCarry(from.section.id, input.nets);
      const { id, name } = input;
      const frame = from.section.frame === null ? null : carriedFrame(from.section.frame, match, to);
      await createSectionService(deps).create(
        sheetId,
        { id, name, chainage: from.section.chainage, frame },
        actor,
      );
      const { levelIsTyped } = await carrySetOut(from, id, match);
      for (const [index, source] of sources.entries()) {
        await carryNet(source, input.nets[index]!.id, id, { match, sigmaPx }, actor);
      }
      await writeEvent(manager, {
        damId: to.dam.id,
        drawingId: to.drawing.id,
        personId: actor.id,
        type: 'section.carried',
        text: `carried ${sectionTitle(from.section.name)} with ${netsInWords(sources.length)} from ${drawingTitle(from.drawing)} to ${drawingTitle(to.drawing)}`,
      });
      return {
        section: await sectionById(manager, id),
        residualsPx: [...each],
        told: levelIsTyped ? [LEVEL_TYPED] : [],
      };
    },
  };
}

const LEVEL_TYPED =
  "The set-out took the old sheet's own horizontal as level. The new sheet lies turned otherwise, so its known points now carry the offsets and elevations that the old set-out gave them.";

const netsInWords = (count: number) => (count === 0 ? 'no net' : count === 1 ? 'one net' : `${count} nets`);

/** A row as it is in a copy: first version, by the hand that drew it. */
function anew(row: DocumentEntityRow, at: Date): DocumentEntityRow {
  return { ...row, entityId: uuidv7(), version: 1, changeNumber: '0', clientId: null, changedAt: at };
}

/** The upright box about a frame on the sheet carried to, kept on that sheet. */
function carriedFrame(
  frame: readonly number[],
  match: SheetMatch,
  { sheet }: SheetPlace,
): [number, number, number, number] {
  const [left, top, width, height] = frame as [number, number, number, number];
  const corners = [
    [left, top],
    [left + width, top],
    [left, top + height],
    [left + width, top + height],
  ].map(([x, y]) => matched(match, x!, y!));
  const within = (value: number, most: number) => Math.min(most, Math.max(0, value));
  const xs = corners.map(([x]) => within(x, sheet.widthPx));
  const ys = corners.map(([, y]) => within(y, sheet.heightPx));
  const [x, y] = [Math.min(...xs), Math.min(...ys)];
  return [x, y, Math.max(...xs) - x, Math.max(...ys) - y];
}

function noMatch() {
  return invalidInput([
    {
      path: 'places',
      message:
        'These places do not tell how the sheets lie on one another: they coincide, lie on one line, or would mirror the drawing. Check that each pair shows the same place on both sheets.',
    },
  ]);
}
