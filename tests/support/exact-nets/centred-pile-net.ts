import { type ExactNet, type ExactPlace, openGroundNet } from '#shared/compute/exact/exact-net.ts';

export type CentredPileNet = {
  /** Width of the floor along the flow, and depth of the pile under its middle. */
  readonly width: number;
  readonly depth: number;
  readonly headwater: number;
  readonly tailwater: number;
  readonly drops: number;
  readonly channels: number;
  /** Middle of the floor, at ground level. */
  readonly middle: ExactPlace;
};

/**
 * Flow under a flat floor with a thin pile under its middle, on the level surface of a half-space. With z = x + iy, x
 * towards the tailwater and y the depth: ζ = √(z² + s²) spreads the pile flat, so that the floor becomes one of half
 * width c = √(b²/4 + s²), and ζ = c·cosh(v + iθ), h = tailwater + Hθ/π. Source: Khosla, Bose and Taylor (1936),
 * intermediate pile; Harr (1962).
 */
export function centredPileNet(options: CentredPileNet): ExactNet {
  const { width, depth, headwater, tailwater, drops, channels, middle } = options;
  const c = Math.hypot(width / 2, depth);
  const placeAt = (dropsLost: number, channel: number): ExactPlace => {
    const theta = Math.PI * (1 - dropsLost / drops);
    const v = (Math.PI * channel) / drops;
    const re = c * Math.cos(theta) * Math.cosh(v);
    const im = c * Math.sin(theta) * Math.sinh(v);
    const [x, y] = rootOf(re * re - im * im - depth * depth, 2 * re * im, re);
    return [middle[0] + x, middle[1] - y];
  };
  return openGroundNet({
    headwater,
    tailwater,
    drops,
    channels,
    placeAt,
    headAt: (offset, elevation) => {
      const x = offset - middle[0];
      const y = middle[1] - elevation;
      const [re, im] = rootOf(x * x - y * y + depth * depth, 2 * x * y, x);
      const cosine = (Math.hypot(re + c, im) - Math.hypot(re - c, im)) / (2 * c);
      return tailwater + ((headwater - tailwater) / Math.PI) * Math.acos(Math.min(1, Math.max(-1, cosine)));
    },
    outline: [(part) => outlineAt(part / 2, options), (part) => outlineAt((1 + part) / 2, options)],
  });
}

/** The square root with y ≥ 0 whose x has the sign of `side`. */
function rootOf(re: number, im: number, side: number): [x: number, y: number] {
  const size = Math.hypot(re, im);
  const x = Math.sqrt(Math.max(0, (size + re) / 2));
  const y = Math.sqrt(Math.max(0, (size - re) / 2));
  return [side < 0 ? -x : x, y];
}

/** Floor, down one side of the pile to its tip at the part 1/2, up the other, floor: as an outline is traced. */
function outlineAt(part: number, { width, depth, middle }: CentredPileNet): ExactPlace {
  const s = part * (width + 2 * depth) - (width / 2 + depth);
  const onPile = depth - Math.abs(s);
  if (onPile >= 0) return [middle[0], middle[1] - onPile];
  return [middle[0] + Math.sign(s) * (Math.abs(s) - depth), middle[1]];
}
