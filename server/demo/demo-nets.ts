import { type DocumentEntity, type LineKind, type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import {
  BASE,
  equipotentialAt,
  FULL_SUPPLY,
  flowLineAt,
  netPoint,
  sectionBB,
  sectionCC,
  seepage,
} from './embankment.ts';
import { type SheetFrame, toSheet } from './sheet-frame.ts';
import {
  apronEquipotential,
  apronFlowLine,
  bedOf,
  CHANNELS,
  DROPS,
  GROUND,
  HEADWATER,
  spillwayFrame,
  TAILWATER,
} from './spillway-apron.ts';

type Place = readonly [offset: number, elevation: number];

const onSheet = (frame: SheetFrame, [offset, elevation]: Place): SheetPoint => {
  const [x, y] = toSheet(frame, offset, elevation);
  return [Math.round(x * 10) / 10, Math.round(y * 10) / 10];
};

function line(
  frame: SheetFrame,
  kind: LineKind,
  name: string,
  places: readonly Place[],
  water: 'headwater' | 'tailwater' | null = null,
): DocumentEntity {
  const points = places.map((place) => onSheet(frame, place));
  return {
    kind: 'line',
    origin: 'traced',
    line: kind,
    name,
    points,
    finished: true,
    water,
    head: null,
    drops: null,
  };
}

function knownPoint(frame: SheetFrame, name: string, place: Place, use: 'fit' | 'check'): DocumentEntity {
  return { kind: 'knownPoint', name, at: onSheet(frame, place), offset: place[0], elevation: place[1], use };
}

const readingPoint = (name: string, order: number, [offset, elevation]: Place): DocumentEntity => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name,
  place: { on: 'section', offset, elevation },
  order,
});

/** What a single entity of a fresh net or section becomes: fields to overwrite, by kind. */
export interface SingleValues {
  setOut?: { statedScale: number; upstream: 'left' | 'right' };
  waterLevels?: { headwater: number; tailwater: number | null; source: string };
  permeability?: { k: number; unit: 'm/s'; factor: number; source: string };
  netCount?: { drops: number };
}

export interface DemoNet {
  section: DocumentEntity[];
  entities: DocumentEntity[];
  singles: SingleValues;
}

const bbKnownPoints = [
  knownPoint(sectionBB, 'K1', [-70, BASE], 'fit'),
  knownPoint(sectionBB, 'K2', [50, BASE], 'fit'),
];

const bbPoints: ReadonlyArray<readonly [string, Place]> = [
  ['P1', [-6, 102.2]],
  ['P2', [2, 100.1]],
  ['P3', [8, 101.4]],
  ['P4', [15, 100.6]],
];

/** Section B–B at full supply: the finished net, exact for this section. */
export function fullSupplyNet(): DemoNet {
  const equipotentials = Array.from({ length: 9 }, (_, index) =>
    line(sectionBB, 'equipotential', '', equipotentialAt(seepage.H * (1 - (index + 1) / 10))),
  );
  return {
    section: bbKnownPoints,
    entities: [
      line(sectionBB, 'submergedFace', 'Face of the earth body', equipotentialAt(seepage.H), 'headwater'),
      ...equipotentials,
      line(sectionBB, 'flowLine', '', flowLineAt(1 / 3)),
      line(sectionBB, 'flowLine', '', flowLineAt(2 / 3)),
      line(sectionBB, 'phreaticLine', '', flowLineAt(1)),
      line(sectionBB, 'impervious', 'Top of blue clay', [netPoint(seepage.H, 0), netPoint(0, 0)]),
      line(sectionBB, 'drain', 'Gravel blanket', [netPoint(0, 0), netPoint(0, 1)]),
      ...bbPoints.map(([name, place], index) => readingPoint(name, index + 1, place)),
    ],
    singles: {
      setOut: { statedScale: 400, upstream: 'left' },
      waterLevels: { headwater: FULL_SUPPLY, tailwater: null, source: 'Full supply level as on the drawing' },
      permeability: { k: 2e-7, unit: 'm/s', factor: 3, source: 'Two falling-head tests of 1961' },
      netCount: { drops: 10 },
    },
  };
}

/** Section B–B with the outlet still to trace: what an engineer leaves at the end of a day. */
export function halfTracedNet(): DemoNet {
  const { entities, singles } = fullSupplyNet();
  const isDrain = (entity: DocumentEntity) => entity.kind === 'line' && entity.line === 'drain';
  let equipotentialsKept = 0;
  const kept = entities.filter((entity) => {
    if (isDrain(entity)) return false;
    if (entity.kind !== 'line' || entity.line !== 'equipotential') return true;
    equipotentialsKept += 1;
    return equipotentialsKept <= 5;
  });
  return { section: [], entities: kept, singles: { ...singles, netCount: { drops: 10 } } };
}

/** Section C–C: to scale, not traced. */
export const sectionCCKnownPoints = (): DocumentEntity[] => [
  knownPoint(sectionCC, 'K1', [-70, BASE], 'fit'),
  knownPoint(sectionCC, 'K2', [50, BASE], 'fit'),
];

/** The spillway apron: a finished net, exact for this section, with a third point to check the scale. */
export function apronNet(): DemoNet {
  const equipotentials = Array.from({ length: DROPS - 1 }, (_, index) =>
    line(spillwayFrame, 'equipotential', '', apronEquipotential(index + 1)),
  );
  const flowLines = Array.from({ length: CHANNELS }, (_, index) =>
    line(spillwayFrame, 'flowLine', '', apronFlowLine(index + 1)),
  );
  return {
    section: [
      knownPoint(spillwayFrame, 'K1', [-40, GROUND], 'fit'),
      knownPoint(spillwayFrame, 'K2', [40, GROUND], 'fit'),
      knownPoint(spillwayFrame, 'K3', [-44, HEADWATER], 'check'),
    ],
    entities: [
      line(spillwayFrame, 'submergedFace', 'Bed upstream', bedOf('upstream'), 'headwater'),
      line(spillwayFrame, 'submergedFace', 'Bed downstream', bedOf('downstream'), 'tailwater'),
      line(spillwayFrame, 'impervious', 'Underside of the apron', [
        [-10, GROUND],
        [10, GROUND],
      ]),
      ...equipotentials,
      ...flowLines,
      readingPoint('S1', 1, [-7, 95.2]),
      readingPoint('S2', 2, [0, 94.5]),
      readingPoint('S3', 3, [7, 95.2]),
    ],
    singles: {
      setOut: { statedScale: 300, upstream: 'left' },
      waterLevels: { headwater: HEADWATER, tailwater: TAILWATER, source: 'Levels on the drawing' },
      permeability: { k: 4e-5, unit: 'm/s', factor: 2, source: 'Pumping test of 1957' },
      netCount: { drops: DROPS },
    },
  };
}
