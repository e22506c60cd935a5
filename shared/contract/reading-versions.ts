import type { NetReading, PointReading } from './reading.ts';

type Quantities = NetReading['quantities'];

/**
 * What readings of the first engine hold. Whatever a reading holds besides was added later and needs its value below,
 * which says that it was not worked out: the compiler asks for it.
 */
type FirstReading = 'state' | 'findings' | 'setOut' | 'lines' | 'points' | 'quantities';
type FirstSetOut =
  | 'state'
  | 'unitsPerPx'
  | 'rotationDeg'
  | 'offsetsGrowLeft'
  | 'residual'
  | 'residuals'
  | 'impliedScale';
type FirstLine = 'id' | 'drops' | 'head' | 'source';
type FirstPoint =
  | 'id'
  | 'name'
  | 'order'
  | 'sheetAt'
  | 'offset'
  | 'elevation'
  | 'status'
  | 'reason'
  | 'dropsLost'
  | 'between'
  | 'totalHead'
  | 'totalHeadPlusMinus'
  | 'pressureHead'
  | 'porePressure'
  | 'porePressurePlusMinus'
  | 'explanation'
  | 'findings';
type FirstQuantities =
  | 'drops'
  | 'tracedDrops'
  | 'channels'
  | 'channelsComplete'
  | 'headLost'
  | 'headPerDrop'
  | 'unequalIntervals'
  | 'seepage'
  | 'seepageFigures'
  | 'gammaW';

const ADDED_TO_READING: Omit<NetReading, FirstReading> = {
  frame: null,
  soils: null,
  phreatic: null,
  netCheck: null,
  doubt: { headLost: null, headPerDrop: null, seepageFactor: null, seepageShares: [] },
  measured: [],
  profiles: [],
  exits: [],
  stability: { heave: [], creep: null },
};
const ADDED_TO_SET_OUT: Omit<NetReading['setOut'], FirstSetOut> = {
  unitsPerPxUp: null,
  exaggeration: null,
  placeDoubt: null,
};
const ADDED_TO_LINE: Omit<NetReading['lines'][number], FirstLine> = {};
const ADDED_TO_POINT: Omit<PointReading, FirstPoint> = {
  byHand: null,
  byField: null,
  pressureHeadPlusMinus: null,
  doubt: null,
};
const ADDED_TO_QUANTITIES: Omit<Quantities, FirstQuantities> = { shapeFactor: null, outlets: [] };

/**
 * Completes a reading that was frozen by an earlier engine, as parsed JSON, so that it can be shown: what that engine
 * did not work out stands as not worked out. No figure is changed and none is worked out anew. Anything that is no
 * reading comes back as it is, for the schema to refuse.
 */
export function completeReading(json: unknown): unknown {
  if (!isRecord(json)) return json;
  return {
    ...ADDED_TO_READING,
    ...json,
    setOut: completed(json.setOut, ADDED_TO_SET_OUT),
    lines: completedEach(json.lines, ADDED_TO_LINE),
    points: completedEach(json.points, ADDED_TO_POINT),
    quantities: completed(json.quantities, ADDED_TO_QUANTITIES),
  };
}

const isRecord = (json: unknown): json is Record<string, unknown> =>
  typeof json === 'object' && json !== null && !Array.isArray(json);

const completed = (json: unknown, added: object): unknown => (isRecord(json) ? { ...added, ...json } : json);

const completedEach = (json: unknown, added: object): unknown =>
  Array.isArray(json) ? json.map((each) => completed(each, added)) : json;
