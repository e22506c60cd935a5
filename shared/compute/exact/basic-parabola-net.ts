import { basicParabolaHead, basicParabolaPoint } from '#shared/compute/exact/basic-parabola.ts';
import {
  type ExactNet,
  type ExactPlace,
  equipotentialsOf,
  flowLinesOf,
} from '#shared/compute/exact/exact-net.ts';

export type BasicParabolaNet = {
  /** Head at the parabolic upstream boundary above the base, and number of drops into which it is parted. */
  readonly head: number;
  readonly drops: number;
  /** Whole channels; the focal ordinate S is then H·Nf/Nd, so that the cells are square. */
  readonly channels: number;
  /** Offset and elevation of the focus, where the drain begins on the impervious base. */
  readonly focus: ExactPlace;
};

/**
 * A net of the basic parabola with square cells: S = H·Nf/Nd. Flow runs towards growing offsets, `focus` and lengths
 * in one unit. See `basicParabolaPoint` for the closed form and its source.
 */
export function basicParabolaNet({ head, drops, channels, focus }: BasicParabolaNet): ExactNet {
  const parabola = { S: (head * channels) / drops, H: head };
  const place = (above: number, channel: number): ExactPlace => {
    const [x, y] = basicParabolaPoint(parabola, above, channel);
    return [focus[0] - x, focus[1] + y];
  };
  const placeAt = (dropsLost: number, channel: number) =>
    place((head * (drops - dropsLost)) / drops, 1 - channel / channels);
  const inner = Array.from({ length: channels - 1 }, (_, i) => i + 1);
  return {
    headwater: focus[1] + head,
    tailwater: null,
    outHead: focus[1],
    drops,
    channels,
    bounded: true,
    placeAt,
    headAt: (offset, elevation) =>
      focus[1] + (basicParabolaHead(parabola, focus[0] - offset, elevation - focus[1]) ?? Number.NaN),
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
