import { placePoint, readPoint } from '#shared/compute/net/read-point.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { type SheetPoint, UNSAID } from '#shared/contract/document.ts';

/** The head at a place and the two lines between which it is read. */
export type HeadAtPlace = {
  /** Total head, document length unit above its datum. */
  readonly totalHead: number;
  readonly between: { readonly before: string; readonly after: string };
};

/**
 * The head at a place of the sheet (base-raster pixels), as a reading point there would have it. Null where a point
 * would have no figure: outside the net, above the phreatic line, in a body, and while the net withholds its figures.
 */
export function headAtPlace(place: SheetPoint, { frame, ground, finished }: PreparedNet): HeadAtPlace | null {
  if (!finished) return null;
  const [x, y] = frame.toWorking(place);
  const point = placePoint(
    '',
    { kind: 'readingPoint', ...UNSAID.readingPoint, name: '', place: { on: 'sheet', at: [x, y] }, order: 0 },
    frame.map,
  );
  const { status, totalHead, between } = readPoint(point, ground);
  if (status !== 'read' || totalHead === null || between === null) return null;
  return { totalHead, between: { before: between.before, after: between.after } };
}
