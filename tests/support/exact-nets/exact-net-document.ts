import type { ExactNet, ExactPlace } from '#shared/compute/exact/exact-net.ts';
import { type Similarity, similarityBackward } from '#shared/compute/similarity.ts';
import {
  type DocumentEntity,
  type EntityOf,
  type FlowNetDocument,
  type SheetPoint,
  UNSAID,
  type UnitSystem,
} from '#shared/contract/document.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

/** How an exact net is drawn on a sheet and traced from it. */
export type Tracing = {
  unitSystem?: UnitSystem;
  /** Pixels of sheet to a length unit. */
  pxPerUnit?: number;
  /** Clockwise turn of the sheet. */
  turnDeg?: number;
  /** Where the middle of the net comes to lie on the sheet. */
  centre?: readonly [number, number];
  /** True to draw the section with offsets growing to the left. */
  mirrored?: boolean;
  /** Standard deviation of the hand's tremor, and its seed. */
  jitterPx?: number;
  seed?: number;
  /** Distance between vertices along the lines. */
  spacingPx?: number;
  gammaW?: number;
  /** Lengths of the closed form are multiplied by this: 1 / 0.3048 to trace the same net in feet. */
  lengthFactor?: number;
  readings?: ReadonlyArray<{ at: ExactPlace; clicked: boolean }>;
};

/** What of an exact net is drawn. */
type DrawnNet = Pick<ExactNet, 'lines' | 'headwater' | 'tailwater' | 'drops'>;

const SHEET = { widthPx: 5000, heightPx: 3500, dpi: 300 };

/** An id of the nth entity, in the form of a UUIDv7. */
export function entityIdOf(n: number): string {
  return `01930000-0000-7000-8000-${n.toString(16).padStart(12, '0')}`;
}

/** The map by which the net is drawn on the sheet. */
export function sheetMapOf(net: DrawnNet, tracing: Tracing): Similarity {
  const factor = tracing.lengthFactor ?? 1;
  const places = net.lines.flatMap((line) => [0, 0.5, 1].map((part) => line.at(part)));
  const middle = [0, 1].map((axis) => {
    const values = places.map((place) => place[axis]!);
    return ((Math.min(...values) + Math.max(...values)) / 2) * factor;
  });
  const turn = ((tracing.turnDeg ?? 1.1) * Math.PI) / 180;
  const scale = 1 / (tracing.pxPerUnit ?? 60);
  return {
    re: scale * Math.cos(turn),
    im: scale * Math.sin(turn),
    sheetOrigin: tracing.centre ?? [SHEET.widthPx / 2, SHEET.heightPx / 2],
    sectionOrigin: [middle[0]!, middle[1]!],
    mirrored: tracing.mirrored ?? false,
  };
}

/**
 * A finished document of an exact net, traced on a sheet of 5,000 px that is turned by about a degree, with known
 * points, all boundaries marked, water levels and the counts stated.
 */
