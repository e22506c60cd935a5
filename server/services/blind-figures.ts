import type * as z from 'zod/mini';
import { invalidInput } from '#server/errors/app-error.ts';
import { headAfterDrops, pressureOf } from '#shared/compute/blind-reading.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type {
  BlindPoint,
  BlindPointInput,
  BlindReading,
  blindReadingInput,
} from '#shared/contract/review.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { wellFormed } from './well-formed.ts';

type BlindInput = z.output<typeof blindReadingInput>;
type Levels = { headwater: number | null } & Pick<BlindInput, 'outletHead' | 'drops'>;

/**
 * A reading as a reviewer typed it, with the heads and pressures that follow.
 * @throws AppError invalid-input that says of each point what is lacking
 */
export function readBlind(
  { drops, outletHead, points }: BlindInput,
  { document, reading }: RevisionPayload,
): Omit<BlindReading, 'placesShownAt' | 'figuresMailed'> {
  const { headwater, gammaW } = singleInputs(document).water;
  const names = new Map(reading.points.map(({ id, name }) => [id, name]));
  const twice = new Set(points.map(({ pointId }) => pointId)).size < points.length;
  if (twice) throw invalidInput([{ path: 'points', message: 'a point is read twice' }]);
  const read = points.map((point) =>
    pointRead(point, names.get(point.pointId), { headwater, outletHead, drops }, gammaW),
  );
  const faults = read.flatMap((each, i) =>
    typeof each === 'string' ? [{ path: `points.${i}`, message: each }] : [],
  );
  if (faults.length > 0) throw invalidInput(faults);
  const sealed = read.filter((each) => typeof each !== 'string');
  return { drops, headwater, outletHead, gammaW, points: sealed };
}

function pointRead(
  point: BlindPointInput,
  name: string | undefined,
  levels: Levels,
  gammaW: number,
): BlindPoint | string {
  if (name === undefined) return 'this point is not in the revision';
  const totalHead = headOf(point, levels);
  if (typeof totalHead === 'string') return `${name || 'unnamed'}: ${totalHead}`;
  return {
    ...point,
    name,
    totalHead,
    porePressure: pressureOf(totalHead, point.elevation, gammaW),
    remark: wellFormed(point.remark),
  };
}

/** The head read, or the one after the drops counted; a sentence where neither or both are given. */
function headOf(
  { dropsLost, totalHead }: BlindPointInput,
  { headwater, outletHead, drops }: Levels,
): number | string {
  if (totalHead !== null)
    return dropsLost === null ? totalHead : 'enter the drops lost or the total head, one of the two';
  if (dropsLost === null) return 'enter the drops lost or the total head, one of the two';
  if (drops === null) return 'enter the drops of the whole net that you counted, or the total head';
  if (headwater === null || outletHead === null)
    return 'without both water levels drops tell no head; enter the total head';
  return headAfterDrops({ headwater, outletHead, drops }, dropsLost);
}
