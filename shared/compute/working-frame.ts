import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import {
  composed,
  determinantOf,
  greatestStretch,
  IDENTITY,
  inverted,
  type LinearMap,
  mapped,
  nearlySame,
  scaledBy,
} from '#shared/compute/linear-map.ts';
import { type FlattenedMap, type SectionMap, sectionMapOfFit } from '#shared/compute/section-map.ts';
import { type CommonAnisotropy, NATURAL } from '#shared/compute/soils/anisotropy.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { FrameReading } from '#shared/contract/reading-frame.ts';

/**
 * The frame in which a net is judged and solved: the section as an isotropic one, so that its cells are squares and
 * distances can be compared. Working pixels are the sheet's pixels, without plotting exaggeration and shortened along
 * the bedding by √(kv/kh). Nowhere is a working pixel longer than the sheet's, so that an accuracy in pixels of the
 * sheet is never too small in working pixels.
 */
export type WorkingFrame = {
  /** `none`: the soils share no transformed section; then working pixels are those of the natural section. */
  readonly kind: CommonAnisotropy['kind'];
  /** kh/kv, and √(kv/kh) by which lengths along the bedding are multiplied. */
  readonly ratio: number;
  readonly factor: number;
  readonly dipDeg: number;
  /** Sheet pixels to working pixels. */
  readonly matrix: LinearMap;
  /** The same figures for the same working pixels. */
  readonly key: readonly number[];
  /** True when working pixels are the sheet's own. */
  readonly isSheet: boolean;
  /** Working pixels to the natural section and back: elevations, lengths and gradients are read through it. */
  readonly map: SectionMap;
  toWorking(place: Pair): SheetPx;
  toSheet(place: Pair): SheetPx;
};

/** Entries of a matrix that differ by less are one: rounding of a fit. */
const ROUNDING = 1e-9;

/**
 * The working frame of a section that is set out by `sheetMap` and whose soils share `anisotropy`.
 *
 * With S the linear part from sheet to section, Q its rows made unit vectors (the sheet's turn and handedness without
 * scales) and T = I − (1 − √(kv/kh))·e·eᵀ the transformation along the bedding e, the matrix is Qᵀ·T·S made so that its
 * greatest stretch is 1. It is the identity for an isotropic section at one scale, and for a section that is drawn
 * transformed: there the drawing itself is the transformed section, and nothing is transformed a second time. Source:
 * Samsioe (1931); Casagrande (1937); Harr (1962), ch. 1.
 */
export function workingFrameOf(sheetMap: SectionMap, anisotropy: CommonAnisotropy): WorkingFrame {
  const { flattened } = sheetMap;
  return flattened === undefined
    ? affineFrameOf(sheetMap, anisotropy)
    : flattenedFrame(affineFrameOf(flattened.map, anisotropy), flattened);
}

/** The frame of a picture that is flattened first: a photograph taken aslant is read as if it had been taken upright. */
function flattenedFrame(frame: WorkingFrame, { key, toFlat, toSheet }: FlattenedMap): WorkingFrame {
  return {
    ...frame,
    isSheet: false,
    key: [...frame.key, ...key],
    toWorking: ([x, y]) => frame.toWorking(toFlat(sheetPx(x, y))),
    toSheet: (place) => toSheet(frame.toSheet(place)),
  };
}

function affineFrameOf(sheetMap: SectionMap, anisotropy: CommonAnisotropy): WorkingFrame {
  const factor = Math.sqrt(1 / anisotropy.ratio);
  const squeezed = composed(squeezeAlongBedding(factor, anisotropy.dipDeg), sheetMap.linear);
  const turned = composed(backTurnOf(sheetMap.linear), squeezed);
  const matrix = scaledBy(turned, 1 / greatestStretch(turned));
  const isSheet = nearlySame(matrix, IDENTITY, ROUNDING);
  const { kind, ratio, dipDeg } = anisotropy;
  const common = { kind, ratio, factor, dipDeg, isSheet };
  if (isSheet) {
    return {
      ...common,
      matrix: IDENTITY,
      key: IDENTITY,
      map: sheetMap,
      toWorking: ([x, y]) => sheetPx(x, y),
      toSheet: ([x, y]) => sheetPx(x, y),
    };
  }
  const back = inverted(matrix);
  return {
    ...common,
    matrix,
    key: matrix,
    map: sectionMapOfFit(
      {
        linear: composed(sheetMap.linear, back),
        sheetOrigin: [0, 0],
        sectionOrigin: sheetMap.toSection(sheetPx(0, 0)),
      },
      sheetMap.elevationPerPx,
    ),
    toWorking: ([x, y]) => sheetPx(...mapped(matrix, x, y)),
    toSheet: ([x, y]) => sheetPx(...mapped(back, x, y)),
  };
}