export function exactNetDocument(net: DrawnNet, tracing: Tracing = {}): FlowNetDocument {
  const map = sheetMapOf(net, tracing);
  const factor = tracing.lengthFactor ?? 1;
  const spacing = (tracing.spacingPx ?? 14) / ((tracing.pxPerUnit ?? 60) * factor);
  const noise = seededNoise(tracing.seed ?? 1);
  const jitter = tracing.jitterPx ?? 0;
  const toSheet = ([offset, elevation]: ExactPlace): SheetPoint =>
    similarityBackward(map, offset * factor, elevation * factor);
  const trembled = ([x, y]: SheetPoint): SheetPoint => [x + jitter * noise(), y + jitter * noise()];
  const values: DocumentEntity[] = [
    ...knownPoints(net, factor, toSheet),
    setOutOf(tracing.mirrored ?? false),
    ...net.lines.map(
      (line): EntityOf<'line'> => ({
        kind: 'line',
        origin: 'traced',
        line: line.line,
        name: '',
        points: evenly(line.at, spacing).map(toSheet).map(trembled),
        finished: true,
        water: line.water,
        head: null,
        drops: null,
      }),
    ),
    waterLevels(net, factor, tracing),
    { kind: 'permeability', ...UNSAID.soil, k: 2.5e-6, unit: 'm/s', factor: null, source: 'assumed' },
    {
      kind: 'netCount',
      countedIn: null,
      drops: net.drops,
      channels: null,
      cellRatio: 1,
      tracingAccuracyPx: 1.5,
      knownPointAccuracyPx: 1,
    },
    ...(tracing.readings ?? []).map(
      ({ at, clicked }, i): EntityOf<'readingPoint'> => ({
        kind: 'readingPoint',
        ...UNSAID.readingPoint,
        name: `P${i + 1}`,
        place: clicked
          ? { on: 'sheet', at: toSheet(at) }
          : { on: 'section', offset: at[0] * factor, elevation: at[1] * factor },
        order: i,
      }),
    ),
  ];
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: entityIdOf(0xfff0),
    name: 'Exact net',
    unitSystem: tracing.unitSystem ?? 'SI',
    datum: 'LD',
    sheet: SHEET,
    entities: Object.fromEntries(
      values.map((value, i) => [entityIdOf(i + 1), { id: entityIdOf(i + 1), version: 1, value }]),
    ),
  };
}

/** Three known points about the net, so that the calibration has a residual and settles its handedness. */
function knownPoints(
  net: DrawnNet,
  factor: number,
  toSheet: (place: ExactPlace) => SheetPoint,
): Array<EntityOf<'knownPoint'>> {
  const places = net.lines.flatMap((line) => [0, 0.5, 1].map((part) => line.at(part)));
  const offsets = places.map((place) => place[0]);
  const elevations = places.map((place) => place[1]);
  const corners: ExactPlace[] = [
    [Math.min(...offsets), Math.min(...elevations)],
    [Math.max(...offsets), Math.min(...elevations)],
    [Math.min(...offsets), Math.max(...elevations)],
  ];
  return corners.map((corner, i) => ({
    kind: 'knownPoint',
    name: `K${i + 1}`,
    at: toSheet(corner),
    offset: corner[0] * factor,
    elevation: corner[1] * factor,
    use: 'fit',
  }));
}

function setOutOf(mirrored: boolean): EntityOf<'setOut'> {
  return {
    kind: 'setOut',
    scales: 'equal',
    method: 'points',
    distance: null,
    level: 'line',
    offsetsGrow: null,
    upstream: mirrored ? 'right' : 'left',
    upQuarterTurns: null,
    statedScale: null,
  };
}

function waterLevels(net: DrawnNet, factor: number, tracing: Tracing): EntityOf<'waterLevels'> {
  return {
    kind: 'waterLevels',
    ...UNSAID.waterLevels,
    headwater: net.headwater * factor,
    tailwater: net.tailwater === null ? null : net.tailwater * factor,
    gammaW: tracing.gammaW ?? (tracing.unitSystem === 'US' ? 62.4 : 9.81),
    source: 'load case',
  };
}

/**
 * Points about evenly spaced along a smooth line, ends included, `spacing` in the net's own unit: so the vertices fall
 * on the same places however the net lies on the sheet.
 */
function evenly(at: (part: number) => ExactPlace, spacing: number): ExactPlace[] {
  const fine = Array.from({ length: 2001 }, (_, i) => at(i / 2000));
  const lengths = [0];
  for (let i = 1; i < fine.length; i += 1) {
    lengths.push(lengths[i - 1]! + Math.hypot(fine[i]![0] - fine[i - 1]![0], fine[i]![1] - fine[i - 1]![1]));
  }
  const whole = lengths[lengths.length - 1]!;
  const count = Math.max(1, Math.round(whole / spacing));
  const points: ExactPlace[] = [];
  let i = 0;
  for (let k = 0; k <= count; k += 1) {
    const wanted = (whole * k) / count;
    while (i < fine.length - 1 && lengths[i]! < wanted) i += 1;
    points.push(fine[i]!);
  }
  return points;
}
