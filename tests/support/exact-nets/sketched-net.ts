import { type EntityOf, type FlowNetDocument, type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import { changed, withAdded } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

type Place = readonly [offset: number, elevation: number];
type Line = EntityOf<'line'>;

export type SketchedLine = Pick<Line, 'line'> &
  Partial<Pick<Line, 'name' | 'water' | 'head' | 'drops'>> & { readonly through: readonly Place[] };

const PX = 100;
const toSheet = ([x, z]: Place): SheetPoint => [500 + PX * x, 2000 - PX * z];

/** A net sketched by straight pieces on a section of metres, for what hangs on order and count alone. */
export function sketchedNet(
  lines: readonly SketchedLine[],
  facts: { headwater: number | null; tailwater: number | null; drops: number | null },
  places: readonly Place[] = [],
): FlowNetDocument {
  const empty = changed(exactNetDocument(EXACT_NETS[0]!.net), 'line', () => null);
  const traced = withAdded(
    empty,
    ...lines.map(
      ({ through, ...line }): Line => ({
        kind: 'line',
        origin: 'traced',
        name: '',
        finished: true,
        water: null,
        head: null,
        drops: null,
        ...line,
        points: through.map(toSheet),
      }),
    ),
    ...places.map(
      (at, i): EntityOf<'readingPoint'> => ({
        kind: 'readingPoint',
        ...UNSAID.readingPoint,
        name: `P${i + 1}`,
        place: { on: 'section', offset: at[0], elevation: at[1] },
        order: i,
      }),
    ),
  );
  const corners: Place[] = [
    [0, 0],
    [10, 0],
    [0, 10],
  ];
  const known = changed(traced, 'knownPoint', (value, i) => ({
    ...value,
    at: toSheet(corners[i]!),
    offset: corners[i]![0],
    elevation: corners[i]![1],
  }));
  const levels = changed(known, 'waterLevels', (value) => ({
    ...value,
    headwater: facts.headwater,
    tailwater: facts.tailwater,
  }));
  return changed(levels, 'netCount', (value) => ({ ...value, drops: facts.drops }));
}
