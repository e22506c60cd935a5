import type { NetCell } from '#shared/compute/cells/cells.ts';
import { type ExitCell, exitCellsOf } from '#shared/compute/cells/exit-cells.ts';
import { weightedSum } from '#shared/compute/doubt/contributions.ts';
import { gradientPlusMinus } from '#shared/compute/doubt/gradient-doubt.ts';
import { headLostDoubt } from '#shared/compute/doubt/point-doubt.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { headAtPlace } from '#shared/compute/profiles/place-head.ts';
import {
  criticalGradient,
  factorAgainstBoiling,
  seepageForce,
} from '#shared/compute/quantities/gradients.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { ExitReading } from '#shared/contract/reading-quantities.ts';

/** Ground that falls by no more than 1 in 20 counts as level. */
const LEVEL_DEG = 3;
/** Flow within this of straight up counts as upward: its vector's upward part is at least cos 30°. */
const UPWARD = Math.cos(Math.PI / 6);

/**
 * The cells at which water leaves, each with its exit gradient as cell average Δh/ℓ and as value at the middle of its
 * side on the outlet, |∇h| by the field, both positive where the flow rises and negative where it sinks. Beside a floor
 * edge or re-entrant corner the gradient at a point has no bound and only the average is given. The factor i_c/i is
 * given for upward flow through level ground only. Empty while the net is not finished. Sources: Terzaghi (1922); Harr
 * (1962). Never throws.
 */
export function exitsRead(prepared: PreparedNet): ExitReading[] {
  if (!prepared.finished) return [];
  const exitCells = prepared.cells.cells.filter(({ isExit }) => isExit);
  return exitCellsOf(exitCells, prepared.heads)
    .map((exit, i) => exitRead(exit, exitCells[i]!, prepared))
    .filter(isFiniteThroughout);
}

/** A cell whose figures overflow says nothing; the set-out and the levels are questioned elsewhere. */
function isFiniteThroughout(exit: ExitReading): boolean {
  return Object.values(exit)
    .flat()
    .every((figure) => typeof figure !== 'number' || Number.isFinite(figure));
}

function exitRead(exit: ExitCell, cell: NetCell, prepared: PreparedNet): ExitReading {
  const { frame, ground, soils } = prepared;
  const sense = exit.upward >= 0 ? 1 : -1;
  const at = sheetPx(...exit.exit);
  const [offset, elevation] = frame.map.toSection(at);
  const [x, y] = frame.toSheet(at);
  const cellGradient = exit.gradient === null ? null : sense * exit.gradient;
  const point = pointGradientAt(exit, prepared);
  const slopeDeg = slopeOf(cell, frame.map);
  const soil = soils.soilAt(...exit.middle).value;
  const critical = criticalGradient(soil, ground.gammaW);
  const factors = factorsOf(exit, slopeDeg, critical, cellGradient, point.gradient);
  return {
    outlet: exit.outlet,
    before: exit.before,
    left: exit.left,
    right: exit.right,
    at: [x, y],
    offset,
    elevation,
    cellGradient,
    cellGradientPlusMinus: plusMinusOf(exit, prepared),
    length: exit.length,
    headLost: exit.headLost,
    pointGradient: point.gradient,
    pointState: point.state,
    slopeDeg,
    criticalGradient: critical,
    ...factors,
    seepageForce: cellGradient === null ? null : seepageForce(cellGradient, ground.gammaW),
  };
}

/** Half-width (95 %) of the cell's average: the head lost in it shares the levels' doubt in proportion. */
function plusMinusOf({ headLost, length }: ExitCell, { heads, ground }: PreparedNet): number | null {
  const lost = (heads.headwater ?? 0) - (heads.outHead ?? 0);
  if (headLost === null || !(lost > 0) || !(length > 0)) return null;
  const headDoubt = weightedSum([[headLost / lost, headLostDoubt(ground.doubt)]]);
  const { tracing } = ground.doubt;
  const plusMinus = gradientPlusMinus({ headDifference: headLost, headDoubt, length, tracing });
  return Number.isFinite(plusMinus) ? plusMinus : null;
}

function pointGradientAt(
  exit: ExitCell,
  { ground }: PreparedNet,
): { state: ExitReading['pointState']; gradient: number | null } {
  if (exit.atSingularEdge) return { state: 'singular', gradient: null };
  const head = headAtPlace(sheetPx(...exit.exit), ground, { id: exit.outlet, typed: false });
  if (head.status !== 'read' || head.gradient === null) return { state: 'unknown', gradient: null };
  const [dhdx, dhdz] = head.gradient;
  // The flow goes down the gradient of the head: it rises where the head falls upwards.
  return { state: 'read', gradient: (dhdz <= 0 ? 1 : -1) * Math.hypot(dhdx, dhdz) };
}

/** Slope of the cell's side on the outlet, degrees from the level. */
function slopeOf(cell: NetCell, map: SectionMap): number {
  const { after } = cell.sides;
  const from = map.toSection(sheetPx(...after[0]!));
  const to = map.toSection(sheetPx(...after[after.length - 1]!));
  return (Math.atan2(Math.abs(to[1] - from[1]), Math.abs(to[0] - from[0])) * 180) / Math.PI;
}

function factorsOf(
  exit: ExitCell,
  slopeDeg: number,
  critical: number | null,
  cellGradient: number | null,
  pointGradient: number | null,
): Pick<ExitReading, 'factor' | 'pointFactor' | 'factorNote'> {
  const none = (factorNote: string) => ({ factor: null, pointFactor: null, factorNote });
  if (slopeDeg > LEVEL_DEG)
    return none('The ground slopes here: a factor against boiling holds for level ground only.');
  if (exit.upward < UPWARD)
    return none('The flow does not leave upwards here: a factor against boiling holds for upward flow only.');
  if (critical === null)
    return none('Enter the saturated unit weight of the soil, or its Gs and e, for a critical gradient.');
  if (cellGradient === null || !(cellGradient > 0)) return none('No head is lost in this cell.');
  return {
    factor: factorAgainstBoiling(critical, cellGradient),
    pointFactor: pointGradient === null ? null : factorAgainstBoiling(critical, pointGradient),
    factorNote: '',
  };
}
