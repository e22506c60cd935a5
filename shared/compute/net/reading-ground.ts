import type { NetDoubt } from '#shared/compute/doubt/point-doubt.ts';
import type { FieldOfStrip } from '#shared/compute/field/strip-fields.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { Ring } from '#shared/compute/geometry/polygon.ts';
import type { Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { BoundaryEdge } from '#shared/compute/net/boundary-edges.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { Tensor } from '#shared/compute/soils/soil-list.ts';

/** Everything a place is read against; shapes and `slack` in working pixels. */
export type ReadingGround = {
  readonly map: SectionMap;
  readonly strips: readonly Strip[];
  readonly heads: NetHeads;
  readonly walls: readonly Polyline[];
  /** Where potential boundaries end. */
  readonly edges: readonly BoundaryEdge[];
  /** Closed impervious outlines inside which nothing flows. */
  readonly bodies: readonly Ring[];
  readonly phreaticLines: readonly Polyline[];
  /** Faces and ground that bound the section from above. */
  readonly faces: readonly Polyline[];
  /** Boundaries along which the head is the elevation. */
  readonly freeFaces: readonly Polyline[];
  /** Lines between soils, along which the field may bend. */
  readonly soilBoundaries: readonly Polyline[];
  /** Permeability in working pixels up to one factor; null where it is one for all places and directions. */
  readonly tensorAt: ((x: number, y: number) => Tensor) | null;
  /** The head between the two lines of a strip, solved the first time it is asked for. */
  readonly fieldOf: FieldOfStrip;
  readonly slack: number;
  readonly tracingAccuracyPx: number;
  readonly gammaW: number;
  /** Unit of a head or elevation with its datum, for words: "m LD". */
  readonly levelUnit: string;
  /** What all readings have in common as to their doubt. */
  readonly doubt: NetDoubt;
  /** Working pixels to pixels of the sheet. */
  readonly toSheet: (place: SheetPx) => Pair;
  readonly unequal: boolean;
  /** An equipotential seems to be missing, so that the count is wrong for all the net. */
  readonly lacksLine: boolean;
};
