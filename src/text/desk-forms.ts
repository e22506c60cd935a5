import type { LineKind, PermeabilityUnit } from '#shared/contract/document.ts';
import { inLanguage } from './language.ts';

/** Words of the forms beside the sheet. */
const enFormText = {
  close: 'Close',
  show: 'Show',
  remove: 'Remove',
  removeNamed: (name: string) => `Remove ${name}`,
  source: 'Source',
  sourceHint: 'Where the figures come from: drawing, report, operator.',
} as const;
export const formText = inLanguage({ en: enFormText });

const enSetOutText = {
  title: 'Known points',
  lead: 'Mark two points whose offset and elevation you know, as far apart as you can, or more of which you know one of the two. Further points check the fit.',
  place: 'Place known points',
  method: 'What is known',
  methods: {
    points: 'Offsets and elevations of points',
    distance: 'A length, as of a scale bar, and one elevation',
  },
  none: 'No known points yet.',
  name: 'Name',
  unnamed: 'known point',
  offset: (unit: string) => `Offset, ${unit}`,
  elevation: (unit: string) => `Elevation, ${unit}`,
  use: 'Use',
  uses: { fit: 'sets the scale', check: 'check only' },
  residual: (offset: string, elevation: string, unit: string) =>
    `off by ${offset} ${unit} in offset, ${elevation} ${unit} in elevation`,
  distance: (unit: string) => `Known length, ${unit}`,
  distanceHint: 'Give one of the points its elevation and one its offset.',
  level: 'What is level',
  levels: { line: 'the line through the two points', sheet: 'the edge of the sheet' },
  grow: 'Offsets grow towards',
  grows: { '': 'as the points say', left: 'the left', right: 'the right' },
  upstream: 'Upstream is at',
  upstreams: { '': 'not said yet', left: 'the left', right: 'the right' },
  up: 'Up on the section is',
  ups: {
    '': 'as the points say',
    0: 'up on the sheet',
    1: 'right on the sheet',
    2: 'down on the sheet',
    3: 'left on the sheet',
  },
  statedScale: 'Scale on the drawing, 1 :',
  statedScaleHint: 'To compare with the fit; empty when the drawing states none.',
  scales: 'Scales of the drawing',
  scalesNames: {
    equal: 'one scale for both directions',
    plottingExaggeration: 'stretched for plotting only',
    transformedSection: 'drawn transformed for its anisotropy',
    stretchedPaper: 'one scale, on paper that has stretched',
    perspective: 'one scale, photographed at a slant',
  },
  scalesHint: {
    equal: 'Say so when heights are drawn to another scale than lengths.',
    plottingExaggeration:
      'The net was drawn for the ground as it is, and the picture was stretched afterwards.',
    transformedSection:
      'The net was drawn in squares on the transformed section: kh/kv is the square of the ratio of the two scales.',
    stretchedPaper: 'Three known points or more, off one line; a fourth checks them.',
    perspective:
      'Four known points or more, no three on one line, best near the corners; a fifth checks them.',
  },
  result: 'Fit',
  scale: (scale: string) => `Scale ${scale}`,
  implied: (scale: string) => `which is 1 : ${scale} at the scan’s resolution`,
  noResolution: 'The scan states no resolution, so the scale on the drawing cannot be compared with the fit.',
  rotation: (degrees: string) => `Turned by ${degrees}° on the sheet`,
  residualAll: (figure: string) => `Residual of all points ${figure}`,
  residualNone: 'Residual: none, two points only. A third point shows how far the fit can be trusted.',
  labels: {
    method: 'chose how the section is set out',
    point: (name: string) => `typed known point ${name}`,
    removed: (name: string) => `removed known point ${name}`,
    setOut: 'changed how the section is set out',
  },
} as const;
export const setOutText = inLanguage({ en: enSetOutText });

