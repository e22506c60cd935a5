import * as z from 'zod/mini';

const place = z.tuple([z.number(), z.number()]);

/** How an end of the phreatic line stands to the boundary it meets. */
const lineEnd = z.object({
  /** Base-raster pixels. */
  at: place,
  /** What is expected: square to the face, level into an overhanging face, along the face, or vertical. */
  expected: z.enum(['square', 'level', 'alongFace', 'vertical']),
  /** Angle between what is expected and what is drawn, degrees, 0 to 90. */
  departureDeg: z.number(),
});

/** The phreatic line held against the rules that it obeys. Null in a section without one. */
export const phreaticReading = z.object({
  /** True while a line of it is still a first guess. */
  guessed: z.boolean(),
  /** Where an equipotential meets it: both heads, and head minus elevation, document length unit. */
  meetings: z.array(
    z.object({
      lineId: z.string(),
      at: place,
      head: z.number(),
      elevation: z.number(),
      departure: z.number(),
    }),
  ),
  entry: z.nullable(lineEnd),
  exit: z.nullable(lineEnd),
});
export type PhreaticReading = z.infer<typeof phreaticReading>;
export type PhreaticEnd = z.infer<typeof lineEnd>;
