import { type ExactNet, type ExactPlace, openGroundNet } from '#shared/compute/exact/exact-net.ts';

export type SheetPileNet = {
  /** Depth of the pile below the level ground, s. */
  readonly depth: number;
  readonly headwater: number;
  readonly tailwater: number;
  readonly drops: number;
  /** Channels traced; the outermost flow line is no boundary, the ground goes on below it. */
  readonly channels: number;
  /** Where the pile enters the ground. */
  readonly head: ExactPlace;
};

/**
 * Flow round a thin sheet pile driven into the level surface of a half-space. With x from the pile towards the
 * tailwater and y the depth: x + iy = s·sinh(v + iθ), that is x = s·cosθ·sinh v, y = s·sinθ·cosh v;
 * h = tailwater + Hθ/π, q between flow lines = kHΔv/π; down the downstream face h = (H/π)·arcsin(y/s). Source: Harr
 * (1962), Groundwater and Seepage.
 */
export function sheetPileNet({ depth, headwater, tailwater, drops, channels, head }: SheetPileNet): ExactNet {
  const lost = headwater - tailwater;
  const place = (theta: number, v: number): ExactPlace => [
    head[0] + depth * Math.cos(theta) * Math.sinh(v),
    head[1] - depth * Math.sin(theta) * Math.cosh(v),
  ];
  const placeAt = (dropsLost: number, channel: number) =>
    place(Math.PI * (1 - dropsLost / drops), (Math.PI * channel) / drops);
  return openGroundNet({
    headwater,
    tailwater,
    drops,
    channels,
    placeAt,
    headAt: (offset, elevation) => {
      const x = offset - head[0];
      const y = head[1] - elevation;
      // With φ = θ − π/2 the net is that of an apron stood on end: cos φ from the distances to its two edges.
      const cosine = (Math.hypot(x, y + depth) - Math.hypot(x, y - depth)) / (2 * depth);
      const phi = Math.acos(Math.min(1, Math.max(-1, cosine)));
      return tailwater + (lost / Math.PI) * (Math.PI / 2 + (x > 0 ? -phi : phi));
    },
    outline: [(part) => [head[0], head[1] - depth * part]],
  });
}
