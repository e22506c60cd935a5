import * as z from 'zod/mini';
import { lineKind } from './document.ts';

const place = z.tuple([z.number(), z.number()]);

/** One fact that two readings of a net give differently, as it stands in each; null where one has none. */
export const changedFact = z.object({
  label: z.string(),
  before: z.nullable(z.union([z.string(), z.number()])),
  after: z.nullable(z.union([z.string(), z.number()])),
});
export type ChangedFact = z.infer<typeof changedFact>;

const change = z.enum(['added', 'removed', 'changed']);
export type Change = z.infer<typeof change>;

export const lineChange = z.object({
  id: z.string(),
  change,
  line: lineKind,
  name: z.string(),
  /** Drops lost at an equipotential as counted where it is shown, to tell those without a name apart; null for others. */
  drops: z.nullable(z.number()),
  /** Greatest distance between both courses, pixels of the sheet; null for a line that only one of both has. */
  movedPx: z.nullable(z.number()),
  /** The same in the length unit, by the later set-out; null where that has one scale no more or none. */
  moved: z.nullable(z.number()),
  /** What else is different: what kind of line it is, its head, whether it is finished. */
  facts: z.array(changedFact),
  /** Course in each, pixels of the sheet, to be drawn over each other; empty where it is not there. */
  before: z.array(place),
  after: z.array(place),
});
export type LineChange = z.infer<typeof lineChange>;

export const pointChange = z.object({
  id: z.string(),
  change,
  name: z.string(),
  facts: z.array(changedFact),
});
export type PointChange = z.infer<typeof pointChange>;

/** A figure of a point before and after; `difference` is after − before, null where either is missing. */
export const figurePair = z.object({
  before: z.nullable(z.number()),
  after: z.nullable(z.number()),
  difference: z.nullable(z.number()),
});
export type FigurePair = z.infer<typeof figurePair>;

export const comparedPoint = z.object({
  id: z.string(),
  name: z.string(),
  totalHead: figurePair,
  porePressure: figurePair,
});
export type ComparedPoint = z.infer<typeof comparedPoint>;

/** What changed from one frozen net to a later one of the same section. Figures are those frozen, none is worked out. */
export const revisionComparison = z.object({
  lines: z.array(lineChange),
  points: z.array(pointChange),
  /** Levels, permeability, count, set-out, datum and known points. */
  inputs: z.array(changedFact),
  quantities: z.array(changedFact),
  /** Every point that both or either have, in the order of the later schedule. */
  figures: z.array(comparedPoint),
});
export type RevisionComparison = z.infer<typeof revisionComparison>;
