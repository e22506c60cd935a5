import { coverageFactor } from '#shared/compute/doubt/coverage.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import {
  entitiesOf,
  type FlowNetDocument,
  singleOf,
  type VersionedEntity,
} from '#shared/contract/document.ts';

/** What one coordinate of one known point does to the place of anything on the sheet. */
export type SetOutCause = {
  readonly cause: string;
  /** Error of a place's section coordinates when the known point is off by its half-width, length units. */
  shift(at: SheetPx): readonly [offset: number, elevation: number];
};

/** Step of the differences, pixels: far above rounding, far below what bends a fit. */
const STEP_PX = 0.5;

/**
 * How the marks of the known points carry over to the places of the section: for each coordinate of each known point
 * the shift that its half-width (95 %) gives to any place. Found by moving the mark half a pixel either way and setting
 * the section out again, which holds for every way of setting out; linear to first order (JCGM 100, 2008, 5.1.3 note
 * 2). The half-width is the stated accuracy of the known points or what the residuals show, whichever is greater. Empty
 * while the section is not set out.
 */
export function setOutCauses(document: FlowNetDocument, setOut: SetOut): SetOutCause[] {
  const { map } = setOut;
  if (map === null) return [];
  const half = knownPointHalfWidth(document, setOut, map);
  return entitiesOf(document, 'knownPoint')
    .filter(({ value }) => value.use === 'fit')
    .flatMap(({ id }) =>
      [0, 1].map((axis): SetOutCause | null => {
        const ahead = movedMap(document, id, axis, STEP_PX);
        const back = movedMap(document, id, axis, -STEP_PX);
        if (ahead === null || back === null) return null;
        const scale = half / (2 * STEP_PX);
        return {
          cause: `known ${id} ${axis}`,
          shift: (at) => {
            const [x1, z1] = ahead.toSection(at);
            const [x0, z0] = back.toSection(at);
            return [(x1 - x0) * scale, (z1 - z0) * scale];
          },
        };
      }),
    )
    .filter((cause) => cause !== null);
}

/**
 * Half-width (95 %) of one coordinate of a known point's mark in pixels: as stated, or from the residuals of a fit that
 * has more points than it needs, by Student's t for the degrees of freedom left (JCGM 100, 2008, 4.3.2 and G.3).
 */
export function knownPointHalfWidth(document: FlowNetDocument, setOut: SetOut, map: SectionMap): number {
  const stated = singleInputs(document).count.knownPointAccuracyPx;
  const { residuals } = setOut.reading;
  const along = setOut.reading.unitsPerPx ?? map.unitsPerPx;
  const up = setOut.reading.unitsPerPxUp ?? along;
  const scales = singleOf(document, 'setOut')?.value.scales ?? 'equal';
  const freedom = 2 * residuals.length - (scales === 'equal' ? SIMILARITY_PARAMETERS : TWO_SCALE_PARAMETERS);
  if (freedom < 1) return stated;
  const squares = residuals.reduce(
    (sum, each) => sum + (each.offset / along) ** 2 + (each.elevation / up) ** 2,
    0,
  );
  return Math.max(stated, coverageFactor(freedom) * Math.sqrt(squares / freedom));
}

/** Scale, rotation and two shifts. */
const SIMILARITY_PARAMETERS = 4;
/** The same with a scale for each direction. */
const TWO_SCALE_PARAMETERS = 5;

function movedMap(document: FlowNetDocument, id: string, axis: number, by: number): SectionMap | null {
  const entity = document.entities[id] as VersionedEntity;
  if (entity.value.kind !== 'knownPoint') return null;
  const [x, y] = entity.value.at;
  const at: [number, number] = axis === 0 ? [x + by, y] : [x, y + by];
  const moved = { ...entity, value: { ...entity.value, at } };
  return readSetOut({ ...document, entities: { ...document.entities, [id]: moved } }).map;
}
