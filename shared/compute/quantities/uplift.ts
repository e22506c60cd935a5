/** A place on the underside of a structure with the pressure of the water on it. */
export type PressedPlace = { readonly offset: number; readonly elevation: number; readonly pressure: number };

/** Resultant of the pressures on a base, for a run of one length unit of dam. */
export type Resultant = {
  /** Towards growing offsets, and upwards: kN per m, or lb per ft. */
  readonly horizontal: number;
  readonly vertical: number;
  readonly size: number;
  /** Where its line of action meets the straight line through the ends of the base; null where it has no size. */
  readonly actsAt: readonly [offset: number, elevation: number] | null;
  /** Distance of that place from the first end of the base. */
  readonly arm: number | null;
};

/**
 * Resultant of the water pressure on a base, normal to it everywhere, towards the structure above it. `places` run along
 * the base, which is followed towards growing offsets whichever way it was traced, with the structure on the left hand;
 * between two places the pressure changes evenly. F = Σ∫p·n ds, M = Σ∫r × (p·n)ds about the first place; the line of
 * action is x·F_z − z·F_x = M. Pressures in kPa and lengths in m give kN per m, lb/ft² and ft give lb per ft. Source:
 * statics.
 */
export function resultantOf(places: readonly PressedPlace[]): Resultant {
  const first = places[0];
  const last = places[places.length - 1];
  if (first === undefined || last === undefined) return NOTHING;
  const [path, origin] = last.offset >= first.offset ? [places, first] : [places.toReversed(), last];
  let [fx, fz, moment] = [0, 0, 0];
  for (let i = 1; i < path.length; i += 1) {
    const piece = pressOf(path[i - 1]!, path[i]!, origin);
    fx += piece.fx;
    fz += piece.fz;
    moment += piece.moment;
  }
  return withLine(fx, fz, moment, origin, first, last);
}

const NOTHING: Resultant = { horizontal: 0, vertical: 0, size: 0, actsAt: null, arm: null };

/** Force and moment of a trapezoid of pressure on one straight piece. */
function pressOf(from: PressedPlace, to: PressedPlace, origin: PressedPlace) {
  const dx = to.offset - from.offset;
  const dz = to.elevation - from.elevation;
  const [p0, p1] = [from.pressure, to.pressure];
  const mean = (p0 + p1) / 2;
  const [fx, fz] = [-dz * mean, dx * mean];
  // ∫p·t dt over the piece, t from 0 to 1: where along it the force acts, times the force.
  const weighted = (p0 + 2 * p1) / 6;
  const [ax, az] = [from.offset - origin.offset, from.elevation - origin.elevation];
  return { fx, fz, moment: ax * fz - az * fx + weighted * (dx * dx + dz * dz) };
}

function withLine(
  fx: number,
  fz: number,
  moment: number,
  origin: PressedPlace,
  first: PressedPlace,
  last: PressedPlace,
): Resultant {
  const size = Math.hypot(fx, fz);
  const [cx, cz] = [last.offset - first.offset, last.elevation - first.elevation];
  const chord = Math.hypot(cx, cz);
  const across = cx * fz - cz * fx;
  const plain = { horizontal: fx, vertical: fz, size };
  // A resultant along the base's own chord never meets it at one place.
  if (!(Math.abs(across) > 1e-9 * chord * size)) return { ...plain, actsAt: null, arm: null };
  const [ox, oz] = [first.offset - origin.offset, first.elevation - origin.elevation];
  const part = (moment - (ox * fz - oz * fx)) / across;
  const actsAt = [first.offset + part * cx, first.elevation + part * cz] as const;
  return { ...plain, actsAt, arm: part * chord };
}
