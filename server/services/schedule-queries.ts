import type { EntityManager } from 'typeorm';
import { AppError } from '#server/errors/app-error.ts';
import type { FlowNetDocument, UnitSystem } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { BYTE_ORDER_MARK } from '#shared/text/csv.ts';
import type { DecimalMark } from '#shared/text/number-text.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { readDocument } from './net-document.ts';
import { type NetPlace, placeOfNet } from './net-place.ts';
import { createReadingCache } from './reading-cache.ts';
import { readInThread } from './reading-threads.ts';

/** A reading of a big net takes some 100 kB. */
const READINGS_KEPT = 64;
/** Lists ask of every net of a dam, and need no more than a word of each. */
const STATES_KEPT = 10_000;

const readings = createReadingCache<NetReading>(READINGS_KEPT);
const states = createReadingCache<NetReading['state']>(STATES_KEPT);

/** A file to download. */
export interface Download {
  fileName: string;
  text: string;
}

/** The schedule and everything else read off the net as it stands. @throws AppError not-found */
export async function scheduleOf(manager: EntityManager, netId: string): Promise<NetReading> {
  return readingOf(manager, await placeOfNet(manager, netId));
}

/**
 * The reading of a net as it stands, kept from the last time when nothing changed.
 * @throws AppError net-unfinished when the net is such a tangle that it cannot be read in time
 */
export function readingOf(manager: EntityManager, place: NetPlace): Promise<NetReading> {
  return readings.get(keyOf({ ...place.net, datum: place.dam.datum }), async () =>
    readInThread(await readDocument(manager, place)),
  );
}

/** What of a net its reading depends on besides the entities, which the change number stands for. */
interface ReadState {
  id: string;
  changeNumber: string;
  name: string;
  unitSystem: UnitSystem;
  datum: string;
}

const keyOf = ({ id, changeNumber, name, unitSystem, datum }: ReadState) =>
  JSON.stringify([id, changeNumber, name, unitSystem, datum]);

/**
 * Whether the net as it stands can be read; a net that takes too long to read cannot. Costs nothing for a net that was
 * asked about before and has not changed since.
 */
export async function canBeRead(manager: EntityManager, net: ReadState): Promise<boolean> {
  const state = await states.get(keyOf(net), async () => {
    const reading = await readingIfAny(manager, await placeOfNet(manager, net.id));
    return reading?.state ?? 'unfinished';
  });
  return state === 'read';
}

/** As `readingOf`, with null for a net that cannot be read: for lists, which one tangle must not spoil. */
export async function readingIfAny(manager: EntityManager, place: NetPlace): Promise<NetReading | null> {
  try {
    return await readingOf(manager, place);
  } catch (error) {
    if (error instanceof AppError) return null;
    throw error;
  }
}

/** The schedule as CSV. */
export async function scheduleFile(
  manager: EntityManager,
  netId: string,
  mark: DecimalMark = '.',
): Promise<Download> {
  const place = await placeOfNet(manager, netId);
  const reading = await readingOf(manager, place);
  const { unitSystem } = place.net;
  return {
    fileName: fileNameOf(place, 'csv'),
    text: BYTE_ORDER_MARK + scheduleCsv({ unitSystem, datum: place.dam.datum }, reading, mark),
  };
}

/** The net's document as the command line and other programs read it. */
export async function documentFile(manager: EntityManager, netId: string): Promise<Download> {
  const place = await placeOfNet(manager, netId);
  const document: FlowNetDocument = await readDocument(manager, place);
  return { fileName: fileNameOf(place, 'json'), text: `${JSON.stringify(document, null, 2)}\n` };
}

/** Drawing, section and net, without the characters that file systems keep for themselves. */
export function fileNameOf({ drawing, section, net }: NetPlace, extension: string): string {
  const words = [drawing.number, sectionTitle(section.name), net.name].filter(Boolean).join(' ');
  const safe = words
    .replaceAll(/[\\/:*?"<>|\p{Cc}]/gu, '-')
    .replaceAll(/\s+/g, ' ')
    .slice(0, 120);
  return `${safe}.${extension}`;
}
