import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { projectRoot } from '#tests/support/real-server.ts';

/**
 * A place where two printed lines cross, about where a person clicks it, base-raster pixels of the plate; with the
 * station (ft) or the elevation (ft) that is printed at it, where it is.
 */
export type Pick = {
  readonly name: string;
  readonly at: readonly [x: number, y: number];
  readonly station?: number;
  readonly elevation?: number;
};

export type Plate = {
  readonly file: string;
  readonly exaggeration: number;
  readonly fit: readonly Pick[];
  readonly predicted: readonly Pick[];
  /** What the printing allows; see the plate. */
  readonly allows: { readonly stationFt: number; readonly elevationFt: number };
  /** By how many pixels a figure may differ when the same sheet is sampled otherwise. */
  readonly samePx: number;
};

const station = (label: number, at: readonly [number, number]): Pick => ({
  name: `station ${label} at y ${at[1]}`,
  at,
  station: 100 * label,
});
const elevation = (label: number, at: readonly [number, number]): Pick => ({
  name: `elevation ${label} at x ${at[0]}`,
  at,
  elevation: label,
});

/**
 * North River Division, plan and profile: 2.0 ft to the pixel along, 0.51 upwards. The sheet was printed or laid on the
 * glass askew: its base line, elevation 0, bows by 11 px between the sides and the middle, which are 5.7 ft, and the
 * station lines stand 498 to 508 px apart where they should stand 502 px, ± 10 ft. Lines are 2 to 4 px wide. A straight
 * fit cannot do better than half the bow and the unevenness of the stations: 5 ft, half a space of the printed ruling,
 * and 15 ft, a thousandth of the profile's length. Stations fall to the right. The label 327 at the left border is
 * rounded to the border: it is not used, nor are crossings in the hatched ground, where a line and the hatching about
 * it cannot be told apart to a pixel.
 */
const NORTH_RIVER: Plate = {
  file: 'northriver-plate7.png',
  exaggeration: 3.93,
  fit: [
    elevation(0, [374, 2465]),
    elevation(500, [376, 1476]),
    station(310, [1219, 2465]),
    station(310, [1219, 1478]),
    elevation(0, [3228, 2473]),
    elevation(400, [3730, 1688]),
    elevation(0, [4737, 2475]),
    station(190, [7242, 2471]),
    station(190, [7242, 1681]),
    elevation(0, [7682, 2471]),
    elevation(400, [7682, 1681]),
  ],
  predicted: [
    station(320, [716, 2465]),
    station(300, [1722, 2468]),
    station(290, [2224, 2469]),
    station(280, [2722, 2471]),
    station(270, [3228, 2473]),
    station(250, [4230, 2475]),
    station(240, [4737, 2475]),
    station(240, [4737, 1688]),
    station(210, [6243, 2471]),
    station(200, [6745, 2472]),
    station(181.2, [7682, 2471]),
    elevation(0, [1219, 2466]),
    elevation(100, [374, 2274]),
    elevation(200, [375, 2072]),
    elevation(400, [376, 1677]),
    elevation(200, [1219, 2074]),
    elevation(100, [2224, 2280]),
    elevation(500, [2226, 1484]),
    elevation(200, [2724, 2080]),
    elevation(500, [2726, 1485]),
    elevation(100, [3227, 2282]),
    elevation(400, [4230, 1688]),
    elevation(0, [6745, 2472]),
    elevation(200, [7243, 2077]),
    elevation(100, [7682, 2278]),
    elevation(200, [7682, 2077]),
    elevation(300, [7682, 1878]),
  ],
  allows: { stationFt: 15, elevationFt: 5 },
  samePx: 1.5,
};

/**
 * East River Division, profile of line A: 1.6 ft to the pixel along, 0.32 upwards. Lines are 2 to 4 px wide, and the
 * base line, elevation 200, wavers by 3 px, about 1 ft; printed lines of 10 ft stand up to 1 px, 0.35 ft, off even
 * spacing. Station lines stand 310 to 314 px apart, and lean by up to 2 px: 4 px from even spacing at the ends. That makes
 * 1.5 ft and, along, 8 ft, a thousandth of the profile's length.
 */
const EAST_RIVER: Plate = {
  file: 'eastriver-plate14.png',
  exaggeration: 4.98,
  fit: [
    elevation(200, [47, 1197]),
    elevation(350, [47, 728]),
    station(175, [484, 1197]),
    station(175, [484, 728]),
    station(115, [4250, 1194]),
    station(115, [4250, 726]),
    elevation(200, [4663, 1195]),
    elevation(350, [4561, 726]),
  ],
  predicted: [
    station(180, [173, 1197]),
    station(170, [797, 1197]),
    station(165, [1111, 728]),
    station(160, [1425, 1197]),
    station(155, [1740, 1196]),
    station(145, [2365, 1196]),
    station(140, [2682, 1195]),
    station(130, [3308, 1194]),
    station(125, [3622, 1194]),
    station(120, [3934, 1194]),
    station(110, [4561, 726]),
    elevation(340, [484, 759]),
    elevation(340, [4250, 757]),
    elevation(320, [4250, 820]),
    elevation(320, [4561, 820]),
    elevation(250, [47, 1041]),
    elevation(350, [1111, 728]),
    elevation(350, [3622, 726]),
    elevation(200, [2365, 1196]),
  ],
  allows: { stationFt: 8, elevationFt: 1.5 },
  samePx: 1.5,
};

export const PLATES: readonly Plate[] = [NORTH_RIVER, EAST_RIVER];

/** The plate's file; null, said plainly, where the shared inputs are absent. */
export function plateBytes(file: string): Buffer | null {
  const place = path.resolve(projectRoot, '..', 'shared', 'inputs', 'drawings', file);
  if (existsSync(place)) return readFileSync(place);
  console.info(`The shared inputs are absent: ${file} cannot be put to scale here.`);
  return null;
}

type Turned = {
  readonly bytes: Buffer;
  readonly rad: number;
  readonly from: readonly [number, number];
  readonly to: readonly [number, number];
};

/** The sheet turned clockwise on white paper, as a scan laid askew. */
export async function turnedSheet(bytes: Buffer, deg: number): Promise<Turned> {
  const { width, height } = await sharp(bytes).metadata();
  const { data, info } = await sharp(bytes)
    .greyscale()
    .rotate(deg, { background: '#fff' })
    .png()
    .toBuffer({ resolveWithObject: true });
  return {
    bytes: data,
    rad: (deg * Math.PI) / 180,
    from: [width! / 2, height! / 2],
    to: [info.width / 2, info.height / 2],
  };
}

/** About where a person clicks the same crossing on the turned sheet. */
export function turnedPick(pick: Pick, { rad, from, to }: Turned): Pick {
  const [u, v] = [pick.at[0] - from[0], pick.at[1] - from[1]];
  const [cos, sin] = [Math.cos(rad), Math.sin(rad)];
  return { ...pick, at: [to[0] + u * cos - v * sin, to[1] + u * sin + v * cos] };
}
