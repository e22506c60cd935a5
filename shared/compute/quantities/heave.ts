/** Intervals of the integral along the base of the prism. */
const PIECES = 48;

/**
 * Mean excess head over the base of a heave prism: ∫(h − h_out)dx over the width, divided by it. `excessAt` gives the
 * excess head at a part 0 to 1 of the base, counted from the tip of the wall, null where nothing is read. The head
 * leaves the tip as the root of the distance, so that the middles of equal pieces of the root are taken: with x = b·t²
 * the mean is ∫2t·(h − h_out)dt. Null as soon as one place cannot be read: a mean over the rest would look right.
 */
export function meanOverBase(excessAt: (part: number) => number | null): number | null {
  if (excessAt(1) === null) return null;
  let sum = 0;
  for (let i = 0; i < PIECES; i += 1) {
    const t = (i + 0.5) / PIECES;
    const excess = excessAt(t * t);
    if (excess === null) return null;
    sum += 2 * t * excess;
  }
  return finiteOrNull(sum / PIECES);
}

/**
 * Factor of safety against heave of the prism of soil beside a wall, depth D and width D/2: F = γ'·D/(γw·h_m), its
 * submerged weight over the uplift of the mean excess head h_m on its base. Lengths in one unit, weights in one unit.
 * Null where there is no excess head. Source: Terzaghi (1922); Terzaghi and Peck (1948), art. on piping by heave.
 */
export function heaveFactor(
  submergedUnitWeight: number,
  depth: number,
  meanExcessHead: number,
  gammaW: number,
): number | null {
  const uplift = gammaW * meanExcessHead;
  return uplift > 0 ? finiteOrNull((submergedUnitWeight * depth) / uplift) : null;
}

/** The balance of a cap of little permeability over a layer under pressure. */
export type BlowUp = {
  /** Pore pressure on its underside, u = γw·(h − z). */
  readonly porePressure: number;
  /** γ·t/u: whole weight over whole pressure. */
  readonly totalFactor: number | null;
  /** (γ − γw)·t/(γw·Δh): submerged weight over the excess pressure; it is much the greater and must be named. */
  readonly effectiveFactor: number | null;
};

/**
 * Blow-up of a cap of thickness t and saturated unit weight γ whose top lies at `groundLevel`, water standing at it,
 * above a layer in which the total head is `headBelow`. Levels and lengths in one unit, u in γw's unit times it. The two
 * customary factors differ; each has its name. Null where no pressure acts. Source: own arithmetic of the two balances
 * (common practice with no source).
 */
export function blowUp(
  thickness: number,
  unitWeight: number,
  groundLevel: number,
  headBelow: number,
  gammaW: number,
): BlowUp {
  const porePressure = gammaW * (headBelow - (groundLevel - thickness));
  const excess = gammaW * (headBelow - groundLevel);
  return {
    porePressure,
    totalFactor: porePressure > 0 ? finiteOrNull((unitWeight * thickness) / porePressure) : null,
    effectiveFactor: excess > 0 ? finiteOrNull(((unitWeight - gammaW) * thickness) / excess) : null,
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
