import sharp from 'sharp';
import { type FlatApron, flatApronHead, flatApronPoint } from '#shared/compute/exact/flat-apron.ts';
import type { SheetPoint } from '#shared/contract/document.ts';

/**
 * A sheet with a weir's floor on level ground and its flow net of six drops and three channels, exact after
 * Harr (1962): large enough on a screen to be traced by clicks without zooming.
 */
const PX_PER_M = 20;
const GROUND_PX: SheetPoint = [700, 250];
export const SHEET = { widthPx: 1400, heightPx: 900 };
export const floor: FlatApron = { b: 20, H: 6 };
export const DROPS = 6;
export const CHANNELS = 3;
export const GROUND = 96;
export const HEADWATER = 104;
export const TAILWATER = 98;

/** Sheet pixel of a place: x from the floor's middle, downstream positive; elevation. */
export const place = (x: number, elevation: number): SheetPoint => [
  GROUND_PX[0] + x * PX_PER_M,
  GROUND_PX[1] + (GROUND - elevation) * PX_PER_M,
];

/** The other way: offset and elevation of a pixel. */
export const sectionOf = ([x, y]: SheetPoint): [number, number] => [
  (x - GROUND_PX[0]) / PX_PER_M,
  GROUND - (y - GROUND_PX[1]) / PX_PER_M,
];

const node = (drop: number, channel: number): SheetPoint => {
  const [x, depth] = flatApronPoint(floor, floor.H * (1 - drop / DROPS), (channel * Math.PI) / DROPS);
  return place(x, GROUND - depth);
};

const steps = (count: number) => Array.from({ length: count + 1 }, (_, index) => index / count);

export const equipotential = (drop: number): SheetPoint[] =>
  steps(8).map((part) => node(drop, CHANNELS * part));
export const flowLine = (channel: number): SheetPoint[] =>
  steps(14).map((part) => node(DROPS * part, channel));
const reach = (floor.b / 2) * Math.cosh((CHANNELS * Math.PI) / DROPS);
export const upstreamBed = [place(-reach, GROUND), place(-10, GROUND)];
export const downstreamBed = [place(10, GROUND), place(reach, GROUND)];
export const underside = [place(-10, GROUND), place(10, GROUND)];

/** Pore pressure in kPa from the closed form, u = γw(h − z) with γw = 9.81 kN/m³. */
export const exactPressure = (x: number, elevation: number): number =>
  9.81 * (TAILWATER + flatApronHead(floor, x, GROUND - elevation) - elevation);

const pathOf = (points: SheetPoint[]) =>
  `<path d="M${points.map(([x, y]) => `${x.toFixed(1)} ${y.toFixed(1)}`).join('L')}"/>`;

/** The drawing as a PNG at 150 dpi. */
export function apronScan(): Promise<Buffer> {
  const lines = [
    [place(-34, GROUND), place(34, GROUND)],
    ...[1, 2, 3, 4, 5].map(equipotential),
    ...[1, 2, 3].map(flowLine),
  ];
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${SHEET.widthPx}" height="${SHEET.heightPx}">
    <rect width="100%" height="100%" fill="#efe9d8"/><g fill="none" stroke="#3b352b" stroke-width="2">
    ${lines.map(pathOf).join('')}</g></svg>`;
  return sharp(Buffer.from(svg)).withMetadata({ density: 150 }).png().toBuffer();
}
