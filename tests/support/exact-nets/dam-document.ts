import {
  type DocumentEntity,
  type FlowNetDocument,
  type SheetPoint,
  UNSAID,
} from '#shared/contract/document.ts';
import { entityIdOf } from '#tests/support/exact-nets/exact-net-document.ts';

type Place = readonly [offset: number, elevation: number];

const PX = 20;

/**
 * The outline of a homogeneous dam without a net: upstream face 1 in 4 wetted to 18 m, crest, and a drain of 30 m at the
 * downstream end of the base or a free face of 1 in 2. Offsets grow with the flow; drawn at 20 px to the metre.
 */
export function damDocument({
  outlet,
  mirrored = false,
}: {
  outlet: 'drain' | 'face';
  mirrored?: boolean;
}): FlowNetDocument {
  const toSheet = ([x, z]: Place): SheetPoint => [mirrored ? 4000 - PX * x : 500 + PX * x, 2000 - PX * z];
  const line = (
    kind: Extract<DocumentEntity, { kind: 'line' }>['line'],
    places: readonly Place[],
    water: 'headwater' | null = null,
  ): DocumentEntity => ({
    kind: 'line',
    line: kind,
    name: '',
    points: places.map(toSheet),
    finished: true,
    water,
    head: null,
    drops: null,
    origin: 'traced',
  });
  const known = (name: string, at: Place): DocumentEntity => ({
    kind: 'knownPoint',
    name,
    at: toSheet(at),
    offset: at[0],
    elevation: at[1],
    use: 'fit',
  });
  const values: DocumentEntity[] = [
    known('K1', [0, 0]),
    known('K2', [146, 20]),
    {
      kind: 'setOut',
      method: 'points',
      distance: null,
      level: 'line',
      offsetsGrow: mirrored ? 'left' : 'right',
      upstream: mirrored ? 'right' : 'left',
      upQuarterTurns: null,
      statedScale: null,
      scales: 'equal',
    },
    line(
      'submergedFace',
      [
        [0, 0],
        [72, 18],
      ],
      'headwater',
    ),
    outlet === 'drain'
      ? line('drain', [
          [116, 0],
          [146, 0],
        ])
      : line('outflowFace', [
          [146, 0],
          [116, 15],
        ]),
    {
      kind: 'waterLevels',
      headwater: 18,
      tailwater: null,
      gammaW: 9.81,
      source: '',
      ...UNSAID.waterLevels,
    },
  ];
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: entityIdOf(0xda),
    name: '',
    unitSystem: 'SI',
    datum: '',
    sheet: { widthPx: 5000, heightPx: 3500, dpi: 300 },
    entities: Object.fromEntries(
      values.map((value, i) => [entityIdOf(i + 1), { id: entityIdOf(i + 1), version: 1, value }]),
    ),
  };
}
