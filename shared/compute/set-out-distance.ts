import { makeFinding } from '#shared/compute/findings.ts';
import { fittedBy, type SetOutFit } from '#shared/compute/set-out-fit.ts';
import { askOffsets, askUp, UPRIGHT_LIMIT, upTurn, wrapped } from '#shared/compute/set-out-up.ts';
import { type Similarity, similarityForward } from '#shared/compute/similarity.ts';
import type { EntityOf } from '#shared/contract/document.ts';

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };
type SetOutValue = EntityOf<'setOut'>;

/**
 * The two known points between which the known length lies: the first two of use `fit`, so that a scale bar may be
 * marked after the point that gives the elevation. Null while there are not two.
 */
export function lengthEnds(points: readonly KnownPoint[]): readonly [KnownPoint, KnownPoint] | null {
  const [first, second] = points.filter(({ value }) => value.use === 'fit');
  return first === undefined || second === undefined ? null : [first, second];
}

/**
 * Similarity from a length between two known points, as the ends of a scale bar, one elevation, one offset and what is
 * level.
 *
 * `line`: the line through the two points is level, the side of it that is up being the one nearer the displayed
 * up; `sheet`: the sheet's own horizontal is level. The side to which offsets grow has to be said. The elevation and
 * the offset are taken from the first known point that has one.
 */
export function fitByDistance(points: readonly KnownPoint[], setOut: SetOutValue): SetOutFit {
  const ends = lengthEnds(points);
  if (ends === null) return missing('Mark the two ends of the known length on the drawing.');
  const [first, second] = ends;
  if (setOut.distance === null) return missing('Type the length between its two ends.');
  const du = second.value.at[0] - first.value.at[0];
  const dv = first.value.at[1] - second.value.at[1];
  const lengthPx = Math.hypot(du, dv);
  const scale = setOut.distance / lengthPx;
  if (!(lengthPx >= 2) || !(setOut.distance > 0) || !Number.isFinite(scale) || !(scale > 0)) {
    return refused([first.id, second.id]);
  }
  const withElevation = points.find(({ value }) => value.elevation !== null);
  const withOffset = points.find(({ value }) => value.offset !== null);
  if (withElevation === undefined) return missing('Type the elevation of one known point.');
  if (withOffset === undefined) return missing('Type the offset of one known point.');
  if (setOut.offsetsGrow === null) return askOffsets();
  const rotation = rotationOf(Math.atan2(dv, du), setOut);
  if (rotation === null) return askUp();
  const similarity = placed(
    scale,
    rotation,
    setOut.offsetsGrow === 'left',
    withElevation.value,
    withOffset.value,
  );
  return fittedBy(similarity, { redundant: 0, turnFromSheet: setOut.level === 'sheet' });
}

/** Clockwise rotation of the section's horizontal in radians; null when a level line stands too steep to tell. */
function rotationOf(lineAngle: number, setOut: SetOutValue): number | null {
  const up = upTurn(setOut);
  if (setOut.level === 'sheet') return up;
  const departure = wrapped(-lineAngle - up);
  const nearer = Math.abs(departure) <= Math.PI / 2 ? departure : wrapped(departure + Math.PI);
  return Math.abs(nearer) <= UPRIGHT_LIMIT ? up + nearer : null;
}

function placed(
  scale: number,
  rotation: number,
  mirrored: boolean,
  withElevation: EntityOf<'knownPoint'>,
  withOffset: EntityOf<'knownPoint'>,
): Similarity {
  const turned: Similarity = {
    re: scale * Math.cos(rotation),
    im: scale * Math.sin(rotation),
    sheetOrigin: withElevation.at,
    sectionOrigin: [0, withElevation.elevation ?? 0],
    mirrored,
  };
  const [offset] = similarityForward(turned, withOffset.at[0], withOffset.at[1]);
  return { ...turned, sectionOrigin: [(withOffset.offset ?? 0) - offset, turned.sectionOrigin[1]] };
}

function missing(text: string): SetOutFit {
  return {
    state: 'incomplete',
    finding: makeFinding('missing', 'setOutIncomplete', text, { cell: 'scale' }),
  };
}

function refused(entityIds: string[]): SetOutFit {
  return {
    state: 'refused',
    finding: makeFinding(
      'wrong',
      'knownPointsCoincide',
      'The two known points lie on one another, or the length between them is not above zero. Mark points that are far apart and check the length.',
      { cell: 'scale', entityIds },
    ),
  };
}
