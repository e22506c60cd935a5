import type { LineKind } from '#shared/contract/document.ts';

/** Offset and elevation, any length unit. */
export type ExactPlace = readonly [offset: number, elevation: number];

/** A line of an exact net as an engineer would trace it. */
export type ExactLine = {
  readonly line: LineKind;
  readonly water: 'headwater' | 'tailwater' | null;
  /** Place at a part of the line, 0 to 1; smooth but not evenly spaced. */
  readonly at: (part: number) => ExactPlace;
};

/**
 * A net whose heads are known in closed form, for tests and for the demo. Flow runs towards growing offsets; lengths
 * in any one unit; `headwater` and `outHead` are elevations of the heads at both ends.
 */
export type ExactNet = {
  readonly headwater: number;
  /** Level of the tailwater; null where the outlet is an empty drain. */
  readonly tailwater: number | null;
  readonly outHead: number;
  /** Drops Nd and channels Nf of the traced squares. */
  readonly drops: number;
  readonly channels: number;
  /** False where the outermost flow line is no real boundary. */
  readonly bounded: boolean;
  readonly lines: readonly ExactLine[];
  /** Total head in closed form, elevation of the head; NaN above the phreatic line. */
  readonly headAt: (offset: number, elevation: number) => number;
  /** Place by drops lost (0 to Nd) and channels counted from the structure or the phreatic line (0 to Nf). */
  readonly placeAt: (dropsLost: number, channel: number) => ExactPlace;
};

/** Equipotentials 1 to Nd − 1 of a net, each from channel 0 to channel Nf. */
export function equipotentialsOf(net: Pick<ExactNet, 'drops' | 'channels' | 'placeAt'>): ExactLine[] {
  return Array.from({ length: net.drops - 1 }, (_, i) => ({
    line: 'equipotential' as const,
    water: null,
    at: (part: number) => net.placeAt(i + 1, part * net.channels),
  }));
}

/** Flow lines of a net along given channel boundaries, each from headwater to outlet. */
export function flowLinesOf(
  net: Pick<ExactNet, 'drops' | 'placeAt'>,
  channels: readonly number[],
): ExactLine[] {
  return channels.map((channel) => ({
    line: 'flowLine' as const,
    water: null,
    at: (part: number) => net.placeAt(part * net.drops, channel),
  }));
}

/** What differs between nets of a structure on level ground that goes on without end beside and below it. */
export type OpenGroundNet = Pick<ExactNet, 'headwater' | 'drops' | 'channels' | 'headAt' | 'placeAt'> & {
  readonly tailwater: number;
  /** The structure's outline, in the order of the flow. */
  readonly outline: readonly ExactLine['at'][];
};

/** How much longer than the traced squares the two submerged faces are drawn. */
const FACE_BEYOND = 1.15;

/** The lines of such a net: both faces, the outline, the equipotentials, and flow lines none of which is a boundary. */
export function openGroundNet({ outline, ...net }: OpenGroundNet): ExactNet {
  const face = FACE_BEYOND * net.channels;
  return {
    ...net,
    outHead: net.tailwater,
    bounded: false,
    lines: [
      { line: 'submergedFace', water: 'headwater', at: (part) => net.placeAt(0, part * face) },
      { line: 'submergedFace', water: 'tailwater', at: (part) => net.placeAt(net.drops, part * face) },
      ...outline.map((at) => ({ line: 'impervious' as const, water: null, at })),
      ...equipotentialsOf(net),
      ...flowLinesOf(
        net,
        Array.from({ length: net.channels }, (_, i) => i + 1),
      ),
    ],
  };
}
