import type { SheetPx } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { type ComputedLine, computedNet } from '#shared/compute/independent/computed-net.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import type { SheetPoint } from '#shared/contract/document.ts';

/** A computed net in base-raster pixels, rounded to a tenth. `value`: head of an equipotential, ψ of a flow line. */
export type PlacedLine = { readonly value: number; readonly lines: readonly (readonly SheetPoint[])[] };

export type PlacedNet = {
  readonly drops: number;
  readonly dropHead: number;
  /** Nf; null where the stream function has no single value: then there are no flow lines. */
  readonly channels: number | null;
  readonly equipotentials: readonly PlacedLine[];
  readonly flowLines: readonly PlacedLine[];
  /** The free surface found; empty where the section is confined. */
  readonly surface: readonly (readonly SheetPoint[])[];
};

/** The computed net of a solution, see `computedNet`, with its lines and the free surface placed on the sheet. */
export function placedNet(
  solution: SectionSolution,
  drops: number,
  toSheet: (place: Pair) => SheetPx,
): PlacedNet {
  const net = computedNet(solution, drops);
  const placed = (line: readonly Pair[]): SheetPoint[] =>
    line.map((place) => {
      const [x, y] = toSheet(place);
      return [Math.round(10 * x) / 10, Math.round(10 * y) / 10];
    });
  const each = ({ value, lines }: ComputedLine): PlacedLine => ({ value, lines: lines.map(placed) });
  return {
    drops: net.drops,
    dropHead: net.dropHead,
    channels: net.channels,
    equipotentials: net.equipotentials.map(each),
    flowLines: net.flowLines.map(each),
    surface: (solution.phreatic ?? []).map(placed),
  };
}
