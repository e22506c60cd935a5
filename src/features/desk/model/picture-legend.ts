import {
  type EntityKind,
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type TracedLine,
} from '#shared/contract/document.ts';
import type { HideableKind } from './desk-state.ts';

/** How a line came about, as far as it is drawn otherwise for it. */
export type LineWay = TracedLine['origin'] | 'unfinished';

/** What the legend explains: kinds of line, lines that are only begun or guessed, and marks. */
export type LegendEntry =
  | { readonly shows: 'line'; readonly kind: LineKind; readonly way: LineWay }
  | { readonly shows: 'knownPoint' | 'readingPoint' | 'profile' | 'note' | 'head' };

const LINE_ORDER: readonly LineKind[] = [
  'equipotential',
  'flowLine',
  'phreaticLine',
  'submergedFace',
  'outflowFace',
  'drain',
  'impervious',
  'ground',
  'soilBoundary',
];

const ORIGINS: ReadonlyArray<TracedLine['origin']> = ['traced', 'adopted', 'guessed'];

/** What is drawn over a sheet, in the order of the palette; nothing that is hidden. */
export function legendEntries(
  document: FlowNetDocument,
  hidden: readonly HideableKind[],
  shown: { readonly notes: number; readonly heads: boolean },
): LegendEntry[] {
  const has = (kind: EntityKind & HideableKind) =>
    !hidden.includes(kind) && entitiesOf(document, kind).length > 0;
  const marks: LegendEntry[] = [];
  if (shown.heads && !hidden.includes('equipotential')) marks.push({ shows: 'head' });
  if (has('readingPoint')) marks.push({ shows: 'readingPoint' });
  if (has('knownPoint')) marks.push({ shows: 'knownPoint' });
  if (has('profile')) marks.push({ shows: 'profile' });
  if (shown.notes > 0 && !hidden.includes('note')) marks.push({ shows: 'note' });
  return [...lineEntries(document, hidden), ...marks];
}

function lineEntries(document: FlowNetDocument, hidden: readonly HideableKind[]): LegendEntry[] {
  const lines = entitiesOf(document, 'line').filter(({ value }) => value.points.length > 1);
  return LINE_ORDER.filter((kind) => !hidden.includes(kind)).flatMap((kind) => {
    const own = lines.filter(({ value }) => value.line === kind).map(({ value }) => value);
    const ways: LineWay[] = ORIGINS.filter((origin) =>
      own.some((line) => line.finished && line.origin === origin),
    );
    if (own.some((line) => !line.finished)) ways.push('unfinished');
    return ways.map((way): LegendEntry => ({ shows: 'line', kind, way }));
  });
}
