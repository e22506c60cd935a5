import * as z from 'zod/mini';
import { doubtShares, quantityDoubt } from './reading-doubt.ts';
import { frameReading, soilsReading } from './reading-frame.ts';
import { measuredReading } from './reading-measured.ts';
import { netCheckReading } from './reading-net-check.ts';
import { phreaticReading } from './reading-phreatic.ts';
import { exitReading, profileReading, stabilityReading } from './reading-quantities.ts';

/**
 * What `readNet` returns and the schedule, the title block, the API and the command line show. Heads and
 * elevations are in the document's length unit above its datum, pressures in kPa (SI) or lb/ft² (US), offsets in
 * the length unit with the sign the known points gave. Figures are unrounded; `shared/text` formats them.
 */

/** Cells of the title block, so that a missing fact can lead to the step that supplies it. */
export const titleBlockCell = z.enum([
  'section',
  'dam',
  'scale',
  'residual',
  'headwater',
  'outlet',
  'drops',
  'channels',
  'headPerDrop',
  'permeability',
  'seepage',
  'netCheck',
]);
export type TitleBlockCell = z.infer<typeof titleBlockCell>;

/** Something missing, doubtful or contradictory, said in a sentence that tells what to do. */
export const finding = z.object({
  code: z.string(),
  /** `missing` and `wrong` withhold every figure; `question` and `note` do not. */
  weight: z.enum(['missing', 'wrong', 'question', 'note']),
  text: z.string(),
  cell: z.nullable(titleBlockCell),
  /** Lines, points or known points it is about. */
  entityIds: z.array(z.string()),
  /** Place on the sheet, base-raster pixels; null when it has none. */
  at: z.nullable(z.tuple([z.number(), z.number()])),
});
export type Finding = z.infer<typeof finding>;

const placeDoubt = z.object({ offset: z.number(), elevation: z.number() });

export const setOutReading = z.object({
  state: z.enum(['fitted', 'incomplete', 'ambiguous', 'refused']),
  /** Length units per pixel along the level of the drawing; null until fitted. */
  unitsPerPx: z.nullable(z.number()),
  /** Length units per pixel upwards: the same, except on a drawing that is declared to have two scales. */
  unitsPerPxUp: z.nullable(z.number()),
  /** Times by which the drawing is stretched upwards, the first scale over the second; 1 for one scale. */
  exaggeration: z.nullable(z.number()),
  /** Angle of the section's horizontal on the sheet, degrees, clockwise positive as seen on the sheet. */
  rotationDeg: z.nullable(z.number()),
  /** True when offsets grow to the left as displayed. */
  offsetsGrowLeft: z.nullable(z.boolean()),
  /** Root mean square residual of all points when more than the fit needs are given; null = two points only. */
  residual: z.nullable(z.number()),
  /** Fitted minus typed; null for a coordinate that is not typed. */
  residuals: z.array(
    z.object({ id: z.string(), offset: z.nullable(z.number()), elevation: z.nullable(z.number()) }),
  ),
  /** 1:n that the fit implies at the sheet's dpi; null when dpi is unknown. */
  impliedScale: z.nullable(z.number()),
  /**
   * Half-widths (95 %) of offset and elevation that the known points leave to a place: in the middle of the frame, and
   * at the corner of it where they are greatest. Null until fitted.
   */
  placeDoubt: z.nullable(z.object({ middle: placeDoubt, corner: placeDoubt })),
});
export type SetOutReading = z.infer<typeof setOutReading>;

export const lineReading = z.object({
  id: z.string(),
  /** Drops lost from the headwater, 0 to Nd; null when it cannot be ordered. */
  drops: z.nullable(z.number()),
  /** Total head of the line; for faces of free outflow and empty sloping drains null (it varies along them). */
  head: z.nullable(z.number()),
  source: z.enum(['boundary', 'counted', 'typedDrops', 'typedHead', 'unordered']),
});
export type LineReading = z.infer<typeof lineReading>;

