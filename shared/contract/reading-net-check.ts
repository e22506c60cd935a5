import * as z from 'zod/mini';

/**
 * The check of a net's own drawing: cells, crossings, angles at boundaries and channels. It judges shape in the
 * section in which an isotropic net has square cells; places are in base-raster pixels of the sheet, rounded to a
 * tenth, lengths in the document's length unit in the natural section. Effects are first order, absolute, and say by how
 * much the head beside the place may be off: in drops, as a head in the length unit, and as a pressure in kPa (SI) or
 * lb/ft² (US); null where the net gives no head per drop.
 */
const place = z.tuple([z.number(), z.number()]);

export const netEffect = z.object({
  drops: z.number(),
  head: z.nullable(z.number()),
  pressure: z.nullable(z.number()),
});
export type NetEffect = z.infer<typeof netEffect>;

/** `notJudged`: the shape of the ground, the soil or the tracing accuracy leaves nothing to say. */
export const netJudgement = z.enum(['good', 'poor', 'notJudged']);
export type NetJudgement = z.infer<typeof netJudgement>;

export const checkedCell = z.object({
  /** Head lines towards the headwater and towards the outlet. */
  before: z.string(),
  after: z.string(),
  /** Its channel, an index of `channels`. */
  channel: z.number(),
  /** Corners and middles of the sides of a poor cell, in order round it; empty for others. */
  outline: z.array(place),
  at: place,
  /** Cell length along the flow L and width across it B. */
  length: z.number(),
  width: z.number(),
  /** B/L in the section in which cells are judged. */
  ratio: z.number(),
  /** The B/L that it should have beside the others, with its part of a drop, its soil and its part of a channel. */
  expected: z.nullable(z.number()),
  /** Angle between its two mid-lines. */
  midAngleDeg: z.number(),
  isExit: z.boolean(),
  judgement: netJudgement,
  /** Why it is not judged. */
  reason: z.nullable(
    z.enum(['singular', 'lineEnds', 'freeFace', 'severalSoils', 'unknownSoil', 'noCommonSection']),
  ),
  effect: z.nullable(netEffect),
});
export type CheckedCell = z.infer<typeof checkedCell>;

export const checkedMeeting = z.object({
  kind: z.enum(['crossing', 'equipotentialAtImpervious', 'equipotentialAtPhreatic', 'flowLineAtPotential']),
  /** The head line, and the flow line or boundary. */
  lines: z.tuple([z.string(), z.string()]),
  at: place,
  /** The sharper of the two angles. */
  angleDeg: z.number(),
  /** ± at 95 % from the tracing accuracy. */
  plusMinusDeg: z.number(),
  judgement: netJudgement,
  effect: netEffect,
});
export type CheckedMeeting = z.infer<typeof checkedMeeting>;

export const checkedChannel = z.object({
  /** Flow lines at its sides, seen along the flow; null at a traced boundary. */
  left: z.nullable(z.string()),
  right: z.nullable(z.string()),
  isOutermost: z.boolean(),
  cells: z.number(),
  /** Flow for each drop and unit permeability, ΣΔNd / Σ(L/B); 1 for squares. Null when none of its cells is judged. */
  flow: z.nullable(z.number()),
  /** That flow over the middle one of the whole channels. */
  share: z.nullable(z.number()),
  /** `partChannel`: an outermost channel that carries clearly less than the others. */
  judgement: z.enum(['good', 'poor', 'partChannel', 'notJudged']),
});
export type CheckedChannel = z.infer<typeof checkedChannel>;

/** A poor place in the list by effect: an index of the list that it is in. */
export const netFault = z.object({
  of: z.enum(['cells', 'meetings']),
  index: z.number(),
  at: place,
  text: z.string(),
  effect: netEffect,
});
export type NetFault = z.infer<typeof netFault>;

export const netCheckReading = z.object({
  /** B/L as entered, as measured (middle value of the judged cells), and by which the cells are judged. */
  enteredRatio: z.number(),
  measuredRatio: z.nullable(z.number()),
  judgedRatio: z.number(),
  /** False without traced flow lines: then each interval is one cell from boundary to boundary, compared with the others only. */
  hasChannels: z.boolean(),
  cells: z.array(checkedCell),
  meetings: z.array(checkedMeeting),
  channels: z.array(checkedChannel),
  /** Sum of the channels' flows, Nf·(B/L) as measured; null when a channel could not be measured. */
  measuredFlow: z.nullable(z.number()),
  /** q with that in place of Nf·(B/L) as stated; unit as the stated seepage. */
  measuredSeepage: z.nullable(z.number()),
  /** Poor cells and angles, the greatest effect first. */
  faults: z.array(netFault),
  summary: z.object({
    cellsJudged: z.number(),
    cellsPoor: z.number(),
    anglesJudged: z.number(),
    anglesPoor: z.number(),
    channelsPoor: z.number(),
    /** One line for the title block. */
    text: z.string(),
  }),
});
export type NetCheckReading = z.infer<typeof netCheckReading>;
