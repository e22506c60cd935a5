import * as z from 'zod/mini';

/**
 * The section in which the net is judged. `natural`: the section itself; `transformed`: shortened along the bedding by
 * `factor` = √(kv/kh), so that cells are squares; `none`: the soils share no transformed section, and cells are not
 * judged. Null until the section is set out.
 */
export const frameReading = z.object({
  kind: z.enum(['natural', 'transformed', 'none']),
  /** kh/kv. */
  ratio: z.number(),
  factor: z.number(),
  /** Dip of the bedding in degrees, positive where it falls towards growing offsets. */
  dipDeg: z.number(),
  /** Sheet pixels to pixels of that section, row by row: x' = m0·x + m1·y, y' = m2·x + m3·y. */
  matrix: z.tuple([z.number(), z.number(), z.number(), z.number()]),
  /** Sheet pixels to pixels of the natural section without exaggeration, upright as the sheet is. */
  naturalMatrix: z.tuple([z.number(), z.number(), z.number(), z.number()]),
});
export type FrameReading = z.infer<typeof frameReading>;

/** The soils in which the net lies. */
export const soilsReading = z.object({
  /** Id of the soil in which the channels are counted; null while it is unknown. */
  counted: z.nullable(z.string()),
  /** B/L that the cells in each soil must show beside the stated one of the counted soil; null while a k is missing. */
  expectedRatios: z.array(
    z.object({ id: z.nullable(z.string()), label: z.string(), cellRatio: z.nullable(z.number()) }),
  ),
  /** Where lines pass from soil to soil: angles from the boundary's normal in the section that is judged, degrees. */
  crossings: z.array(
    z.object({
      lineId: z.string(),
      boundaryId: z.string(),
      /** Base-raster pixels. */
      at: z.tuple([z.number(), z.number()]),
      from: z.string(),
      to: z.string(),
      drawnDeg: z.number(),
      expectedDeg: z.number(),
      departureDeg: z.number(),
      /** What the hand's tremor makes of the departure (95 %). */
      toleranceDeg: z.number(),
    }),
  ),
});
export type SoilsReading = z.infer<typeof soilsReading>;
