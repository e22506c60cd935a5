import { type EntityOf, type FlowNetDocument, type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import { changed, withAdded } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

type Place = readonly [offset: number, elevation: number];

const PX = 100;
/** Height of the exit point on the downstream face, from a free-surface solution (published case 2-12). */
const EXIT = 3.67;

const toSheet = ([x, z]: Place): SheetPoint => [500 + PX * x, 2000 - PX * z];

function line(kind: EntityOf<'line'>['line'], places: readonly Place[], water: 'headwater' | null = null) {
  const points = places.map(toSheet);
  return {
    kind: 'line',
    origin: 'traced',
    line: kind,
    name: '',
    points,
    finished: true,
    water,
    head: null,
    drops: null,
  } satisfies EntityOf<'line'>;
}

/** Offset at which the phreatic line has an elevation: a parabola from the headwater to the exit point. */
const phreaticOffset = (z: number) => (10 * (100 - z * z)) / (100 - EXIT * EXIT);

/** Offset at which the base has a head, after Dupuit (1863). */
const baseOffset = (h: number) => (100 - h * h) / 10;

/**
 * A dam with vertical faces, 10 m of water against it, 10 m thick, that drains freely down its downstream face: not an
 * exact net but one with the right boundaries. Equipotentials of heads below the exit point end on that face at the
 * elevation of their head.
 */
export function freeOutflowNet(places: ReadonlyArray<{ at: Place }>): FlowNetDocument {
  const empty = changed(exactNetDocument(EXACT_NETS[0]!.net), 'line', () => null);
  const steps = Array.from({ length: 21 }, (_, i) => i / 20);
  const traced = withAdded(
    empty,
    line(
      'submergedFace',
      [
        [0, 0],
        [0, 10],
      ],
      'headwater',
    ),
    line('impervious', [
      [0, 0],
      [10, 0],
    ]),
    line(
      'phreaticLine',
      steps.map((part) => {
        const z = 10 - part * (10 - EXIT);
        return [phreaticOffset(z), z];
      }),
    ),
    line('outflowFace', [
      [10, EXIT],
      [10, 0],
    ]),
    ...Array.from({ length: 9 }, (_, i) => {
      const head = 9 - i;
      const top: Place = head > EXIT ? [phreaticOffset(head), head] : [10, head];
      return line('equipotential', [[baseOffset(head), 0], top]);
    }),
    ...places.map(
      ({ at }, i): EntityOf<'readingPoint'> => ({
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
  const levels = changed(known, 'waterLevels', (value) => ({ ...value, headwater: 10, tailwater: null }));
  return changed(levels, 'netCount', (value) => ({ ...value, drops: 10 }));
}
