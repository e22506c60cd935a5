import { makeFinding } from '#shared/compute/findings.ts';
import {
  distanceToPolyline,
  firstOf,
  lastOf,
  type Polyline,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { elevationAt, type Potential } from '#shared/compute/net/potentials.ts';
import { entryOf, exitOf, type PhreaticCourse, windowOf } from '#shared/compute/phreatic/phreatic-ends.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { WorkingFrame } from '#shared/compute/working-frame.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { PhreaticEnd, PhreaticReading } from '#shared/contract/reading-phreatic.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** Ends drawn by hand within this angle are as they should be; the accuracy of tracing adds to it. */
const END_TOLERANCE_DEG = 20;

export type PhreaticCheck = { readonly reading: PhreaticReading | null; readonly findings: Finding[] };

/**
 * Holds the phreatic line against the rules that it obeys: each equipotential meets it at the elevation of its own head
 * (the pressure on it is nil), it enters square to the upstream face, leaves along the discharge face or vertically,
 * and falls all along. Places in the frame of the model, departures in the document's length unit, none hidden;
 * findings are questions and withhold nothing. Source: A. Casagrande (1937), Seepage through dams.
 */
export function readPhreatic(
  model: NetModel,
  heads: NetHeads,
  map: SectionMap,
  accuracyPx: number,
  levelUnit: string,
): PhreaticCheck {
  const lines = linesOfKind(model.lines, 'phreaticLine');
  if (lines.length === 0) return { reading: null, findings: [] };
  const course = courseOf(
    lines.map((line) => line.shape),
    model,
  );
  const entry = entryOf(course, map.up, accuracyPx);
  const exit = exitOf(course, map.up, accuracyPx);
  const guesses = lines.filter(({ value }) => value.origin === 'guessed');
  const accuracy = accuracyPx * map.elevationPerPx;
  const meetings = meetingsOf(
    model,
    heads,
    map,
    lines.map((line) => line.id),
  );
  return {
    reading: {
      guessed: guesses.length > 0,
      meetings,
      entry,
      exit,
    },
    findings: [
      ...guesses.map(({ id, shape }) => stillAGuess(id, firstOf(shape))),
      ...questionMeetings(meetings, heads, accuracy, levelUnit),
      ...questionEnd(entry, 'phreaticEntry', course.shape, accuracyPx),
      ...questionEnd(exit, 'phreaticExit', course.shape, accuracyPx),
      ...questionRise(course.shape, map, 3 * accuracy, levelUnit),
    ],
  };
}

/** The check with its places carried from the working frame to the sheet. */
export function phreaticOnSheet(
  reading: PhreaticReading | null,
  frame: WorkingFrame,
): PhreaticReading | null {
  if (reading === null || frame.isSheet) return reading;
  const onSheet = <T extends { at: [number, number] }>(placed: T): T => {
    const [x, y] = frame.toSheet(placed.at);
    return { ...placed, at: [x, y] };
  };
  return {
    ...reading,
    meetings: reading.meetings.map(onSheet),
    entry: reading.entry && onSheet(reading.entry),
    exit: reading.exit && onSheet(reading.exit),
  };
}

/** The longest phreatic line, turned so that it runs with the flow. */
function courseOf(shapes: readonly Polyline[], model: NetModel): PhreaticCourse {
  const longest = shapes.reduce((long, shape) => (shape.cum.at(-1)! > long.cum.at(-1)! ? shape : long));
  const faces = model.potentials.filter(({ role }) => role === 'headwater');
  const outlets = model.potentials.filter(({ role }) => role === 'outlet');
  const [first, last] = [firstOf(longest), lastOf(longest)];
  const turned = distanceTo(faces, last) < distanceTo(faces, first);
  const shape = turned ? (polylineOf(verticesOf(longest).reverse()) ?? longest) : longest;
  return {
    shape,
    entryFace: within(faces, firstOf(shape), model.reach),
    outlet: within(outlets, lastOf(shape), model.reach),
  };
}

function distanceTo(potentials: readonly Potential[], at: Pair): number {
  return Math.min(...potentials.map(({ shape }) => distanceToPolyline(shape, ...at)));
}

function within(potentials: readonly Potential[], at: Pair, reach: number): Potential | null {
  return potentials.find((potential) => distanceTo([potential], at) <= reach) ?? null;
}

function meetingsOf(
  model: NetModel,
  heads: NetHeads,
  map: SectionMap,
  phreatic: readonly string[],
): PhreaticReading['meetings'] {
  return model.equipotentials.flatMap(({ id, footed }) => {
    const head = heads.byId.get(id)?.head ?? null;
    if (head === null) return [];
    return [footed.start, footed.end]
      .filter((foot) => foot !== null && phreatic.includes(foot.carrier.id))
      .map((foot) => {
        const elevation = elevationAt(map, ...foot!.at);
        return {
          lineId: id,
          at: [foot!.at[0], foot!.at[1]] satisfies Pair,
          head,
          elevation,
          departure: head - elevation,
        };
      });
  });
}

/** A hand-drawn net meets the phreatic line this well, in parts of a drop; a line left out or a wrong level does not. */
const ALLOWED_PART = 1 / 3;

/** One question, at the equipotential that departs most; the list has them all. */
function questionMeetings(
  meetings: PhreaticReading['meetings'],
  heads: NetHeads,
  accuracy: number,
  levelUnit: string,
): Finding[] {
  const allowed = Math.max(ALLOWED_PART * (heads.count?.headPerDrop ?? 0), 3 * accuracy);
  const worst = [...meetings].sort((a, b) => Math.abs(b.departure) - Math.abs(a.departure))[0];
  if (worst === undefined || !(Math.abs(worst.departure) > allowed)) return [];
  const label = heads.byId.get(worst.lineId)?.label ?? 'an equipotential';
  return [
    makeFinding(
      'question',
      'phreaticHeadDiffers',
      `Where ${label} meets the phreatic line its head is ${fixedText(worst.head, 2)} ${levelUnit}, but the elevation there is ${fixedText(worst.elevation, 2)} ${levelUnit}; on the phreatic line both are one. Check the count, the levels and whether a line was left out.`,
      { cell: 'netCheck', entityIds: [worst.lineId], at: worst.at },
    ),
  ];
}

function stillAGuess(id: string, at: Pair): Finding {
  return makeFinding(
    'question',
    'phreaticGuessed',
    'The phreatic line is still a first guess from the geometry. Adjust it to the drawing, then take it as traced.',
    { cell: 'netCheck', entityIds: [id], at },
  );
}

const SHOULD: Record<PhreaticEnd['expected'], string> = {
  square: 'it should enter square to the upstream face',
  level: 'it should enter level, as the face is upright or overhangs',
  alongFace: 'it should leave along the face',
  vertical: 'it should leave vertically',
};

function questionEnd(end: PhreaticEnd | null, code: string, shape: Polyline, accuracyPx: number): Finding[] {
  if (end === null) return [];
  const noise = (Math.atan2(2 * accuracyPx, windowOf(shape, accuracyPx)) * 180) / Math.PI;
  if (end.departureDeg <= END_TOLERANCE_DEG + noise) return [];
  return [
    makeFinding(
      'question',
      code,
      `The phreatic line departs by ${fixedText(end.departureDeg, 0)}° from its rule here: ${SHOULD[end.expected]}.`,
      { cell: 'netCheck', at: end.at },
    ),
  ];
}

function questionRise(shape: Polyline, map: SectionMap, tolerance: number, levelUnit: string): Finding[] {
  let lowest = Number.POSITIVE_INFINITY;
  let worst = { rise: tolerance, at: null as Pair | null };
  for (const at of verticesOf(shape)) {
    const elevation = elevationAt(map, ...at);
    if (elevation - lowest > worst.rise) worst = { rise: elevation - lowest, at };
    lowest = Math.min(lowest, elevation);
  }
  if (worst.at === null) return [];
  return [
    makeFinding(
      'question',
      'phreaticRises',
      `The phreatic line rises along the flow, by ${fixedText(worst.rise, 2)} ${levelUnit.split(' ')[0]} up to here. It falls from the headwater to the outlet.`,
      { cell: 'netCheck', at: worst.at },
    ),
  ];
}
