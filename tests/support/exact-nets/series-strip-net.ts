import { type ExactNet, type ExactPlace, equipotentialsOf } from '#shared/compute/exact/exact-net.ts';

export type SeriesStrip = {
  /** Lengths of the two soils along the flow, and their permeability in one unit. */
  readonly lengths: readonly [number, number];
  readonly permeabilities: readonly [number, number];
  readonly thickness: number;
  readonly headwater: number;
  readonly tailwater: number;
  readonly drops: number;
  /** Top of the strip at its upstream end; it lies level and starts at offset 0. */
  readonly top: number;
};

/**
 * Level confined flow through two soils one after the other, between two impervious layers: the head falls in straight
 * lines, by each soil in proportion to its length over its permeability (Darcy 1856, in series). The boundary between
 * the soils is traced; no flow line is.
 */
export function seriesStripNet(strip: SeriesStrip): ExactNet {
  const { lengths, permeabilities, thickness, headwater, tailwater, drops, top } = strip;
  const resistances = [lengths[0] / permeabilities[0], lengths[1] / permeabilities[1]] as const;
  const whole = resistances[0] + resistances[1];
  const offsetOf = (part: number) => {
    const resistance = part * whole;
    return resistance <= resistances[0]
      ? resistance * permeabilities[0]
      : lengths[0] + (resistance - resistances[0]) * permeabilities[1];
  };
  const lostAt = (offset: number) =>
    (Math.min(offset, lengths[0]) / permeabilities[0] +
      Math.max(0, offset - lengths[0]) / permeabilities[1]) /
    whole;
  const placeAt = (dropsLost: number, channel: number): ExactPlace => [
    offsetOf(dropsLost / drops),
    top - channel * thickness,
  ];
  const end = lengths[0] + lengths[1];
  const upright = (offset: number) => (part: number) => [offset, top - part * thickness] as const;
  const level = (elevation: number) => (part: number) => [part * end, elevation] as const;
  return {
    headwater,
    tailwater,
    outHead: tailwater,
    drops,
    channels: 1,
    bounded: true,
    placeAt,
    headAt: (offset) => headwater - (headwater - tailwater) * lostAt(offset),
    lines: [
      { line: 'submergedFace', water: 'headwater', at: upright(0) },
      { line: 'submergedFace', water: 'tailwater', at: upright(end) },
      { line: 'impervious', water: null, at: level(top) },
      { line: 'impervious', water: null, at: level(top - thickness) },
      { line: 'soilBoundary', water: null, at: upright(lengths[0]) },
      ...equipotentialsOf({ drops, channels: 1, placeAt }),
    ],
  };
}
