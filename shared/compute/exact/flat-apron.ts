import {
  type ExactNet,
  type ExactPlace,
  equipotentialsOf,
  flowLinesOf,
} from '#shared/compute/exact/exact-net.ts';

export type FlatApron = {
  /** Width of the apron along the flow, b. */
  readonly width: number;
  readonly headwater: number;
  readonly tailwater: number;
  readonly drops: number;
  /** Channels traced; the outermost flow line is no boundary, the ground goes on below it. */
  readonly channels: number;
  /** Middle of the apron, at ground level. */
  readonly middle: ExactPlace;
};

/**
 * Flow under a flat apron on the level surface of a half-space: equipotentials are confocal hyperbolas and flow lines
 * confocal ellipses about the edges of the apron. With x from the middle of the apron towards the tailwater and y the
 * depth: x + iy = (b/2)·cosh(v + iθ), h = tailwater + Hθ/π, q between flow lines = kHΔv/π; along the apron
 * h = (H/π)·arccos(2x/b). Source: Pavlovsky (1922); Harr (1962), Groundwater and Seepage.
 */
export function flatApron({ width, headwater, tailwater, drops, channels, middle }: FlatApron): ExactNet {
  const c = width / 2;
  const lost = headwater - tailwater;
  const place = (theta: number, v: number): ExactPlace => [
    middle[0] + c * Math.cos(theta) * Math.cosh(v),
    middle[1] - c * Math.sin(theta) * Math.sinh(v),
  ];
  const placeAt = (dropsLost: number, channel: number) =>
    place(Math.PI * (1 - dropsLost / drops), (Math.PI * channel) / drops);
  const bed = 1.15 * channels;
  return {
    headwater,
    tailwater,
    outHead: tailwater,
    drops,
    channels,
    bounded: false,
    placeAt,
    headAt: (offset, elevation) => {
      const x = offset - middle[0];
      const y = middle[1] - elevation;
      const cosine = (Math.hypot(x + c, y) - Math.hypot(x - c, y)) / (2 * c);
      return tailwater + (lost / Math.PI) * Math.acos(Math.min(1, Math.max(-1, cosine)));
    },
    lines: [
      { line: 'submergedFace', water: 'headwater', at: (part) => placeAt(0, part * bed) },
      { line: 'submergedFace', water: 'tailwater', at: (part) => placeAt(drops, part * bed) },
      { line: 'impervious', water: null, at: (part) => placeAt(part * drops, 0) },
      ...equipotentialsOf({ drops, channels, placeAt }),
      ...flowLinesOf(
        { drops, placeAt },
        Array.from({ length: channels }, (_, i) => i + 1),
      ),
    ],
  };
}
