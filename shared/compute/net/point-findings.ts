import { makeFinding } from '#shared/compute/findings.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { distanceToPolyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import { type HandReading, straddlesWall } from '#shared/compute/net/hand-rule.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { FieldAt, HandAt } from '#shared/compute/net/two-readings.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** Field and hand rule may differ by this part of a drop before it is asked why. */
export const RULES_APART = 0.1;

/** A head that the tracing accuracy alone moves by more than this part of a drop is a matter of the hand. */
export const STEEP = 0.03;

/**
 * So near the end of a potential boundary, in tracing accuracies and besides the gap there, the edge itself is where two
 * traces happen to end: it is taken to be off by the gap, and by as many accuracies at least.
 */
const NEAR_EDGE = 5;
const EDGE_OFF = 3;

/**
 * What is doubtful about one reading: the two rules far apart, a strip that could not be solved, a head
 * that changes within a pixel or two, a negative pressure, a thin wall or an open end too near. `at` in working pixels; heads in the document's length unit.
 */
export function questionReading(
  id: string,
  at: SheetPx,
  hand: HandAt,
  field: FieldAt | null,
  pressureHead: number,
  ground: ReadingGround,
): Finding[] {
  const about = (weight: 'question' | 'note', code: string, text: string) =>
    makeFinding(weight, code, text, { cell: 'netCheck', entityIds: [id], at });
  const found: Finding[] = [];
  if (field === null) {
    found.push(
      about(
        'question',
        'fieldNotSolved',
        "Between the two lines beside the point the field could not be solved, and the figure is the hand rule's. Check the lines and boundaries there.",
      ),
    );
  } else {
    const apart = field.dropsLost - hand.dropsLost;
    if (Math.abs(apart) > RULES_APART) {
      found.push(
        about(
          'question',
          'rulesDiffer',
          `By hand the point has lost ${fixedText(hand.dropsLost, 2)} drops, by the field ${fixedText(field.dropsLost, 2)}. The figure is the field's. Check the lines beside the point, and whether it lies near a tip or a corner.`,
        ),
      );
    }
  }
  const tremor = dropsByTremor(at, hand, field, ground);
  if (tremor > STEEP) {
    found.push(
      about(
        'question',
        'steepHead',
        `So near a tip or a corner, or between lines so close, the tracing accuracy alone moves the reading by ${fixedText(tremor, 2)} of a drop. Take it as no closer than twice or three times that, or move the point.`,
      ),
    );
  }
  if (pressureHead < 0) {
    found.push(
      about(
        'question',
        'negativePressure',
        'The pressure is negative below the phreatic line. Check the lines, the levels and the elevation of the point.',
      ),
    );
  }
  if (isNearOpenEnd(at, hand.way)) {
    found.push(
      about(
        'note',
        'nearOpenEnd',
        'The point lies within a cell of an end at which no boundary is traced. Trace the boundary or the outermost flow line there.',
      ),
    );
  }
  if (straddlesWall(ground.strips, hand.way.strip, at, ground.walls, ground.slack)) {
    found.push(
      about(
        'question',
        'onThinWall',
        'The point lies on a thin wall, nearer than the tracing can tell its two sides apart, and the head differs from side to side. Move it clear of the wall, to the side that is meant.',
      ),
    );
  }
  return found;
}

/** Within a cell of an end that a mere straight join closes, the strip is not what the drawing says. */
function isNearOpenEnd(at: SheetPx, way: HandReading): boolean {
  const cell = way.toBefore + way.toAfter;
  return way.strip.ways.some(({ points, open }) => {
    const join = open ? polylineOf(points) : null;
    return join !== null && distanceToPolyline(join, at[0], at[1]) < cell;
  });
}

/** Drops by which the head changes over the tracing accuracy: |∇h|·accuracy by the head of a drop there. */
function dropsByTremor(at: SheetPx, hand: HandAt, field: FieldAt | null, ground: ReadingGround): number {
  if (field === null) return 0;
  const { before, after } = hand.drops;
  const perDrop = Math.abs(hand.headBefore - hand.headAfter) / Math.abs(after - before);
  const perPx = Math.hypot(...field.gradient) * ground.map.unitsPerPx;
  const drops = (perPx * accuracyAt(at, ground)) / perDrop;
  return Number.isFinite(drops) ? drops : 0;
}

/** Pixels by which the tracing may be off at a place: its accuracy, or more where a boundary ends. */
function accuracyAt([x, y]: SheetPx, { edges, tracingAccuracyPx }: ReadingGround): number {
  return edges
    .filter(({ at, gap }) => Math.hypot(at[0] - x, at[1] - y) <= NEAR_EDGE * tracingAccuracyPx + gap)
    .reduce((off, { gap }) => Math.max(off, EDGE_OFF * tracingAccuracyPx, gap), tracingAccuracyPx);
}
