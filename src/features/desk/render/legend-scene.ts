import type { LegendEntry } from '../model/picture-legend.ts';
import type { Box } from '../model/picture-page.ts';
import type { LineWeight } from '../model/view-aids.ts';
import { COLOURS, tracedLook, unfinishedLook, weighted } from './line-look.ts';
import { PROFILE_LOOK } from './profile-items.ts';
import type { MarkShape, SceneItem } from './scene.ts';

/** Samples of what is drawn, as the sheet shows it, each in its box; lengths in screen pixels of the page. */
export function legendScene(
  entries: ReadonlyArray<{ entry: LegendEntry; box: Box }>,
  weight: LineWeight,
): SceneItem[] {
  return entries.map(({ entry, box }, i) => sampleOf(`legend ${i}`, entry, box, weight));
}

const MARKS: Record<
  'knownPoint' | 'readingPoint' | 'note' | 'head',
  { shape: MarkShape; colour: string; text: string }
> = {
  knownPoint: { shape: 'knownPoint', colour: COLOURS.ink, text: '' },
  readingPoint: { shape: 'readingPoint', colour: COLOURS.point, text: '' },
  note: { shape: 'balloon', colour: COLOURS.ink, text: '1' },
  head: { shape: 'label', colour: COLOURS.equipotential, text: '112' },
};
const NO_OFFSET = [0, 0] as const;

function sampleOf(id: string, entry: LegendEntry, box: Box, weight: LineWeight): SceneItem {
  const y = box.y + box.height / 2;
  if (entry.shows === 'line' || entry.shows === 'profile') {
    const look = entry.shows === 'line' ? weighted(lineLookOf(entry), weight) : PROFILE_LOOK;
    const points = [
      [box.x + 3, y],
      [box.x + box.width - 3, y],
    ] as const;
    return { id, shape: 'line', points: points.map(([px, py]) => [px, py]), look, strong: false };
  }
  const { shape, colour, text } = MARKS[entry.shows];
  return { id, shape, at: [box.x + box.width / 2, y], colour, text, strong: false, offsetPx: NO_OFFSET };
}

function lineLookOf({ kind, way }: Extract<LegendEntry, { shows: 'line' }>) {
  if (way === 'unfinished') return unfinishedLook(kind);
  return tracedLook(kind, way);
}

/** Entries that look the same are one: an adopted line is an ordinary one where it is drawn as such. */
export function distinctEntries(entries: readonly LegendEntry[]): LegendEntry[] {
  const seen = new Set<string>();
  return entries.filter((entry) => {
    if (entry.shows !== 'line') return true;
    const look = JSON.stringify(lineLookOf(entry));
    const key = `${entry.kind} ${look}`;
    const isNew = !seen.has(key);
    seen.add(key);
    return isNew;
  });
}
