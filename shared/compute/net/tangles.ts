import { makeFinding } from '#shared/compute/findings.ts';
import { countMeetings } from '#shared/compute/geometry/crossing.ts';
import { lengthOf, type Polyline } from '#shared/compute/geometry/polyline.ts';
import { type SelfCrossing, selfCrossingOf } from '#shared/compute/geometry/self-crossing.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** A loop narrower than this many times the tracing accuracy is the hand's tremor, or a thin wall outlined on both sides. */
const LOOP_ACCURACIES = 4;
/** The narrowest loop, in pixels of the sheet, that is told from a tremor. */
const LEAST_LOOP_PX = 4;
/** A closed outline may run past its own start by this part of its length. */
const OVERRUN_PART = 0.05;
/** Meetings of all lines of a net. Two hundred equipotentials across fifty flow lines make 10,000. */
const MOST_MEETINGS = 20_000;

/**
 * Lines in such a tangle that nothing can be read from them: a line that crosses itself, or lines that meet one another
 * more often than those of any net. Found before anything that takes its time over every crossing. Shapes and
 * `accuracyPx`, the tracing accuracy, in base-raster pixels. A soil boundary bounds no flow and may run as it likes.
 */
export function findTangles(lines: readonly NetLine[], accuracyPx: number): Finding[] {
  const read = lines.filter((line) => line.kind !== 'soilBoundary');
  const loops = read.flatMap((line) => findLoop(line, accuracyPx));
  return loops.length > 0 ? loops : findThicket(read);
}

/** Kept as long as the shape is: a line that was not touched is not looked through again. */
const loopsKept = new WeakMap<
  Polyline,
  { readonly slack: number; readonly kind: NetLine['kind']; readonly crossing: SelfCrossing | null }
>();

function loopOf(line: NetLine, slack: number): SelfCrossing | null {
  const known = loopsKept.get(line.shape);
  if (known?.slack === slack && known.kind === line.kind) return known.crossing;
  const crossing = selfCrossingOf(line.shape, slack, (each) => !closesOutline(line, each));
  loopsKept.set(line.shape, { slack, kind: line.kind, crossing });
  return crossing;
}

function findLoop(line: NetLine, accuracyPx: number): Finding[] {
  const crossing = loopOf(line, Math.max(LEAST_LOOP_PX, LOOP_ACCURACIES * accuracyPx));
  if (crossing === null) return [];
  return [
    makeFinding('wrong', 'lineCrossesItself', 'This line crosses itself. Draw it again or remove the loop.', {
      cell: 'netCheck',
      entityIds: [line.id],
      at: crossing.at,
    }),
  ];
}

/** An outline drawn round a structure back to its start, and a little past it. */
function closesOutline({ kind, shape }: NetLine, { s, t }: SelfCrossing): boolean {
  const length = lengthOf(shape);
  return kind === 'impervious' && s <= OVERRUN_PART * length && length - t <= OVERRUN_PART * length;
}

function findThicket(lines: readonly NetLine[]): Finding[] {
  let left = MOST_MEETINGS;
  let densest = { ids: [] as string[], meetings: 0 };
  for (const [i, line] of lines.entries()) {
    for (const other of lines.slice(i + 1)) {
      const meetings = countMeetings(line.shape, other.shape, left);
      left -= meetings;
      if (meetings > densest.meetings) densest = { ids: [line.id, other.id], meetings };
      if (left <= 0) return [thicket(densest.ids)];
    }
  }
  return [];
}

function thicket(ids: readonly string[]): Finding {
  return makeFinding(
    'wrong',
    'linesTangled',
    'The lines cross one another far more often than the lines of a net. Draw these two again, and any others that run to and fro.',
    { cell: 'netCheck', entityIds: ids },
  );
}
