import type { PointReading } from '#shared/contract/reading.ts';
import type { BlindPoint } from '#shared/contract/review.ts';

/** The levels between which a reviewer counts. Heads and elevations in the document's length unit. */
export interface CountedBetween {
  headwater: number;
  /** Head at the outlet to which the drops were counted. */
  outletHead: number;
  /** Drops Nd of the whole net. */
  drops: number;
}

/**
 * Total head after `dropsLost` of the drops counted, h = H − n·(H − T)/Nd, in the unit of the levels. Source: the usual
 * reading of a flow net by eye (Casagrande 1937); holds for drops that are all equal.
 */
export function headAfterDrops({ headwater, outletHead, drops }: CountedBetween, dropsLost: number): number {
  return headwater - (dropsLost * (headwater - outletHead)) / drops;
}

/**
 * Pore pressure u = γw·(h − z), kPa for kN/m³ and metres, lb/ft² for lb/ft³ and feet. Above the water it is 0: suction
 * is left out, as in the schedule.
 */
export function pressureOf(totalHead: number, elevation: number, gammaW: number): number {
  return Math.max(0, gammaW * (totalHead - elevation));
}

/** A figure of the reviewer's beside the engineer's. */
export interface Beside {
  own: number | null;
  net: number | null;
  /** Own minus the engineer's; null where one of them is lacking. */
  difference: number | null;
}

/** One point read twice. */
export interface BlindRow {
  pointId: string;
  name: string;
  offset: Beside;
  elevation: Beside;
  dropsLost: Beside;
  totalHead: Beside & Within;
  porePressure: Beside & Within;
  remark: string;
}
interface Within {
  /** Half-width (95 %) of the engineer's figure. */
  plusMinus: number | null;
  /** Whether the difference lies within it; null where it cannot be said. */
  within: boolean | null;
}

/**
 * The reviewer's points beside the engineer's frozen ones, in the order in which they were read. Frozen figures are taken
 * as they are; a point without a figure on one side has no difference.
 */
export function compareBlind(own: readonly BlindPoint[], frozen: readonly PointReading[]): BlindRow[] {
  const byId = new Map(frozen.map((point) => [point.id, point]));
  return own.map((point) => {
    const net = byId.get(point.pointId);
    return {
      pointId: point.pointId,
      name: point.name,
      offset: beside(point.offset, net?.offset),
      elevation: beside(point.elevation, net?.elevation),
      dropsLost: beside(point.dropsLost, net?.dropsLost),
      totalHead: within(beside(point.totalHead, net?.totalHead), net?.totalHeadPlusMinus),
      porePressure: within(beside(point.porePressure, net?.porePressure), net?.porePressurePlusMinus),
      remark: point.remark,
    };
  });
}

function beside(own: number | null, net: number | null | undefined): Beside {
  const other = net ?? null;
  return { own, net: other, difference: own === null || other === null ? null : own - other };
}

function within(figures: Beside, plusMinus: number | null | undefined): Beside & Within {
  const half = plusMinus ?? null;
  const { difference } = figures;
  const known = difference !== null && half !== null;
  return {
    ...figures,
    plusMinus: half,
    within: known ? Math.abs(difference) <= half : sameOrUnknown(difference),
  };
}

/** Without a ± only two equal figures agree, as two pressures of 0 above the phreatic line. */
const sameOrUnknown = (difference: number | null) => (difference === 0 ? true : null);
