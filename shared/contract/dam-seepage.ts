import * as z from 'zod/mini';
import { id } from './common.ts';
import { unitSystem } from './unit-system.ts';

/** Nets put together at most, one for each section: all their readings are to be kept, so that one change reads one net. */
export const MOST_SECTIONS = 60;
const TOO_MANY = `Choose nets of ${MOST_SECTIONS} sections at most.`;
const ID_LENGTH = 36;

const commaList = z.pipe(
  z.string().check(z.toLowerCase(), z.maxLength(MOST_SECTIONS * (ID_LENGTH + 1), TOO_MANY)),
  z.transform((text) => [...new Set(text.split(',').filter((part) => part !== ''))]),
);

/** `nets=<id>,<id>,…`: the net that stands for each section, chosen by the engineer; none to see what there is. */
export const damSeepageQuery = z.object({
  nets: z._default(z.pipe(commaList, z.array(id).check(z.maxLength(MOST_SECTIONS, TOO_MANY))), []),
});

const figure = z.nullable(z.number());
const reason = z.object({ code: z.string(), text: z.string() });

/** A section in use with the nets in use that may stand for it. */
export const seepageSection = z.object({
  id,
  name: z.string(),
  /** As written. */
  chainage: z.string(),
  drawing: z.object({ id, title: z.string() }),
  nets: z.array(z.object({ id, name: z.string() })),
});
export type SeepageSection = z.infer<typeof seepageSection>;

/** A chosen net and what it says of the seepage: metres and m³/s, whatever its own units are. */
export const chosenNet = z.object({
  netId: id,
  netName: z.string(),
  sectionId: id,
  sectionName: z.string(),
  /** As written, and in metres; null where it is no number. */
  chainage: z.string(),
  chainageMetres: figure,
  /** Water levels above the dam's datum, metres. */
  headwater: figure,
  tailwater: figure,
  /** m³/s per metre of dam. */
  seepage: figure,
  /** Factor (×/÷) at 95 %; null while k has none. */
  factor: figure,
  /** Significant figures that k deserves. */
  figures: z.number(),
  /** True when an outermost flow line is no real boundary: then the seepage is that of the traced channels only. */
  tracedOnly: z.boolean(),
  /** Why it is no part of the total; null when it is. */
  leftOut: z.nullable(reason),
});
export type ChosenNet = z.infer<typeof chosenNet>;

/** Something to know before the total is used, said once. */
export const seepageCaution = z.object({
  code: z.enum(['headwatersDiffer', 'tailwatersDiffer', 'tracedOnly', 'noFactor', 'leftOut']),
  text: z.string(),
});
export type SeepageCaution = z.infer<typeof seepageCaution>;

/** `GET /dams/:damId/seepage`: seepage over a length of dam from the nets chosen, metres and m³/s. */
export const damSeepageDto = z.object({
  damId: id,
  /** In which unit system the chainages are written. */
  unitSystem,
  datum: z.string(),
  sections: z.array(seepageSection),
  /** By chainage, those without one last. */
  chosen: z.array(chosenNet),
  /** Chainages and length in metres, flow in m³/s. */
  reaches: z.array(z.object({ from: z.number(), to: z.number(), length: z.number(), flow: z.number() })),
  /** Null while fewer than two sections count. */
  total: z.nullable(
    z.object({
      length: z.number(),
      flow: z.number(),
      /** The greatest of the sections' factors; null when any of them has none. */
      factor: figure,
      figures: z.number(),
    }),
  ),
  cautions: z.array(seepageCaution),
});
export type DamSeepageDto = z.infer<typeof damSeepageDto>;
