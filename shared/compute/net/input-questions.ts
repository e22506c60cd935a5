import { makeFinding } from '#shared/compute/findings.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import type { PlacedPoint } from '#shared/compute/net/read-point.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { permeabilityInMetresPerSecond } from '#shared/compute/units.ts';
import type { EntityOf, UnitSystem } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** A unit weight this many times beyond the range of waters is none of water: it belongs to another unit. */
const NO_WATER = 1.5;

/** Soils and rocks lie within these permeabilities, m/s; what lies outside is more often a slip of the unit. */
const LEAST_K = 1e-13;
const GREATEST_K = 1;
/** Cells of a drawn net lie within these ratios of width across the flow to length along it. */
const LEAST_CELL_RATIO = 0.2;
const GREATEST_CELL_RATIO = 5;
/** A point farther than this off the traced section, in metres, is more often a slip of the sign or of the figure. */
const FAR_METRES = 100;
const FAR_FEET = 330;
/** No dam holds its water this high above its own section. */
const HIGH_METRES = 350;
const HIGH_FEET = 1150;

/** Questions about the water levels: each is plausible by itself but not beside the others. */
export function questionLevels(water: EntityOf<'waterLevels'>, potentials: readonly Potential[]): Finding[] {
  const findings: Finding[] = [];
  const { headwater, tailwater } = water;
  if (headwater === null) return [];
  if (tailwater !== null && headwater < tailwater) {
    findings.push(
      makeFinding(
        'question',
        'headwaterBelowTailwater',
        'The headwater lies below the tailwater. Check both levels.',
        {
          cell: 'headwater',
        },
      ),
    );
  }
  for (const potential of potentials) {
    const { kind } = potential.line;
    if ((kind === 'drain' || kind === 'outflowFace') && potential.outHead >= headwater) {
      findings.push(
        makeFinding(
          'question',
          'outletAboveHeadwater',
          `The head at ${potential.label} is not below the headwater. Check the level of both.`,
          {
            cell: 'outlet',
            entityIds: [potential.id],
          },
        ),
      );
    }
  }
  return findings;
}

/**
 * Questions a unit weight of water that belongs to the other unit system or to no water: outside 9.7 to 10.4 kN/m³
 * (62 to 66 lb/ft³), the range from warm fresh water to sea water. One that is off by half or more is refused, as every
 * pressure would be.
 */
export function questionUnitWeight(gammaW: number, system: UnitSystem): Finding[] {
  const [least, greatest, unit] = system === 'SI' ? [9.7, 10.4, 'kN/m³'] : [62, 66, 'lb/ft³'];
  if (gammaW >= least && gammaW <= greatest) return [];
  const isNoWater = gammaW < least / NO_WATER || gammaW > greatest * NO_WATER;
  const entered = `The unit weight of water is entered as ${gammaW} ${unit}; water lies between ${least} and ${greatest}.`;
  return [
    makeFinding(
      isNoWater ? 'wrong' : 'question',
      'unitWeightImplausible',
      isNoWater
        ? `${entered} Every pressure would be as many times too great or too small: correct the figure, which may be one of another unit.`
        : `${entered} Check the figure and its unit.`,
      { cell: 'headwater' },
    ),
  ];
}

/** Questions a permeability outside 10⁻¹³ to 1 m/s, whatever its unit; says when none is entered. */
export function questionPermeability(permeability: EntityOf<'permeability'>): Finding[] {
  if (permeability.k === null) {
    return [
      makeFinding('note', 'permeabilityMissing', 'Without a permeability no seepage is given.', {
        cell: 'permeability',
      }),
    ];
  }
  const k = permeabilityInMetresPerSecond(permeability.k, permeability.unit);
  if (k >= LEAST_K && k <= GREATEST_K) return [];
  return [
    makeFinding(
      'question',
      'permeabilityImplausible',
      'The permeability lies outside the range of soils and rock, 1e-13 to 1 m/s. Check the figure and its unit.',
      { cell: 'permeability' },
    ),
  ];
}

/** Questions a ratio of the cells, B/L, outside 0.2 to 5: more often its inverse, or a count typed in its place. */
export function questionCellRatio(cellRatio: number): Finding[] {
  if (cellRatio >= LEAST_CELL_RATIO && cellRatio <= GREATEST_CELL_RATIO) return [];
  return [
    makeFinding(
      'question',
      'cellRatioImplausible',
      `B/L is entered as ${cellRatio}; the cells of a net lie between ${LEAST_CELL_RATIO} and ${GREATEST_CELL_RATIO}. Check that it is the width of a cell across the flow over its length along it.`,
      { cell: 'channels' },
    ),
  ];
}

/** Least and greatest offset and elevation of everything traced, document length unit. */
export type SectionExtent = {
  readonly offsets: readonly [number, number];
  readonly elevations: readonly [number, number];
};

/** Extent of the traced lines in the section; null when nothing is traced. Corners of boxes stand for the lines. */
export function extentOf(lines: readonly NetLine[], map: SectionMap): SectionExtent | null {
  const corners = lines.flatMap(({ shape: { box } }) => [
    map.toSection(sheetPx(box.minX, box.minY)),
    map.toSection(sheetPx(box.maxX, box.minY)),
    map.toSection(sheetPx(box.minX, box.maxY)),
    map.toSection(sheetPx(box.maxX, box.maxY)),
  ]);
  if (corners.length === 0) return null;
  const range = (values: number[]): [number, number] => [Math.min(...values), Math.max(...values)];
  return { offsets: range(corners.map((at) => at[0])), elevations: range(corners.map((at) => at[1])) };
}

/** Questions a headwater that stands above everything traced higher than any dam, as one with a digit too many does. */
export function questionHeadwater(
  headwater: number | null,
  extent: SectionExtent | null,
  system: UnitSystem,
): Finding[] {
  if (headwater === null || extent === null) return [];
  const [limit, unit] = system === 'SI' ? [HIGH_METRES, 'm'] : [HIGH_FEET, 'ft'];
  if (headwater - extent.elevations[1] <= limit) return [];
  return [
    makeFinding(
      'question',
      'headwaterFarAbove',
      `The headwater stands more than ${limit} ${unit} above everything that is traced. Check the level and the known points.`,
      { cell: 'headwater' },
    ),
  ];
}

/**
 * Questions a point that lies more than 100 m (330 ft) off everything that is traced, as the place of a point typed
 * with a slip does.
 */
export function questionPlace(
  point: PlacedPoint,
  extent: SectionExtent | null,
  system: UnitSystem,
): Finding[] {
  const { offset, elevation } = point;
  if (offset === null || elevation === null || extent === null) return [];
  const off = Math.hypot(beyond(offset, extent.offsets), beyond(elevation, extent.elevations));
  const [limit, unit] = system === 'SI' ? [FAR_METRES, 'm'] : [FAR_FEET, 'ft'];
  if (off <= limit) return [];
  return [
    makeFinding(
      'question',
      'pointFarOff',
      `The point lies more than ${limit} ${unit} off the traced section. Check its coordinates.`,
      { entityIds: [point.id], at: point.sheetAt },
    ),
  ];
}

function beyond(value: number, [least, greatest]: readonly [number, number]): number {
  return Math.max(0, least - value, value - greatest);
}
