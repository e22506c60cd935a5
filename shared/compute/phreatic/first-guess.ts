import { type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { verticesOf } from '#shared/compute/geometry/polyline.ts';
import { linesOfKind, netLinesOf } from '#shared/compute/net/net-lines.ts';
import { type Potential, potentialsOf } from '#shared/compute/net/potentials.ts';
import { type GuessGround, guessCurve, type Place } from '#shared/compute/phreatic/guess-curve.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** A guess as points of the sheet, with the rules it follows in words; or what is lacking. */
export type PhreaticGuess =
  | { readonly ok: true; readonly points: SheetPx[]; readonly basis: string }
  | { readonly ok: false; readonly text: string };

/**
 * A first guess of the phreatic line of a document, from the upstream face, the water levels and the outlet alone, for
 * the engineer to adjust. Section in natural scale; where the soil is anisotropic with level bedding the guess is made
 * in the section transformed by √(kv/kh) and carried back. Pure; says what is lacking where it cannot be made. Sources:
 * see `guessCurve`.
 */
export function guessPhreaticLine(document: FlowNetDocument): PhreaticGuess {
  const { map } = readSetOut(document);
  if (map === null) return refuse('Set the section out first: the guess needs its scale.');
  const { water, count, permeability } = singleInputs(document);
  if (water.headwater === null) return refuse('Enter the headwater first.');
  const { all } = potentialsOf(netLinesOf(document), map, water, count.tracingAccuracyPx);
  const face = all.find((potential) => potential.role === 'headwater');
  if (face === undefined) return refuse('Trace the submerged upstream face first.');
  const outlet = outletOf(all, document, map);
  if (outlet === null) {
    return refuse('Trace the drain or the face of free outflow to which the water goes.');
  }
  const { k, kv } = permeability;
  const stretch = k !== null && kv !== null ? Math.sqrt(kv / k) : 1;
  const frame = frameOf(face, outlet, water.tailwater, map, stretch);
  if (frame === null) return refuse('The outlet lies as high as the headwater or beside it. Check both.');
  const curve = guessCurve(frame.ground);
  if (curve === null) return refuse('For this face and this outlet the rules give no phreatic line.');
  const exit = frame.ground.exitAngleDeg === 180 ? 'into the drain' : `after ${curve.breakout.author}`;
  return {
    ok: true,
    points: curve.places.map((place) => sheetPx(...frame.toSheet(place))),
    basis: `Basic parabola (Kozeny), entry after Casagrande, exit ${exit}. It takes a homogeneous dam on a level impervious base at the height of the outlet.`,
  };
}

function refuse(text: string): PhreaticGuess {
  return { ok: false, text };
}

type Outlet = {
  readonly focus: readonly [number, number];
  readonly angleDeg: number | null;
  readonly along: Potential;
};

/** The outlet to which the line is drawn: an empty drain before a face of free outflow. */
function outletOf(all: readonly Potential[], document: FlowNetDocument, map: SectionMap): Outlet | null {
  const drains = new Set(linesOfKind(netLinesOf(document), 'drain').map(({ id }) => id));
  const outlets = all.filter(({ role }) => role === 'outlet');
  const drain = outlets.find(({ id }) => drains.has(id));
  const face = drain ?? outlets.find(({ level, line }) => level === null || line.kind === 'outflowFace');
  if (face === undefined) return null;
  const places = verticesOf(face.shape).map((at) => map.toSection(sheetPx(...at)));
  if (drain !== undefined)
    return { focus: nearestTo(places, headwaterOffset(all, map)), angleDeg: 180, along: drain };
  const lowest = places.reduce((low, place) => (place[1] < low[1] ? place : low));
  return { focus: lowest, angleDeg: null, along: face };
}

function headwaterOffset(all: readonly Potential[], map: SectionMap): number {
  const face = all.find(({ role }) => role === 'headwater');
  const [x, y] = face === undefined ? [0, 0] : verticesOf(face.shape)[0]!;
  return map.toSection(sheetPx(x, y))[0];
}

function nearestTo<T extends readonly [number, number]>(places: readonly T[], offset: number): T {
  return places.reduce((near, place) =>
    Math.abs(place[0] - offset) < Math.abs(near[0] - offset) ? place : near,
  );
}

type Frame = { readonly ground: GuessGround; toSheet(place: Place): readonly [number, number] };

function frameOf(
  face: Potential,
  outlet: Outlet,
  tailwater: number | null,
  map: SectionMap,
  stretch: number,
): Frame | null {
  const wetted = verticesOf(face.shape).map((at) => map.toSection(sheetPx(...at)));
  const edge = wetted.reduce((high, place) => (place[1] > high[1] ? place : high));
  const heel = wetted.reduce((low, place) => (place[1] < low[1] ? place : low));
  const focus = focusAbove(outlet, tailwater, map);
  const upstream = Math.sign(edge[0] - focus[0]);
  if (upstream === 0 || edge[1] <= focus[1]) return null;
  const toFrame = (place: readonly [number, number]): Place => [
    (place[0] - focus[0]) * upstream * stretch,
    place[1] - focus[1],
  ];
  const top = verticesOf(outlet.along.shape)
    .map((at) => toFrame(map.toSection(sheetPx(...at))))
    .reduce((high, place) => (place[1] > high[1] ? place : high));
  return {
    ground: {
      edge: toFrame(edge),
      heel: toFrame(heel),
      exitAngleDeg: outlet.angleDeg ?? (Math.atan2(top[1], top[0]) * 180) / Math.PI,
    },
    toSheet: ([x, y]) => map.toSheet(sectionPt(focus[0] + (x * upstream) / stretch, focus[1] + y)),
  };
}

/** Under a tailwater the line ends on the face at its level: common practice with no source. */
function focusAbove(
  { focus, along }: Outlet,
  tailwater: number | null,
  map: SectionMap,
): readonly [number, number] {
  if (tailwater === null || tailwater <= focus[1]) return focus;
  const above = verticesOf(along.shape)
    .map((at) => map.toSection(sheetPx(...at)))
    .filter((place) => place[1] >= tailwater);
  const next = above.reduce<readonly [number, number] | null>(
    (low, place) => (low === null || place[1] < low[1] ? place : low),
    null,
  );
  if (next === null) return focus;
  const part = (tailwater - focus[1]) / (next[1] - focus[1]);
  return [focus[0] + part * (next[0] - focus[0]), tailwater];
}
