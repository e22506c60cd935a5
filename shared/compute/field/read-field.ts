import { fieldHeadAt, type StripField, solveStrip } from '#shared/compute/field/strip-field.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { liesAbovePhreatic } from '#shared/compute/net/above-phreatic.ts';
import { stripAt } from '#shared/compute/net/hand-rule.ts';
import type { HeadOfLine } from '#shared/compute/net/net-heads.ts';
import { netLinesOf } from '#shared/compute/net/net-lines.ts';
import { elevationAt } from '#shared/compute/net/potentials.ts';
import type { ReadingGround } from '#shared/compute/net/read-point.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import { findTangles } from '#shared/compute/net/tangles.ts';
import { placedPoints, prepareNet } from '#shared/compute/prepare-net.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** What the field between the traced equipotentials says at a point; null where nothing is read. */
export type FieldReading = {
  readonly id: string;
  /** Total head, document length unit above its datum. */
  readonly totalHead: number | null;
  readonly dropsLost: number | null;
};

/**
 * Reads every point of a finished net by the field: the head that satisfies Laplace's equation between the two traced
 * equipotentials beside it, each held at its head, walls and the phreatic line closed to flow, h = z on faces of free
 * outflow. Only strips that hold points are solved. Points outside the net, above the phreatic line or in a net that is
 * not finished have no reading. It stands beside the hand rule of `readNet`: both read the same lines, so that their
 * agreement says nothing about the net itself. Order of the schedule.
 */
export function readField(document: FlowNetDocument): FieldReading[] {
  const setOut = readSetOut(document);
  const points = placedPoints(document, setOut.map);
  const inputs = singleInputs(document);
  const tangled = findTangles(netLinesOf(document), inputs.count.tracingAccuracyPx).length > 0;
  const prepared = setOut.map === null || tangled ? null : prepareNet(document, setOut, setOut.map, inputs);
  if (prepared === null || !prepared.finished) {
    return points.map(({ id }) => ({ id, totalHead: null, dropsLost: null }));
  }
  const fields = fieldsOnDemand(prepared.ground);
  return placedPoints(prepared.working, prepared.frame.map).map(({ id, sheetAt }) => ({
    id,
    ...(sheetAt === null ? { totalHead: null, dropsLost: null } : readAt(sheetAt, prepared.ground, fields)),
  }));
}

type FieldOf = (strip: Strip) => StripField | null;

/** Solves a strip the first time it is asked for. */
export function fieldsOnDemand(ground: ReadingGround): FieldOf {
  const solved = new Map<Strip, StripField | null>();
  return (strip) => {
    const known = solved.get(strip);
    if (known !== undefined) return known;
    const field = solveOn(strip, ground);
    solved.set(strip, field);
    return field;
  };
}

function solveOn(strip: Strip, ground: ReadingGround): StripField | null {
  const before = ground.heads.byId.get(strip.before);
  const after = ground.heads.byId.get(strip.after);
  if (before === undefined || after === undefined) return null;
  const elevation = (x: number, y: number) => elevationAt(ground.map, x, y);
  const headOn = (line: HeadOfLine) => (x: number, y: number) => line.head ?? elevation(x, y);
  return solveStrip(
    strip,
    { before: headOn(before), after: headOn(after), free: elevation },
    ground.walls,
    ground.freeFaces,
    ground.slack,
  );
}

function readAt(
  at: Pair,
  ground: ReadingGround,
  fieldOf: FieldOf,
): { totalHead: number | null; dropsLost: number | null } {
  const nothing = { totalHead: null, dropsLost: null };
  if (liesAbovePhreatic(at, ground.map.up, ground.phreaticLines, ground.faces, ground.slack)) return nothing;
  const strip = stripAt(ground.strips, at, ground.slack);
  const field = strip === null ? null : fieldOf(strip);
  const head = field === null ? null : fieldHeadAt(field, at[0], at[1], ground.slack);
  if (strip === null || head === null) return nothing;
  return { totalHead: head, dropsLost: dropsAt(head, strip, ground) };
}

/** Drops lost at a head between two lines; null beside a face along which the head varies. */
function dropsAt(head: number, strip: Strip, ground: ReadingGround): number | null {
  const before = ground.heads.byId.get(strip.before);
  const after = ground.heads.byId.get(strip.after);
  if (before?.head == null || after?.head == null) return null;
  return before.drops + ((before.head - head) / (before.head - after.head)) * (after.drops - before.drops);
}