/** Shortening along the bedding in section coordinates; the dip is positive where bedding falls towards growing offsets. */
function squeezeAlongBedding(factor: number, dipDeg: number): LinearMap {
  const dip = (dipDeg * Math.PI) / 180;
  const [ex, ez] = [Math.cos(dip), -Math.sin(dip)];
  const less = 1 - factor;
  return [1 - less * ex * ex, -less * ex * ez, -less * ex * ez, 1 - less * ez * ez];
}

/**
 * Transpose of the turn, or turn and mirror, that is nearest to the directions of offset and elevation on the sheet. It
 * is these directions themselves where they are square to one another, as they are but on paper that has stretched
 * askew. Source: the orthogonal factor of the polar decomposition, in closed form (Higham 1986, section 2).
 */
function backTurnOf([a, b, c, d]: LinearMap): LinearMap {
  const along = Math.hypot(a, b);
  const up = Math.hypot(c, d);
  const rows: LinearMap = [a / along, b / along, c / up, d / up];
  const side = Math.sign(determinantOf(rows));
  const [p, q] = [rows[0] + side * rows[3], rows[1] - side * rows[2]];
  const length = Math.hypot(p, q);
  return [p / length, (-side * q) / length, q / length, (side * p) / length];
}

/**
 * The document with everything traced, clicked or placed on the sheet in working pixels; the document itself where they
 * are the sheet's own. Known points stay: the section is set out on the sheet.
 */
export function tracesInWorkingFrame(document: FlowNetDocument, frame: WorkingFrame): FlowNetDocument {
  if (frame.isSheet) return document;
  const move = (place: SheetPoint): SheetPoint => {
    const [x, y] = frame.toWorking(place);
    return [x, y];
  };
  const entities = Object.entries(document.entities).map(
    ([id, entity]) => [id, { ...entity, value: movedOnce(entity.value, frame.key, move) }] as const,
  );
  return { ...document, entities: Object.fromEntries(entities) };
}

/** Kept as long as the value is: a line that was not touched is the same in the same frame. */
const kept = new WeakMap<
  DocumentEntity,
  { readonly key: readonly number[]; readonly moved: DocumentEntity }
>();

function movedOnce(
  value: DocumentEntity,
  key: readonly number[],
  move: (place: SheetPoint) => SheetPoint,
): DocumentEntity {
  const known = kept.get(value);
  if (known !== undefined && isSameKey(known.key, key)) return known.moved;
  const there = moved(value, move);
  kept.set(value, { key, moved: there });
  return there;
}

function isSameKey(a: readonly number[], b: readonly number[]): boolean {
  return a.length === b.length && a.every((entry, i) => entry === b[i]);
}

function moved(value: DocumentEntity, move: (place: SheetPoint) => SheetPoint): DocumentEntity {
  switch (value.kind) {
    case 'line':
      return { ...value, points: value.points.map(move) };
    case 'readingPoint':
      return value.place.on === 'sheet'
        ? { ...value, place: { on: 'sheet', at: move(value.place.at) } }
        : value;
    case 'profile':
      return value.place.on === 'sheet'
        ? { ...value, place: { on: 'sheet', points: value.place.points.map(move) } }
        : value;
    case 'soil':
      return { ...value, places: value.places.map(move) };
    default:
      return value;
  }
}

/** A finding made in the working frame, with its place on the sheet. */
export function findingOnSheet(finding: Finding, frame: WorkingFrame): Finding {
  if (frame.isSheet || finding.at === null) return finding;
  const [x, y] = frame.toSheet(finding.at);
  return { ...finding, at: [x, y] };
}

/** What is told of the frame, so that a display can show the natural section and the transformed one. */
export function frameReadingOf(frame: WorkingFrame, sheetMap: SectionMap): FrameReading {
  const { kind, ratio, factor, dipDeg } = frame;
  const natural = workingFrameOf(sheetMap, NATURAL);
  return { kind, ratio, factor, dipDeg, matrix: [...frame.matrix], naturalMatrix: [...natural.matrix] };
}
