import * as z from 'zod/mini';

const figure = z.nullable(z.number());
/** Base-raster pixels. */
const place = z.tuple([z.number(), z.number()]);
/** Offset and elevation, document length unit. */
const sectionPlace = z.tuple([z.number(), z.number()]);

/** One place of a profile. Heads in the document's length unit, pressures in kPa or lb/ft². */
export const profileSample = z.object({
  /** Distance along the profile in the natural section; null in a grid. */
  distance: figure,
  offset: z.number(),
  elevation: z.number(),
  at: place,
  status: z.enum(['read', 'abovePhreatic', 'withheld']),
  reason: z.nullable(z.object({ code: z.string(), text: z.string() })),
  /** What is doubtful about the figure; null when nothing is. */
  doubtful: z.nullable(z.object({ code: z.string(), text: z.string() })),
  /** All ± hold 95 %. */
  totalHead: figure,
  totalHeadPlusMinus: figure,
  pressureHead: figure,
  /** u = γw(h − z); 0 above the phreatic line (suction left out). */
  porePressure: figure,
  porePressurePlusMinus: figure,
  /** u over the weight of the soil vertically above; null without a ground line above it or a unit weight. */
  ru: figure,
});
export type ProfileSample = z.infer<typeof profileSample>;

/** Forces for a run of one length unit of dam: kN per m or lb per ft. */
const resultant = z.object({
  /** Towards growing offsets, and upwards. */
  horizontal: z.number(),
  vertical: z.number(),
  size: z.number(),
  /** Of the size, along the resultant. */
  plusMinus: figure,
  /** Where the line of action meets the straight line through the ends of the base, and how far from its first end. */
  actsAt: z.nullable(sectionPlace),
  arm: figure,
});

/** A line, a list of places or a grid along which the net was read. */
export const profileReading = z.object({
  id: z.string(),
  name: z.string(),
  order: z.number(),
  use: z.enum(['base', 'slipSurface', 'filterBoundary', 'borehole', 'other']),
  samples: z.array(profileSample),
  /** Why the profile as a whole has no samples, or fewer than asked for; null when it has all. */
  remark: z.nullable(z.object({ code: z.string(), text: z.string() })),
  /**
   * Water pressure on a base: the whole, tailwater included, and its excess over the tailwater's own pressure. Drains
   * and cracked length are not in it. Null for other uses, and the reason where a base has none.
   */
  uplift: z.nullable(
    z.object({
      total: z.nullable(resultant),
      /** Null without a tailwater. */
      excess: z.nullable(resultant),
      note: z.string(),
    }),
  ),
});
export type ProfileReading = z.infer<typeof profileReading>;

/** A cell at which the water leaves the ground. Gradients are positive upwards. */
export const exitReading = z.object({
  /** The boundary at which it leaves, and the lines beside the cell. */
  outlet: z.string(),
  before: z.string(),
  left: z.string(),
  right: z.string(),
  /** Middle of the cell's side on the outlet. */
  at: place,
  offset: z.number(),
  elevation: z.number(),
  /** Cell average Δh/ℓ. */
  cellGradient: figure,
  cellGradientPlusMinus: figure,
  length: z.number(),
  headLost: figure,
  /** Gradient at the place itself, by the field; null where it has no bound and where it could not be worked out. */
  pointGradient: figure,
  /** `singular`: at a floor edge or re-entrant corner, where the gradient at a point has no bound. */
  pointState: z.enum(['read', 'singular', 'unknown']),
  /** Slope of the outlet there in degrees, 0 to 90. */
  slopeDeg: z.number(),
  /** γ'/γw of the soil there; null while its weight is not known. */
  criticalGradient: figure,
  /** i_c/i by the cell average, for upward flow through level ground only. */
  factor: figure,
  /** i_c/i by the gradient at the place. */
  pointFactor: figure,
  /** Why there is no factor; empty when there is one. */
  factorNote: z.string(),
  /** Force of the seepage per volume, i·γw by the cell average, kN/m³ or lb/ft³. */
  seepageForce: figure,
});
export type ExitReading = z.infer<typeof exitReading>;

/** The prism of soil beside a wall at which water leaves: depth D, width D/2. */
export const heaveReading = z.object({
  /** The impervious line that is the wall, and the outlet beside it. */
  wall: z.string(),
  outlet: z.string(),
  /** Tip of the wall. */
  at: place,
  depth: z.number(),
  width: z.number(),
  meanExcessHead: figure,
  meanExcessHeadPlusMinus: figure,
  factor: figure,
  /** Why there is no factor; empty when there is one. */
  note: z.string(),
});
export type HeaveReading = z.infer<typeof heaveReading>;

/** Creep along the contact of the structure, beside the net as a rough cross-check. */
export const creepReading = z.object({
  /** The impervious lines of the contact. */
  lines: z.array(z.string()),
  steep: z.number(),
  flat: z.number(),
  weightedLength: z.number(),
  /** Lane's weighted creep ratio. */
  weightedRatio: figure,
});
export type CreepReading = z.infer<typeof creepReading>;

export const stabilityReading = z.object({
  heave: z.array(heaveReading),
  /** Null where no impervious contact leads from the headwater to the outlet, and in a section with a phreatic line. */
  creep: z.nullable(creepReading),
});
export type StabilityReading = z.infer<typeof stabilityReading>;
