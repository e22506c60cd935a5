import {
  type ExactNet,
  type ExactPlace,
  equipotentialsOf,
  flowLinesOf,
} from '#shared/compute/exact/exact-net.ts';

export type BasicParabola = {
  /** Head at the parabolic upstream boundary above the base, and number of drops into which it is parted. */
  readonly head: number;
  readonly drops: number;
  /** Whole channels; the focal ordinate S is then H·Nf/Nd, so that the cells are square. */
  readonly channels: number;
  /** Offset and elevation of the focus, where the drain begins on the impervious base. */
  readonly focus: ExactPlace;
};

/**
 * The basic parabola: unconfined flow over a horizontal impervious base to a horizontal drain in it, entering through
 * an upstream boundary that is itself an equipotential, a parabola confocal with the others (with any other upstream
 * face it would not be exact). With the origin at the focus, X positive upstream and Y up, heads above the base:
 * (h + iψ)² = 2S(X + iY), so h = √(S(r + X)), ψ = √(S(r − X)); the phreatic line is ψ = S, Y² = 2SX + S², and
 * q = kS. Source: Kozeny (1931); Casagrande (1937).
 */
export function basicParabola({ head, drops, channels, focus }: BasicParabola): ExactNet {
  const s = (head * channels) / drops;
  const place = (h: number, psi: number): ExactPlace => [
    focus[0] - (h * h - psi * psi) / (2 * s),
    focus[1] + (h * psi) / s,
  ];
  const placeAt = (dropsLost: number, channel: number) =>
    place((head * (drops - dropsLost)) / drops, s * (1 - channel / channels));
  const inner = Array.from({ length: channels - 1 }, (_, i) => i + 1);
  return {
    headwater: focus[1] + head,
    tailwater: null,
    outHead: focus[1],
    drops,
    channels,
    bounded: true,
    placeAt,
    headAt: (offset, elevation) => {
      const x = focus[0] - offset;
      const r = Math.hypot(x, elevation - focus[1]);
      // r − x is the square of ψ over S: beyond S the place lies above the phreatic line.
      return r - x > s ? Number.NaN : focus[1] + Math.sqrt(s * Math.max(0, r + x));
    },
    lines: [
      { line: 'submergedFace', water: 'headwater', at: (part) => placeAt(0, part * channels) },
      { line: 'drain', water: null, at: (part) => placeAt(drops, part * channels) },
      { line: 'phreaticLine', water: null, at: (part) => placeAt(part * drops, 0) },
      { line: 'impervious', water: null, at: (part) => placeAt(part * drops, channels) },
      ...equipotentialsOf({ drops, channels, placeAt }),
      ...flowLinesOf({ drops, placeAt }, inner),
    ],
  };
}