const enWaterText = {
  title: 'Water levels',
  headwater: (unit: string) => `Headwater, ${unit}`,
  tailwater: (unit: string) => `Tailwater, ${unit}`,
  tailwaterHint: 'Empty when there is none: drains and faces of free outflow then carry their own heads.',
  takeFullSupply: (level: string) => `Take the full supply level, ${level}`,
  gammaW: (unit: string) => `Unit weight of water γw, ${unit}`,
  below: 'The headwater lies below the tailwater. Check both figures.',
  farAboveFullSupply: (most: string, level: string) =>
    `The headwater lies more than ${most} above the full supply level of the dam, ${level}. Check the figure.`,
  boundaries: 'Boundaries that carry a head',
  noBoundaries: 'None traced yet. Trace the face under the headwater and the outlet as boundaries.',
  trace: {
    headwaterFace: 'Trace the face under the headwater',
    tailwaterFace: 'Trace the bed under the tailwater',
    drain: 'Trace a drain',
    outflowFace: 'Trace a face of free outflow',
  },
  drainStates: { empty: 'empty: its own elevation', pressure: 'under pressure' },
  drainHead: (unit: string) => `Head in the drain, ${unit}`,
  carries: {
    headwater: 'carries the headwater level',
    tailwater: 'carries the tailwater level',
    own: 'water comes out freely: its own elevation',
    unsaid: 'not said whose level it carries',
  },
  doubtTitle: 'How well they are known, ±',
  doubtLead:
    'Half of the range that holds the true value with 95 %. Empty: not said. An error of the datum is common to levels and tips and cancels in the pressure.',
  doubts: {
    headwaterPlusMinus: (unit: string) => `Headwater ±, ${unit}`,
    tailwaterPlusMinus: (unit: string) => `Tailwater ±, ${unit}`,
    gammaWPlusMinus: (unit: string) => `γw ±, ${unit}`,
    datumPlusMinus: (unit: string) => `Datum ±, ${unit}`,
  },
  doubtTooSmall: 'A ± cannot be below zero.',
  labels: { levels: 'changed the water levels' },
} as const;
export const waterText = inLanguage({ en: enWaterText });

const enPermeabilityText = {
  title: 'Permeability',
  lead: 'In a section of one soil, alike in all directions, only the seepage depends on it. Where soils differ, or k across the bedding is another, heads and pressures depend on the ratios too.',
  k: 'Permeability k',
  kHint: 'Type 2e-7 for 2 × 10 to the power −7.',
  unit: 'Unit',
  units: {
    'm/s': 'm/s',
    'cm/s': 'cm/s',
    'm/day': 'm/day',
    'ft/s': 'ft/s',
    'ft/min': 'ft/min',
    'ft/day': 'ft/day',
    'ft/year': 'ft/year',
  } satisfies Record<PermeabilityUnit, string>,
  factor: 'Known within a factor of (×/÷)',
  factorHint: '1 or more; empty when it is not known.',
  factorTooSmall: 'The factor has to be 1 or more.',
  kv: (unit: string) => `Permeability across the bedding, kv, ${unit}`,
  kvHint: 'Empty: as k. Otherwise k above is the one along the bedding, kh.',
  dip: 'Dip of the bedding, degrees',
  dipHint: '0 when it is level; positive where it falls towards growing offsets.',
  dipFault: 'The dip lies between −90 and 90 degrees.',
  weightsTitle: 'Weights',
  weightsLead:
    'For heave, critical gradient and the pore pressure ratio. Gs and e stand in where the saturated weight is not known.',
  weights: {
    saturatedUnitWeight: (unit: string) => `Saturated γ, ${unit}`,
    moistUnitWeight: (unit: string) => `Moist γ, ${unit}`,
    specificGravity: () => 'Specific gravity of grains, Gs',
    voidRatio: () => 'Void ratio, e',
  },
  label: 'changed the permeability',
} as const;
export const permeabilityText = inLanguage({ en: enPermeabilityText });

const enSoilText = {
  listTitle: 'Soils of their own',
  listLead: 'Regions between traced soil boundaries whose soil is another than the one above.',
  add: 'Add a soil',
  freeName: (n: number) => `Soil ${n}`,
  unnamed: 'unnamed soil',
  placeCount: (count: number) =>
    count === 0 ? 'lies nowhere yet' : count === 1 ? 'in 1 region' : `marked at ${count} places`,
  name: 'Name',
  places: 'Where it lies',
  noPlaces: 'Nowhere yet. Mark one place inside each region of this soil.',
  placeName: (n: number) => `place ${n}`,
  placeAt: (n: number, x: string, y: string) => `Place ${n} at ${x}, ${y} px`,
  mark: 'Mark a place on the sheet',
  typed: 'Or type a place inside the region',
  offset: (unit: string) => `Offset, ${unit}`,
  elevation: (unit: string) => `Elevation, ${unit}`,
  addPlace: 'Add the place',
  remove: 'Remove this soil',
  labels: {
    added: (name: string) => `added the soil ${name}`,
    changed: (name: string) => `changed the soil ${name}`,
    removed: (name: string) => `removed the soil ${name}`,
    placed: (name: string) => `marked a place of the soil ${name}`,
    placeRemoved: (name: string) => `removed a place of the soil ${name}`,
  },
} as const;
export const soilText = inLanguage({ en: enSoilText });

