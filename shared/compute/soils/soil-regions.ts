import { makeFinding } from '#shared/compute/findings.ts';
import { type Box, type Polyline, polylineOf, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import { closeBoundary, frameAbout, joinsOf } from '#shared/compute/soils/closed-boundaries.ts';
import { type Faces, facesOf } from '#shared/compute/soils/faces.ts';
import type { Soil, SoilList } from '#shared/compute/soils/soil-list.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** Which soil lies where. */
export type SoilRegions = {
  /** The soil at a place: of the region, the one that is placed there, or else that of the section. */
  soilAt(x: number, y: number): Soil;
  /** Soil boundaries, carried on over small gaps. */
  readonly boundaries: readonly Polyline[];
  readonly findings: readonly Finding[];
};

/** Points of the parting nearer than this, in pixels, are one. */
const MERGE_PX = 0.5;

/**
 * Parts the section along its soil boundaries, impervious boundaries, faces and ground, and gives each region the soil
 * whose place lies in it. All in the frame of `lines` and of the soils' places; `reach` is the gap of a tracing error, `up` the
 * section's up (unit vector).
 */
export function soilRegionsOf(
  lines: readonly NetLine[],
  { section, placed }: SoilList,
  reach: number,
  up: Pair,
): SoilRegions {
  // One soil needs no regions, and a net is read again at every move of a vertex.
  if (placed.length === 0) return { soilAt: () => section, boundaries: [], findings: [] };
  const soilLines = linesOfKind(lines, 'soilBoundary');
  const bounding = linesOfKind(lines, 'impervious', 'submergedFace', 'outflowFace', 'ground');
  const places = placed.flatMap((soil) => soil.places);
  const frame = frameAbout([...lines.map(({ shape }) => shape.box), ...places.map(boxOfPlace)]);
  const parting = partedBy(soilLines, bounding, frame, reach, up);
  const owners = parting.faces === null ? new Map<number, Soil>() : ownersOf(parting.faces, placed);
  const { faces } = parting;
  return {
    soilAt: (x, y) => (faces === null ? section : (owners.get(faces.at(x, y)) ?? section)),
    boundaries: parting.boundaries,
    findings: [
      ...parting.open,
      ...(faces === null ? notParted(frame === null ? [] : placed) : contradictions(faces, placed)),
    ],
  };
}

function boxOfPlace([x, y]: Pair): Box {
  return { minX: x, maxX: x, minY: y, maxY: y };
}

function partedBy(
  soilLines: readonly NetLine[],
  bounding: readonly NetLine[],
  frame: Polyline | null,
  reach: number,
  up: Pair,
) {
  if (frame === null) return { faces: null, boundaries: [], open: [] };
  const shapesBut = (line: NetLine) =>
    [...soilLines, ...bounding].filter((other) => other !== line).map(({ shape }) => shape);
  const closed = soilLines.map((line) => ({
    line,
    ...closeBoundary(line.shape, shapesBut(line), frame, reach),
  }));
  const joins = bounding.flatMap((line) => joinsOf(line.shape, shapesBut(line), frame, reach, up));
  const chains = [...[frame, ...bounding.map(({ shape }) => shape)].map(verticesOf), ...joins];
  return {
    faces: facesOf([...chains, ...closed.map(({ points }) => points)], MERGE_PX),
    boundaries: closed.map(({ points }) => polylineOf(points)).filter((shape) => shape !== null),
    open: closed.flatMap(({ line, openAt }) => openAt.map((at) => boundaryOpen(line.id, at))),
  };
}

/** The first soil placed in a region holds it. */
function ownersOf(faces: Faces, placed: readonly Soil[]): Map<number, Soil> {
  const owners = new Map<number, Soil>();
  for (const soil of placed) {
    for (const [x, y] of soil.places) {
      const face = faces.at(x, y);
      if (face >= 0 && !owners.has(face)) owners.set(face, soil);
    }
  }
  return owners;
}

function contradictions(faces: Faces, placed: readonly Soil[]): Finding[] {
  const owners = ownersOf(faces, placed);
  return placed.flatMap((soil) =>
    soil.places.flatMap((at) => {
      const owner = owners.get(faces.at(...at));
      return owner === undefined || owner === soil ? [] : [twoSoils(owner, soil, at)];
    }),
  );
}

function twoSoils(first: Soil, second: Soil, at: Pair): Finding {
  return makeFinding(
    'wrong',
    'soilsContradict',
    `Two soils are placed in one region: no boundary parts ${first.label} from ${second.label}. Trace the boundary between them to its ends, or move one of the two places.`,
    { cell: 'permeability', entityIds: [first.id, second.id].filter((id) => id !== null), at },
  );
}

function boundaryOpen(id: string, at: Pair): Finding {
  return makeFinding(
    'question',
    'soilBoundaryOpen',
    'A soil boundary ends short of any other line and is taken to go straight on. Trace it to where it ends.',
    { cell: 'permeability', entityIds: [id], at },
  );
}

function notParted(placed: readonly Soil[]): Finding[] {
  if (placed.length === 0) return [];
  return [
    makeFinding(
      'wrong',
      'soilsNotParted',
      'The section cannot be parted into its soils along the lines traced. Trace the outline of the section and the boundaries between the soils more plainly.',
      {
        cell: 'permeability',
        entityIds: placed.flatMap(({ id }) => (id === null ? [] : [id])),
        at: placed[0]?.places[0] ?? null,
      },
    ),
  ];
}
