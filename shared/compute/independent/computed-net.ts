import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { contourLines } from '#shared/compute/independent/contour-lines.ts';
import { toSection } from '#shared/compute/independent/section-frame.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';

/** A line of the computed net: its head or its ψ, and the polylines that make it up, in section coordinates. */
export type ComputedLine = { readonly value: number; readonly lines: readonly (readonly Pair[])[] };

/**
 * A net drawn from a solution: equipotentials at equal drops, flow lines at equal flow. `channels`: Nf, whose whole
 * part is drawn in full and whose rest is the last channel's part; null with no flow lines where ψ has no single value.
 */
export type ComputedNet = {
  readonly drops: number;
  readonly dropHead: number;
  readonly equipotentials: readonly ComputedLine[];
  readonly channels: number | null;
  readonly flowLines: readonly ComputedLine[];
};

/**
 * The net of a solution with a number of drops: equipotentials between the greatest and the least head, Δh apart, and
 * flow lines Δψ = √(kh·kv)·Δh apart, so that its cells are squares in the transformed section of the soil in which it
 * is counted (`countedIn`, its place in the list of soils) and Nf = (q/kH)·Nd. Source: Casagrande (1937).
 */
export function computedNet(solution: SectionSolution, drops: number, countedIn = 0): ComputedNet {
  const { frame, mesh, heads, leastHead, greatestHead, stream } = solution;
  const whole = Math.max(1, Math.round(drops));
  const dropHead = (greatestHead - leastHead) / whole;
  const contour = (on: typeof mesh, values: Float64Array, level: number): ComputedLine => ({
    value: level,
    lines: contourLines(on, values, level).map((line) => line.map((place) => toSection(frame, place))),
  });
  const equipotentials =
    dropHead > 0
      ? Array.from({ length: whole - 1 }, (_, i) => contour(mesh, heads, greatestHead - (i + 1) * dropHead))
      : [];
  const step = (solution.permeabilities[countedIn] ?? Number.NaN) * dropHead;
  if (stream === null || !(step > 0))
    return { drops: whole, dropHead, equipotentials, channels: null, flowLines: [] };
  const [low, high] = rangeOf(stream.values);
  const channels = solution.inflow / step;
  // A flow line that falls on the boundary to rounding is the boundary. Where the mesh is cut at a drain inside the
  // section, ψ goes over a wider range than the flow.
  const inner = Math.min(MOST_CHANNELS, Math.ceil((high - low) / step - 1e-6) - 1);
  const flowLines = Array.from({ length: Math.max(0, inner) }, (_, i) =>
    contour(stream.mesh, stream.values, low + (i + 1) * step),
  );
  return { drops: whole, dropHead, equipotentials, channels, flowLines };
}

const MOST_CHANNELS = 400;

function rangeOf(values: Float64Array): [number, number] {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const value of values) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return [low, high];
}