const enCountText = {
  title: 'Count of drops and channels',
  drops: 'Drops counted on the drawing, Nd',
  dropsHint: 'From the headwater boundary, 0, to the outlet: 11 lines are 10 drops.',
  traced: (count: string) => `The traced lines make ${count} drops.`,
  tracedNone: 'The traced lines make no count yet.',
  takeTraced: (count: string) => `Take ${count}`,
  channels: 'Channels, Nf',
  channelsHint: 'Empty: counted from the traced flow lines along one equipotential.',
  cellRatio: 'Width of a cell across the flow over its length along it, B/L',
  cellRatioHint: '1 when the cells are squares.',
  countedIn: 'Channels are counted in',
  countedInHint: 'Squares in one soil are rectangles in the next, so the seepage is counted in one of them.',
  sectionSoil: 'the soil of the section',
  tracing: 'Accuracy of tracing, px',
  knownPoints: 'Accuracy of the known points, px',
  accuracyHint: 'Half of the interval that holds it with 95 %; it enters the ± of the readings.',
  accuracyTooSmall: 'It cannot be below zero.',
  label: 'changed the count',
} as const;
export const countText = inLanguage({ en: enCountText });

const enLineText = {
  properties: 'Properties',
  kind: 'Kind',
  kinds: {
    equipotential: 'Equipotential',
    flowLine: 'Flow line',
    phreaticLine: 'Phreatic line',
    impervious: 'Impervious boundary',
    soilBoundary: 'Soil boundary',
    ground: 'Ground',
    submergedFace: 'Face under water',
    outflowFace: 'Face of free outflow',
    drain: 'Drain',
  } satisfies Record<LineKind, string>,
  name: 'Name',
  unfinished: 'This line is not finished and is left out of the reading.',
  guessed: 'A first guess from the geometry. Drag its vertices to where the drawing or the readings put it.',
  takeAsTraced: 'Take as traced',
  counted: (drops: string, head: string) => `Counted: ${drops} drops down, head ${head}.`,
  placed: (drops: string) =>
    `By its order ${drops} drops down. It has no head while the count does not stand.`,
  uncounted: 'No count for this line yet.',
  typedDrops: 'Drops lost, typed',
  typedHead: (unit: string) => `Head printed on the drawing, ${unit}`,
  typedHint: 'Empty: counted by its order between the boundaries.',
  dropsTooSmall: 'Drops lost are counted from 0 at the headwater.',
  water: 'Carries the level of',
  waters: { '': 'not said yet', headwater: 'the headwater', tailwater: 'the tailwater' },
  drainState: 'State of the drain',
  remove: 'Remove this line',
  labels: {
    changed: (kind: string) => `changed a line: ${kind.toLowerCase()}`,
    removed: (kind: string) => `removed a line: ${kind.toLowerCase()}`,
  },
} as const;
export const lineText = inLanguage({ en: enLineText });

const enPointFormText = {
  title: 'Type a reading point',
  name: 'Name',
  nameHint: 'As the instrument is named.',
  offset: (unit: string) => `Offset, ${unit}`,
  elevation: (unit: string) => `Elevation, ${unit}`,
  add: 'Add the point',
  nameNeeded: 'Give it a name.',
} as const;
export const pointFormText = inLanguage({ en: enPointFormText });

const enFindingsText = {
  none: 'Nothing found. The checks made are of the set-out, the levels, the order of the lines and the count.',
  weights: { wrong: 'Wrong', missing: 'Missing', question: 'Question', note: 'Note' },
  show: 'Show on the sheet',
} as const;
export const findingsText = inLanguage({ en: enFindingsText });
