import { plainText } from '#client/lib/figures.ts';
import { shortName } from '#client/lib/initials.ts';
import { deskPaletteText } from '#client/text/desk-palette.ts';
import { presenceText as text } from '#client/text/presence.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { PresentDesk } from '#shared/contract/presence.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { Guides } from '../model/guides.ts';

type Shown = { document: FlowNetDocument; reading: NetReading | null };

/** How somebody is called among those on a net. */
export function nameOf({ person }: PresentDesk, ownId: string | null): string {
  return person.id === ownId ? text.yourself : shortName(person.name);
}

/** What somebody does on the net: "R. Okafor is on equipotential 5". */
export function presenceSentence(desk: PresentDesk, name: string, shown: Shown): string {
  const thing = desk.entityId === null ? null : thingWords(desk.entityId, shown);
  if (thing !== null) return text.onThing(name, thing);
  // A newer page may have a tool that this one does not know.
  const tool = (deskPaletteText.tools as Readonly<Record<string, string>>)[desk.tool];
  return desk.tool === 'select' || tool === undefined ? text.looking(name) : text.withTool(name, tool);
}

function thingWords(id: string, { document, reading }: Shown): string | null {
  const value = document.entities[id]?.value;
  if (value?.kind === 'readingPoint') return text.point(value.name);
  if (value?.kind === 'knownPoint') return text.knownPoint(value.name);
  if (value?.kind !== 'line') return null;
  const kind = text.kinds[value.line].toLowerCase();
  const drops = value.line === 'equipotential' ? reading?.lines.find((line) => line.id === id)?.drops : null;
  const number = value.name || (drops == null ? '' : plainText(drops, 2));
  return number === '' ? kind : text.numbered(kind, number);
}

/** Where the thing is that somebody is on; null when it has no place of its own on the sheet. */
export function placeInHand(desk: PresentDesk, { document, reading }: Shown): SheetPoint | null {
  const value = desk.entityId === null ? undefined : document.entities[desk.entityId]?.value;
  if (value?.kind === 'line') return value.points[Math.floor(value.points.length / 2)] ?? null;
  if (value?.kind === 'knownPoint') return value.at;
  if (value?.kind !== 'readingPoint') return null;
  return reading?.points.find(({ id }) => id === desk.entityId)?.sheetAt ?? null;
}

/** The soft marks on the sheet of what others have in hand; null when there are none. */
export function presenceGuides(
  desks: readonly PresentDesk[],
  shown: Shown,
  ownId: string | null,
): Guides | null {
  const placed = desks.flatMap((desk) => {
    const at = placeInHand(desk, shown);
    return at === null ? [] : [{ desk, at }];
  });
  if (placed.length === 0) return null;
  const lines = placed.flatMap(({ desk }) => {
    const value = shown.document.entities[desk.entityId ?? '']?.value;
    if (value?.kind !== 'line' || value.points.length < 2) return [];
    return [{ id: desk.clientId, tone: 'otherHand' as const, points: value.points }];
  });
  const marks = placed.map(({ desk, at }) => ({
    id: desk.clientId,
    tone: 'otherHand' as const,
    at,
    text: nameOf(desk, ownId),
  }));
  return { areas: [], lines, marks };
}
