import * as z from 'zod/mini';
import { MAX_FIGURE, MAX_PERMEABILITY, MAX_SHEET_PX } from './limits.ts';
import { type UnitSystem, unitSystem } from './unit-system.ts';

/**
 * The saved flow net: what the desk edits, the server keeps and the computation reads.
 *
 * A document is a map of entities keyed by id, each with a version of its own, so that two people can work on
 * different lines at once. Nothing derived is stored here: parameters of the calibration, heads by order and
 * results are recomputed from these entries. Traces are in pixels of the sheet's base raster (origin at the
 * top-left corner, x to the right, y down, pixel centres at + 0.5); elevations, never depths, are stored.
 */
export const FLOW_NET_FORMAT = 'tracehead/flow-net';
export const FLOW_NET_VERSION = 3;

export const entityId = z.uuid();
const sheetPx = z.number().check(z.gte(-MAX_SHEET_PX), z.lte(MAX_SHEET_PX));
/** A place on the sheet in base-raster pixels, `[x, y]`, y down. */
export const sheetPoint = z.tuple([sheetPx, sheetPx]);
export type SheetPoint = z.infer<typeof sheetPoint>;

export { type UnitSystem, unitSystem };

/** An offset, a length, an elevation or a head in the document's length unit, or a count of drops. */
const measure = z.number().check(z.gte(-MAX_FIGURE), z.lte(MAX_FIGURE));
const positive = z.number().check(z.positive(), z.lte(MAX_FIGURE));
const label = z.string().check(z.maxLength(120));
const sourceText = z.string().check(z.maxLength(500));
/** Half of the interval that holds a value with 95 %, in the value's unit; null while nobody has said it. */
const plusMinus = z._default(z.nullable(z.number().check(z.nonnegative(), z.lte(MAX_FIGURE))), null);
/** Offset and elevation in the document's length unit. */
const sectionPoint = z.tuple([measure, measure]);

/** A point whose place in the section is known: `fit` points set the scale, `check` points only show a residual. */
export const knownPoint = z.object({
  kind: z.literal('knownPoint'),
  name: label,
  at: sheetPoint,
  /** Offset in the section in the document's length unit; null while it is not known. */
  offset: z.nullable(measure),
  /** Elevation above the document's datum in its length unit; null while it is not known. One of the two is enough. */
  elevation: z.nullable(measure),
  use: z.enum(['fit', 'check']),
});

/** How the section is set out. One for each section, shared by all its nets. */
export const setOut = z.object({
  kind: z.literal('setOut'),
  /**
   * `points`: offsets and elevations of known points. `distance`: a length between the first two known points of use
   * `fit`, as of a scale bar, one elevation and one offset.
   */
  method: z.enum(['points', 'distance']),
  /**
   * The known length, document length unit. For `points`: of a scale bar between the first two known points that give
   * neither offset nor elevation, to check the fit.
   */
  distance: z.nullable(measure),
  /**
   * What is level. `sheet`: the sheet's own horizontal. `line`: for `distance` the line through its two points, for
   * `points` what the points say.
   */
  level: z.enum(['line', 'sheet']),
  /** Which way offsets grow on the sheet as displayed; null = let the points decide. */
  offsetsGrow: z.nullable(z.enum(['left', 'right'])),
  /** Which side of the sheet is upstream, as displayed; null until said. */
  upstream: z.nullable(z.enum(['left', 'right'])),
  /** Which way is up on the sheet when the points leave it open: quarter turns clockwise of the sheet's own up. */
  upQuarterTurns: z.nullable(z.union([z.literal(0), z.literal(1), z.literal(2), z.literal(3)])),
  /** Denominator n of the scale 1:n stated on the drawing, to warn when the fit disagrees; null when none is stated. */
  statedScale: z.nullable(measure),
  /**
   * What unequal horizontal and vertical scales of the drawing mean. `equal`: one scale. `plottingExaggeration`: the
   * picture is stretched, the ground is not. `transformedSection`: the section is drawn transformed for its
   * anisotropy, so that kh/kv = (sx/sz)², s in length per pixel. `stretchedPaper`: drawn at one scale, but the paper has
   * stretched unevenly or askew. `perspective`: drawn at one scale and photographed aslant.
   */
  scales: z._default(
    z.enum(['equal', 'plottingExaggeration', 'transformedSection', 'stretchedPaper', 'perspective']),
    'equal',
  ),
});

export const lineKind = z.enum([
  'equipotential',
  'flowLine',
  'phreaticLine',
  'impervious',
  'soilBoundary',
  'ground',
  'submergedFace',
  'outflowFace',
  'drain',
]);
export type LineKind = z.infer<typeof lineKind>;