export const pointReading = z.object({
  id: z.string(),
  name: z.string(),
  order: z.number(),
  /** Base-raster pixels. */
  sheetAt: z.nullable(z.tuple([z.number(), z.number()])),
  offset: z.nullable(z.number()),
  elevation: z.nullable(z.number()),
  status: z.enum(['read', 'abovePhreatic', 'withheld']),
  /** Why there is no figure; null when there is one. */
  reason: z.nullable(z.object({ code: z.string(), text: z.string() })),
  /** Drops lost from the headwater, by the field, as all figures of the point. */
  dropsLost: z.nullable(z.number()),
  /**
   * The neighbouring lines towards the headwater and towards the outlet, and the part of the interval passed by hand's
   * rule.
   */
  between: z.nullable(z.object({ before: z.string(), after: z.string(), fraction: z.number() })),
  totalHead: z.nullable(z.number()),
  /** All ± hold 95 %. */
  totalHeadPlusMinus: z.nullable(z.number()),
  pressureHead: z.nullable(z.number()),
  pressureHeadPlusMinus: z.nullable(z.number()),
  /** u = γw(h − z); 0 above the phreatic line (suction left out), where the heads are null. */
  porePressure: z.nullable(z.number()),
  porePressurePlusMinus: z.nullable(z.number()),
  /** Share of each source in the ± of the total head and of the pore pressure; null where there is no figure. */
  doubt: z.nullable(z.object({ totalHead: doubtShares, porePressure: doubtShares })),
  /** By hand's rule, which explains the figure; null where nothing is read. */
  byHand: z.nullable(z.object({ totalHead: z.number(), dropsLost: z.number() })),
  /**
   * By the field between the two lines, which is the figure; `gradient` is (∂h/∂offset, ∂h/∂elevation), the hydraulic
   * gradient is its negative. Null where nothing is read, and where the field could not be solved: then the figure is
   * the hand rule's, and a finding says so.
   */
  byField: z.nullable(
    z.object({
      totalHead: z.number(),
      dropsLost: z.number(),
      gradient: z.tuple([z.number(), z.number()]),
    }),
  ),
  /** How the figure came about, in words. */
  explanation: z.string(),
  findings: z.array(finding),
});
export type PointReading = z.infer<typeof pointReading>;

/** Where water leaves: the head there, and what is lost and what arrives on the way to it. */
export const outletReading = z.object({
  /** The traced boundary, and all the lines of which it is made. */
  id: z.string(),
  members: z.array(z.string()),
  label: z.string(),
  /** Head that the water has when it has left: the level, or the lowest elevation of a face of free outflow. */
  head: z.number(),
  headLost: z.nullable(z.number()),
  /** Drops from the headwater to it, parts of a drop included. */
  drops: z.nullable(z.number()),
  /** Channels that arrive; negative where it gives more water than it takes. Null when the lines do not tell. */
  channels: z.nullable(z.number()),
  /** q = k·Δh·Nf·(B/L) of those channels, m³/s per metre (SI) or ft³/s per foot (US). */
  seepage: z.nullable(z.number()),
});
export type OutletReading = z.infer<typeof outletReading>;

/** What is added here needs its value for readings frozen before, in `reading-versions.ts`. */
export const netReading = z.object({
  state: z.enum(['read', 'unfinished']),
  findings: z.array(finding),
  setOut: setOutReading,
  lines: z.array(lineReading),
  points: z.array(pointReading),
  /** Points at which something was measured, beside the net. */
  measured: z.array(measuredReading),
  quantities: z.object({
    /** Nd as stated or counted; null while unfinished and with outlets at several heads, which have their own below. */
    drops: z.nullable(z.number()),
    /** What the traced lines amount to, to the lowest outlet, to propose it. */
    tracedDrops: z.nullable(z.number()),
    /** Nf of the whole flow from the headwater. */
    channels: z.nullable(z.number()),
    /** Nf/Nd; null while either is not known, where the intervals are unequal, and without a single Nd. */
    shapeFactor: z.nullable(z.number()),
    /** False when an outermost traced flow line is no real boundary: then the figure is "traced channels only". */
    channelsComplete: z.boolean(),
    headLost: z.nullable(z.number()),
    /** Single head per drop; null when the intervals are unequal. */
    headPerDrop: z.nullable(z.number()),
    unequalIntervals: z.boolean(),
    /** q = k·Δh·Nf·(B/L), m³/s per metre (SI) or ft³/s per foot (US). */
    seepage: z.nullable(z.number()),
    /** Significant figures that k deserves. */
    seepageFigures: z.number(),
    gammaW: z.nullable(z.number()),
    /** The outlets that the flow reaches, the lowest first; none while unfinished. */
    outlets: z.array(outletReading),
  }),
  /** The section in which the net is judged. */
  frame: z.nullable(frameReading),
  soils: z.nullable(soilsReading),
  phreatic: z.nullable(phreaticReading),
  /** The check of the net's own drawing; null without a set-out net. */
  netCheck: z.nullable(netCheckReading),
  doubt: quantityDoubt,
  /** What was read along each profile, in their order. */
  profiles: z.array(profileReading),
  /** The cells at which water leaves; none while unfinished. */
  exits: z.array(exitReading),
  stability: stabilityReading,
});
export type NetReading = z.infer<typeof netReading>;
