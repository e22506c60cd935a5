import { correctedEntry, focalOrdinate, parabolaHeight } from '#shared/compute/phreatic/base-parabola.ts';
import { type Breakout, breakoutOf } from '#shared/compute/phreatic/breakout.ts';

/** x from the focus, positive upstream, y up from it. */
export type Place = readonly [x: number, y: number];

/** What the guess is made from, all in the frame of `base-parabola.ts`. */
export type GuessGround = {
  /** Where the headwater meets the upstream face. */
  readonly edge: Place;
  /** Lowest wetted place of the upstream face. */
  readonly heel: Place;
  /** Angle of the discharge face at the focus, degrees; 180 for a level drain. */
  readonly exitAngleDeg: number;
};

export type GuessCurve = {
  readonly places: readonly Place[];
  readonly S: number;
  readonly breakout: Breakout;
};

const STEPS = 12;
const PARABOLA_STEPS = 24;
/** The curve that leaves the parabola for the breakout starts at this many times the breakout's height. */
const EXIT_REACH = 2;
/** The entry's curve takes no more than this part of the way to the exit's. */
const ENTRY_SHARE = 0.4;
/** A breakout higher than this part of the head means a sliver of a dam, for which the rules were not made. */
const HIGHEST_EXIT = 0.8;
/** The entry's reverse curve is kept short: its pull is this part of its chord. */
const ENTRY_PULL = 0.5;

/**
 * A first guess of the phreatic line: the basic parabola between an entry square to the upstream face (horizontal where
 * the face is vertical or overhangs) and a breakout tangent to a face of up to 90°, vertical into an undercut face or a
 * drain. Falls along the flow all the way. Null where the focus is not below the water or the rules have no answer.
 * Source: Kozeny (1931) for the parabola; A. Casagrande (1937), Seepage through dams, for both ends; the curves that
 * join them are drawn smooth, as by hand.
 */
export function guessCurve({ edge, heel, exitAngleDeg }: GuessGround): GuessCurve | null {
  const height = edge[1];
  const distance = correctedEntry(edge[0], heel[0]);
  if (!(height > 0) || !(edge[0] > 0)) return null;
  const S = focalOrdinate(distance, height);
  const breakout = breakoutOf(S, distance, height, exitAngleDeg);
  if (breakout === null) return null;
  const angle = (exitAngleDeg * Math.PI) / 180;
  const exit: Place = [breakout.along * Math.cos(angle), breakout.along * Math.sin(angle)];
  if (exit[1] > HIGHEST_EXIT * height || exit[0] >= edge[0]) return null;
  const leave = exitJoin(S, exit, edge);
  const enter = Math.max(
    edge[0] - ENTRY_SHARE * (edge[0] - leave[0]),
    edge[0] - 2 * Math.max(0.1 * height, distance - edge[0]),
  );
  const places = [
    ...entryCurve(edge, heel, [enter, parabolaHeight(S, enter)], S),
    ...parabola(S, enter, leave[0]),
    ...exitCurve(leave, exit, exitAngleDeg, S),
  ];
  return { places: falling(places), S, breakout };
}

function exitJoin(S: number, exit: Place, edge: Place): Place {
  const y = Math.min(Math.max(EXIT_REACH * exit[1], S), 0.8 * edge[1]);
  const x = Math.min((y * y - S * S) / (2 * S), 0.8 * edge[0]);
  return [x, parabolaHeight(S, x)];
}

/** Direction of the parabola towards the outlet at height y: dy/dx = S/y. */
function parabolaTangent(S: number, y: number): Place {
  const length = Math.hypot(y, S);
  return [-y / length, -S / length];
}

function entryCurve(edge: Place, heel: Place, join: Place, S: number): Place[] {
  const [dx, dy] = [edge[0] - heel[0], edge[1] - heel[1]];
  const face = Math.hypot(dx, dy);
  const inward: Place = dx < 0 && face > 0 ? [-dy / face, dx / face] : [-1, 0];
  return hermite(edge, inward, join, parabolaTangent(S, join[1]), ENTRY_PULL);
}

function exitCurve(leave: Place, exit: Place, angleDeg: number, S: number): Place[] {
  const angle = (angleDeg * Math.PI) / 180;
  const along: Place = angleDeg <= 90 ? [-Math.cos(angle), -Math.sin(angle)] : [0, -1];
  return hermite(leave, parabolaTangent(S, leave[1]), exit, along, 1);
}

function parabola(S: number, from: number, to: number): Place[] {
  return Array.from({ length: PARABOLA_STEPS - 1 }, (_, i): Place => {
    const x = from + ((i + 1) / PARABOLA_STEPS) * (to - from);
    return [x, parabolaHeight(S, x)];
  });
}

/** Cubic between two places with given directions; both ends included. */
function hermite(a: Place, ta: Place, b: Place, tb: Place, pull: number): Place[] {
  const chord = pull * Math.hypot(b[0] - a[0], b[1] - a[1]);
  const at = (t: number, axis: 0 | 1) => {
    const h00 = 2 * t ** 3 - 3 * t ** 2 + 1;
    const h10 = t ** 3 - 2 * t ** 2 + t;
    const h01 = -2 * t ** 3 + 3 * t ** 2;
    const h11 = t ** 3 - t ** 2;
    return h00 * a[axis] + h10 * chord * ta[axis] + h01 * b[axis] + h11 * chord * tb[axis];
  };
  return Array.from({ length: STEPS + 1 }, (_, i): Place => [at(i / STEPS, 0), at(i / STEPS, 1)]);
}

/** Places that would rise again are left out: the water's surface falls along the flow. */
function falling(places: readonly Place[]): Place[] {
  const last = places[places.length - 1]!;
  const kept: Place[] = [];
  for (const place of places) {
    const before = kept[kept.length - 1];
    if (before === undefined || (place[1] < before[1] && place[1] > last[1])) kept.push(place);
  }
  return [...kept, last];
}
