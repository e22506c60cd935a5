import { DxfWriter, point2d, point3d, Units } from '@tarikjabiri/dxf';
import { unprocessable } from '#server/errors/app-error.ts';
import type { FlowNetDocument, UnitSystem } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import {
  type DrawnPlace,
  LINE_LAYERS,
  type NetDrawing,
  netDrawing,
  OTHER_LAYERS,
} from '#shared/text/net-dxf.ts';

/** Index colours, as CAD programs number them. */
const COLOURS: Record<string, number> = {
  [LINE_LAYERS.equipotential]: 1,
  [LINE_LAYERS.flowLine]: 5,
  [LINE_LAYERS.phreaticLine]: 4,
  [LINE_LAYERS.impervious]: 7,
  [LINE_LAYERS.soilBoundary]: 30,
  [LINE_LAYERS.ground]: 34,
  [LINE_LAYERS.submergedFace]: 150,
  [LINE_LAYERS.outflowFace]: 140,
  [LINE_LAYERS.drain]: 3,
  [OTHER_LAYERS.unfinished]: 8,
  [OTHER_LAYERS.knownPoints]: 6,
  [OTHER_LAYERS.readingPoints]: 2,
  [OTHER_LAYERS.profiles]: 94,
  [OTHER_LAYERS.soils]: 32,
};
/** Texts of a section whose greater side is 150 of them high or wide. */
const TEXT_PARTS = 150;
/** Some readers do not know exponents, which JavaScript writes below this; no drawing means so little. */
const LEAST_PLAIN = 1e-6;
const DXF_UNITS: Record<UnitSystem, Units> = { SI: Units.Meters, US: Units.Feet };

/**
 * The net as a DXF file in section coordinates.
 * @throws AppError net-unfinished while the section is not set out
 */
export function dxfText(document: FlowNetDocument, reading: NetReading): string {
  const drawing = netDrawing(document, reading);
  if (drawing === null)
    throw unprocessable(
      'net-unfinished',
      'The section is not set out',
      'A DXF file has offsets and elevations, and this section has none yet. Set it out by two known points, then download it again.',
    );
  return write(drawing, document.unitSystem);
}

function write(drawing: NetDrawing, unitSystem: UnitSystem): string {
  const dxf = new DxfWriter();
  dxf.setUnits(DXF_UNITS[unitSystem]);
  dxf.setVariable('$LASTSAVEDBY', { 1: 'Tracehead' });
  const extents = extentsOf(drawing);
  dxf.setVariable('$EXTMIN', { 10: plain(extents.low[0]), 20: plain(extents.low[1]), 30: 0 });
  dxf.setVariable('$EXTMAX', { 10: plain(extents.high[0]), 20: plain(extents.high[1]), 30: 0 });
  for (const [layer, colour] of Object.entries(COLOURS)) dxf.addLayer(layer, colour, 'Continuous');
  for (const { layer, points } of drawing.lines)
    dxf.addLWPolyline(
      points.map(([x, y]) => ({ point: point2d(plain(x), plain(y)) })),
      { layerName: layer },
    );
  for (const { layer, at } of drawing.marks)
    dxf.addPoint(plain(at[0]), plain(at[1]), 0, { layerName: layer });
  for (const { layer, at, text } of drawing.texts)
    dxf.addText(point3d(plain(at[0]), plain(at[1]), 0), extents.textHeight, oneLine(text), {
      layerName: layer,
    });
  return dxf.stringify();
}

function extentsOf({ lines, marks, texts }: NetDrawing) {
  let [left, low, right, high] = [Infinity, Infinity, -Infinity, -Infinity];
  const take = ([x, y]: DrawnPlace) => {
    [left, low, right, high] = [Math.min(left, x), Math.min(low, y), Math.max(right, x), Math.max(high, y)];
  };
  for (const { points } of lines) points.forEach(take);
  for (const { at } of [...marks, ...texts]) take(at);
  if (left > right) [left, low, right, high] = [0, 0, 1, 1];
  const textHeight = Math.max(right - left, high - low, LEAST_PLAIN) / TEXT_PARTS;
  return { low: [left, low], high: [right, high], textHeight: plain(textHeight) || LEAST_PLAIN } as const;
}

function plain(value: number): number {
  return Math.abs(value) < LEAST_PLAIN ? 0 : Number(value.toFixed(9));
}

/** A text is one line of the file, and some signs of it are commands: carets and doubled percent signs. */
function oneLine(text: string): string {
  return text
    .replaceAll(/\p{Cc}+/gu, ' ')
    .replaceAll('^', '^ ')
    .replaceAll('%%', '% %');
}