/**
 * A traced polyline. Which fields matter depends on `line`:
 * - `equipotential`: `drops` (typed count of drops lost from the headwater) or `head` (typed elevation of its
 *   head) override the count by order; both null = counted.
 * - `submergedFace`: `water` says whose level it carries; a typed `head` is the level of a water of its own.
 * - `drain`: `head` null = empty, carries its own elevation; a number = under pressure at that head.
 * - `outflowFace`: water comes out freely, the head is the elevation along it.
 */
export const tracedLine = z.object({
  kind: z.literal('line'),
  line: lineKind,
  name: label,
  points: z.array(sheetPoint).check(z.maxLength(5000)),
  /** False while the line is still being drawn: kept, shown, left out of every reading. */
  finished: z.boolean(),
  water: z.nullable(z.enum(['headwater', 'tailwater'])),
  head: z.nullable(measure),
  drops: z.nullable(measure),
  /** How it came about: traced by hand, a first guess that the engineer has still to adjust, or taken from the computed net. */
  origin: z._default(z.enum(['traced', 'guessed', 'adopted']), 'traced'),
});
export type TracedLine = z.infer<typeof tracedLine>;

/** Where a head is wanted. A clicked point is kept on the sheet, a typed one in section coordinates. */
export const readingPoint = z.object({
  kind: z.literal('readingPoint'),
  name: label,
  place: z.discriminatedUnion('on', [
    z.object({ on: z.literal('sheet'), at: sheetPoint }),
    z.object({ on: z.literal('section'), offset: measure, elevation: measure }),
  ]),
  /** Order in the schedule, ascending. */
  order: z.number(),
  /** Accuracy of a typed elevation, document length unit. */
  elevationPlusMinus: plusMinus,
  /** What an instrument showed there, to be set beside the net: a head in the length unit, or a pressure in kPa or lb/ft². */
  measured: z._default(
    z.nullable(
      z.object({
        value: measure,
        as: z.enum(['totalHead', 'pressureHead', 'porePressure']),
        plusMinus,
        /** The day of the reading, as written. */
        on: z.string().check(z.maxLength(40)),
      }),
    ),
    null,
  ),
});

/** A line, a list of places or a grid along which heads and pressures are read one after another. */
export const profile = z.object({
  kind: z.literal('profile'),
  name: label,
  use: z.enum(['base', 'slipSurface', 'filterBoundary', 'borehole', 'other']),
  place: z.discriminatedUnion('on', [
    z.object({ on: z.literal('sheet'), points: z.array(sheetPoint).check(z.maxLength(5000)) }),
    /** Typed or pasted places, read as they are when `spacing` is null. */
    z.object({ on: z.literal('section'), points: z.array(sectionPoint).check(z.maxLength(5000)) }),
    /** An upright rectangle of the section by two opposite corners. */
    z.object({ on: z.literal('grid'), corners: z.tuple([sectionPoint, sectionPoint]) }),
  ]),
  /** Distance between samples, document length unit; null = the points themselves (a grid: a twentieth of its longer side). */
  spacing: z.nullable(positive),
  finished: z.boolean(),
  /** Order in the list of profiles, ascending. */
  order: z.number(),
});

export const permeabilityUnit = z.enum(['m/s', 'cm/s', 'm/day', 'ft/s', 'ft/min', 'ft/day', 'ft/year']);
export type PermeabilityUnit = z.infer<typeof permeabilityUnit>;

/** Water levels of the load case, elevations in the document's length unit. One for each net. */
export const waterLevels = z.object({
  kind: z.literal('waterLevels'),
  headwater: z.nullable(measure),
  /** null: no tailwater; the outlets are drains or faces of free outflow. */
  tailwater: z.nullable(measure),
  /** Unit weight of water, kN/m³ (SI) or lb/ft³ (US). */
  gammaW: positive,
  source: sourceText,
  headwaterPlusMinus: plusMinus,
  tailwaterPlusMinus: plusMinus,
  gammaWPlusMinus: plusMinus,
  /** An error of the datum, common to levels and typed elevations: it cancels in h − z. */
  datumPlusMinus: plusMinus,
});

const permeabilityFigure = z.nullable(z.number().check(z.positive(), z.lte(MAX_PERMEABILITY)));
const soilProperty = z._default(z.nullable(positive), null);
const soilProperties = {
  /** Permeability along the bedding, kh, and wherever it is one for all directions. */
  k: permeabilityFigure,
  /** Permeability across the bedding, kv; null = as along it. */
  kv: z._default(permeabilityFigure, null),
  /** Dip of the bedding in degrees, positive where it falls towards growing offsets. */
  dipDeg: z._default(z.number().check(z.gte(-90), z.lte(90)), 0),
  unit: permeabilityUnit,
  /** Factor (×/÷) within which k is known. */
  factor: z.nullable(z.number().check(z.minimum(1), z.lte(MAX_FIGURE))),
  /** Unit weights, kN/m³ (SI) or lb/ft³ (US): saturated, and moist above the phreatic line. */
  saturatedUnitWeight: soilProperty,
  moistUnitWeight: soilProperty,
  /** Specific gravity of the grains Gs and void ratio e, from which the saturated weight follows when it is not given. */
  specificGravity: soilProperty,
  voidRatio: soilProperty,
  source: sourceText,
};

