import { type ExactNet, type ExactPlace, openGroundNet } from '#shared/compute/exact/exact-net.ts';
import { flatApronHead, flatApronPoint } from '#shared/compute/exact/flat-apron.ts';

export type FlatApronNet = {
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
 * A net under a flat apron with square cells, to its outermost traced flow line. Flow runs towards growing offsets,
 * `middle` and lengths in one unit, heads and levels above one datum. See `flatApronPoint` for the closed form and its
 * source.
 */
export function flatApronNet({
  width,
  headwater,
  tailwater,
  drops,
  channels,
  middle,
}: FlatApronNet): ExactNet {
  const apron = { b: width, H: headwater - tailwater };
  const placeAt = (dropsLost: number, channel: number): ExactPlace => {
    const [x, depth] = flatApronPoint(apron, apron.H * (1 - dropsLost / drops), (Math.PI * channel) / drops);
    return [middle[0] + x, middle[1] - depth];
  };
  return openGroundNet({
    headwater,
    tailwater,
    drops,
    channels,
    placeAt,
    headAt: (offset, elevation) =>
      tailwater + flatApronHead(apron, offset - middle[0], middle[1] - elevation),
    outline: [(part) => placeAt(part * drops, 0)],
  });
}
