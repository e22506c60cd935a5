import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { singleInputs } from './single-inputs.ts';

type Water = EntityOf<'waterLevels'>;
type Point = EntityOf<'readingPoint'>;
type Measured = NonNullable<Point['measured']>;

/**
 * Sets what the instruments showed beside the net: Δ = h_measured − h_net, positive where the ground holds more water
 * than the net says.
 *
 * h_measured is the total head as typed; or z + p from a pressure head p; or z + u/γw from a pore pressure u. h, z and
 * p in the document's length unit, u in kPa (SI) or lb/ft² (US), γw in kN/m³ or lb/ft³. The ± of the difference is the
 * root of the sum of squares of the measured ± and the net's (JCGM 100:2008, 5.1.2); a value whose ± nobody gave counts
 * as exact. One entry for each point with a measured value, in the order of the schedule. Never throws.
 */
export function compareMeasured(
  document: FlowNetDocument,
  points: readonly PointReading[],
): MeasuredReading[] {
  const { water } = singleInputs(document);
  const typed = new Map(entitiesOf(document, 'readingPoint').map(({ id, value }) => [id, value]));
  return points.flatMap((point) => {
    const value = typed.get(point.id);
    return value?.measured ? [compared(value, value.measured, point, water)] : [];
  });
}

function compared(value: Point, measured: Measured, point: PointReading, water: Water): MeasuredReading {
  const head = measuredHead(measured, point.elevation, water.gammaW);
  const headPlusMinus = measuredPlusMinus(value, measured, water);
  const difference = head === null || point.totalHead === null ? null : head - point.totalHead;
  const differencePlusMinus = difference === null ? null : combined(headPlusMinus, point.totalHeadPlusMinus);
  return {
    id: point.id,
    head,
    headPlusMinus,
    difference,
    differencePlusMinus,
    beyond: difference !== null && differencePlusMinus !== null && Math.abs(difference) > differencePlusMinus,
    wetAboveNet:
      point.status === 'abovePhreatic' &&
      head !== null &&
      point.elevation !== null &&
      head - point.elevation > (headPlusMinus ?? 0),
  };
}

/** Total head of a measured value; null for a pressure where the elevation is not known. */
function measuredHead({ value, as }: Measured, elevation: number | null, gammaW: number): number | null {
  if (as === 'totalHead') return value;
  if (elevation === null) return null;
  return finiteOrNull(elevation + (as === 'pressureHead' ? value : value / gammaW));
}

/** ± of the measured total head; a pressure takes the ± of the tip's typed elevation and of γw with it. */
function measuredPlusMinus(point: Point, { value, as, plusMinus }: Measured, water: Water): number | null {
  if (as === 'totalHead') return plusMinus;
  const tip = point.place.on === 'section' ? point.elevationPlusMinus : null;
  if (as === 'pressureHead') return combined(plusMinus, tip);
  const { gammaW, gammaWPlusMinus } = water;
  const ofPressure = plusMinus === null ? null : plusMinus / gammaW;
  const ofWeight = gammaWPlusMinus === null ? null : (Math.abs(value) / gammaW) * (gammaWPlusMinus / gammaW);
  return combined(ofPressure, ofWeight, tip);
}

/** Root of the sum of squares of what is known; null when nothing is. */
function combined(...parts: ReadonlyArray<number | null>): number | null {
  const known = parts.filter((part) => part !== null);
  return known.length === 0 ? null : finiteOrNull(Math.hypot(...known));
}

/** A weight of water near nothing makes heads beyond all bounds: they are not worked out. */
function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