/** The soil of the section, or of all of it that no `soil` claims. One for each net. */
export const permeability = z.object({ kind: z.literal('permeability'), ...soilProperties });

/** A soil of its own in the regions, parted by traced soil boundaries, in which its places lie. */
export const soil = z.object({
  kind: z.literal('soil'),
  name: label,
  /** One place inside each region of this soil. */
  places: z.array(sheetPoint).check(z.maxLength(50)),
  ...soilProperties,
});

/** What the engineer counted on the drawing. One for each net. */
export const netCount = z.object({
  kind: z.literal('netCount'),
  /** Stated number of drops Nd from the headwater to the outlet, of several the lowest; null until stated. */
  drops: z.nullable(positive),
  /** Stated number of channels Nf; null = counted from the traced flow lines. */
  channels: z.nullable(positive),
  /** Width across the flow over length along it of the cells, B/L; 1 for squares. */
  cellRatio: positive,
  /** The soil in which the channels are counted where the section is layered; null = the soil of the section. */
  countedIn: z._default(z.nullable(entityId), null),
  /** Tracing accuracy on the sheet in pixels, for the ± of the readings. */
  tracingAccuracyPx: z.number().check(z.nonnegative(), z.lte(MAX_FIGURE)),
  /** Accuracy of the known points on the drawing in pixels, for the ± of the readings. */
  knownPointAccuracyPx: z.number().check(z.nonnegative(), z.lte(MAX_FIGURE)),
});

/** What a new entity leaves unsaid. */
export const UNSAID = {
  readingPoint: { elevationPlusMinus: null, measured: null },
  waterLevels: {
    headwaterPlusMinus: null,
    tailwaterPlusMinus: null,
    gammaWPlusMinus: null,
    datumPlusMinus: null,
  },
  soil: {
    kv: null,
    dipDeg: 0,
    saturatedUnitWeight: null,
    moistUnitWeight: null,
    specificGravity: null,
    voidRatio: null,
  },
} as const;

export const documentEntity = z.discriminatedUnion('kind', [
  knownPoint,
  setOut,
  tracedLine,
  readingPoint,
  profile,
  waterLevels,
  permeability,
  soil,
  netCount,
]);
export type DocumentEntity = z.infer<typeof documentEntity>;
export type EntityKind = DocumentEntity['kind'];
export type EntityOf<K extends EntityKind> = Extract<DocumentEntity, { kind: K }>;

/** Kinds that belong to the section and are shared by all its nets; the others belong to one net. */
export const SECTION_KINDS: readonly EntityKind[] = ['knownPoint', 'setOut'];
/** Kinds of which a document holds exactly one, made by the server together with the net or section. */
export const SINGLE_KINDS: readonly EntityKind[] = ['setOut', 'waterLevels', 'permeability', 'netCount'];

export const versionedEntity = z.object({
  id: entityId,
  version: z.number().check(z.int(), z.positive()),
  value: documentEntity,
});
export type VersionedEntity = z.infer<typeof versionedEntity>;

export const flowNetDocument = z.object({
  format: z.literal(FLOW_NET_FORMAT),
  version: z.literal(FLOW_NET_VERSION),
  id: entityId,
  name: z.string().check(z.maxLength(200)),
  unitSystem,
  datum: z.string().check(z.maxLength(80)),
  sheet: z.object({
    widthPx: z.number().check(z.positive()),
    heightPx: z.number().check(z.positive()),
    /** Resolution of the base raster, to compare the fit with the stated scale; null when the file does not say. */
    dpi: z.nullable(z.number().check(z.positive())),
  }),
  entities: z.record(entityId, versionedEntity),
});
export type FlowNetDocument = z.infer<typeof flowNetDocument>;

/** All entities of one kind with their ids, in id order (ids are UUIDv7, so in order of making). */
export function entitiesOf<K extends EntityKind>(
  document: FlowNetDocument,
  kind: K,
): Array<{ id: string; version: number; value: EntityOf<K> }> {
  return Object.values(document.entities)
    .filter((entity): entity is VersionedEntity & { value: EntityOf<K> } => entity.value.kind === kind)
    .sort((a, b) => (a.id < b.id ? -1 : 1));
}

/** The one entity of a single kind; null when the document lacks it. */
export function singleOf<K extends EntityKind>(
  document: FlowNetDocument,
  kind: K,
): { id: string; version: number; value: EntityOf<K> } | null {
  return entitiesOf(document, kind)[0] ?? null;
}
