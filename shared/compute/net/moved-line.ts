import { countMeetings } from '#shared/compute/geometry/crossing.ts';
import { distanceToRing, type Ring, ringContains } from '#shared/compute/geometry/polygon.ts';
import { firstOf, lastOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { carrierGraph } from '#shared/compute/net/carrier-graph.ts';
import { type Carrier, carryToFeet, type Foot, type FootedLine } from '#shared/compute/net/feet.ts';
import { checkLines } from '#shared/compute/net/net-checks.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import { type Equipotential, type NetModel, reachOf, stripsOf } from '#shared/compute/net/net-model.ts';
import type { OrderedPair } from '#shared/compute/net/order.ts';
import { holdsPartOf, type Strip } from '#shared/compute/net/strips.ts';
import { findTangles } from '#shared/compute/net/tangles.ts';

/** A net in which one line runs otherwise, and the strips it bounds, as they were and as they are. */
export type MovedNet = { readonly model: NetModel; readonly touched: readonly Strip[] };

/**
 * The model of a net of which one equipotential, `id`, was moved a little, with the order of before: only its feet and
 * the strips it bounds are worked out anew. `lines`: all lines as they are now; `accuracyPx`: tracing accuracy, working
 * pixels. Null where the move may change more than that: the line is one of several pieces, ends elsewhere, meets
 * another line, or its strips no longer close as they did; then the whole net is to be read.
 */
export function withLineMoved(
  before: NetModel,
  lines: readonly NetLine[],
  id: string,
  accuracyPx: number,
): MovedNet | null {
  const old = before.equipotentials.find((line) => line.id === id);
  const line = lines.find((each) => each.id === id);
  if (old === undefined || line === undefined || old.members.length > 1) return null;
  const reach = reachOf(lines, accuracyPx);
  const { carriers, potentials } = before;
  const footed = carryToFeet(line.shape, carriers, reach);
  const moved = { ...old, line, footed };
  if (!endsAlike(footed, old.footed) || !standsClear(moved, before, accuracyPx, reach)) return null;
  const equipotentials = before.equipotentials.map((each) => (each === old ? moved : each));
  const pairs = before.order.pairs.filter((pair) => isTouched(pair, id, before.strips));
  const graphWith = (more: readonly Carrier[]) => carrierGraph([...carriers, ...more], potentials, reach);
  const ways = reach === before.reach ? before.ways : graphWith([]);
  const fresh = stripsOf({ pairs }, equipotentials, potentials, ways, graphWith);
  const touched = pairs.flatMap((pair) => before.strips.filter((strip) => bounds(strip, pair)));
  if (!closeAlike(touched, fresh)) return null;
  const strips = before.strips.map((strip) => fresh[touched.indexOf(strip)] ?? strip);
  const others = before.strips.filter((strip) => !touched.includes(strip));
  if (others.some(({ ring }) => holdsPartOf(ring, footed.shape))) return null;
  const model = { ...before, lines, equipotentials, strips, reach, ways };
  return { model, touched: [...touched, ...fresh] };
}

/** True for a place in one of the strips, or within `slack` of it: its reading may hang on them. Working pixels. */
export function liesAt(strips: readonly { readonly ring: Ring }[], [x, y]: Pair, slack: number): boolean {
  return strips.some(({ ring }) => {
    const { box } = ring;
    if (x < box.minX - slack || x > box.maxX + slack) return false;
    if (y < box.minY - slack || y > box.maxY + slack) return false;
    return ringContains(ring, x, y) || distanceToRing(ring, x, y) <= slack;
  });
}

function endsAlike(a: FootedLine, b: FootedLine): boolean {
  const alike = (one: Foot | null, other: Foot | null) =>
    one !== null && other !== null && one.carrier.id === other.carrier.id;
  return alike(a.start, b.start) && alike(a.end, b.end);
}

/** True when a moved line is sound by itself and neither meets another equipotential nor comes to be a piece of one. */
function standsClear(moved: Equipotential, net: NetModel, accuracyPx: number, reach: number): boolean {
  const others = net.equipotentials.filter(({ id }) => id !== moved.id);
  if (findTangles([moved.line], accuracyPx).length > 0) return false;
  if (checkLines([moved], [], net.walls, accuracyPx, reach).length > 0) return false;
  const tips = looseTips(moved);
  return others.every(
    ({ footed, line }) =>
      countMeetings(footed.shape, moved.footed.shape, 1) === 0 &&
      !tipsOf(line).some((a) => tips.some((b) => Math.hypot(a[0] - b[0], a[1] - b[1]) <= reach)),
  );
}

/** The ends that may be joined to a further piece: those on no boundary. */
function looseTips({ line, footed }: Equipotential): Pair[] {
  const [start, end] = tipsOf(line) as [Pair, Pair];
  return [footed.start?.carrier.real ? [] : [start], footed.end?.carrier.real ? [] : [end]].flat();
}

function tipsOf({ shape }: NetLine): Pair[] {
  return [firstOf(shape), lastOf(shape)];
}

function bounds(strip: Strip, pair: OrderedPair): boolean {
  return strip.before === pair.before && strip.after === pair.after;
}

/** A strip hangs on its own lines; one that is missing or open at an end may have been kept from closing by any line. */
function isTouched(pair: OrderedPair, id: string, strips: readonly Strip[]): boolean {
  if (pair.before === id || pair.after === id || pair.beside.includes(id)) return true;
  const own = strips.filter((strip) => bounds(strip, pair));
  return own.length !== 1 || own[0]!.ways.some(({ open }) => open);
}

/** True when the strips are those of before with the same boundaries along them, one for one. */
function closeAlike(before: readonly Strip[], now: readonly Strip[]): boolean {
  const nameOf = ({ before: a, after: b, held, ways }: Strip) =>
    JSON.stringify([a, b, held.map(({ id, way }) => [id, way]), ways.map(({ open }) => open)]);
  const names = before.map(nameOf);
  return new Set(names).size === names.length && names.join() === now.map(nameOf).join();
}
