import type { Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind, medianLength } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import { type InterfaceCrossing, interfaceCrossings } from '#shared/compute/soils/interface-crossings.ts';
import {
  equivalentK,
  expectedCellRatio,
  type Soil,
  type SoilList,
  soilsOf,
  type Tensor,
  tensorIn,
} from '#shared/compute/soils/soil-list.ts';
import { questionSoilList, questionUsedSoils } from '#shared/compute/soils/soil-questions.ts';
import { soilRegionsOf } from '#shared/compute/soils/soil-regions.ts';
import { usedSoils } from '#shared/compute/soils/used-soils.ts';
import type { WorkingFrame } from '#shared/compute/working-frame.ts';
import type { EntityOf, FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { SoilsReading } from '#shared/contract/reading-frame.ts';

/** The ground under a net: which soil lies where and what follows of it; places in working pixels. */
export type SoilGround = {
  soilAt(x: number, y: number): Soil;
  /** Permeability in working pixels up to one factor; null where it is one for all places and directions. */
  readonly tensorAt: ((x: number, y: number) => Tensor) | null;
  readonly boundaries: readonly Polyline[];
  /** √(kh·kv) at a place over that of the soil in which the channels are counted; null while unknown. */
  relativeK(at: Pair): number | null;
  /** What the seepage counts: the permeability of the soil in which the channels are counted, kv resolved. */
  readonly permeability: EntityOf<'permeability'>;
  readonly reading: SoilsReading;
  readonly findings: readonly Finding[];
};

/** Lines tell their direction on either side of an interface by this part of a usual equipotential. */
const WINDOW_PART = 0.25;
const LEAST_WINDOW_PX = 80;

/**
 * The soils under a net put in order. `document` with its traces in working pixels; `impliedRatio` kh/kv of a section
 * that is drawn transformed, null elsewhere. Pure and total.
 */
export function soilGroundOf(
  document: FlowNetDocument,
  frame: WorkingFrame,
  model: NetModel,
  inputs: SingleInputs,
  impliedRatio: number | null,
): SoilGround {
  const list = soilsOf(document, inputs.permeability, impliedRatio);
  const regions = soilRegionsOf(model.lines, list, model.reach, frame.map.up);
  const used = usedSoils(model.strips, regions, list);
  const { countedIn, cellRatio } = inputs.count;
  const named = countedSoil(list, countedIn);
  const counted = named !== null && (used.length === 0 || used.includes(named)) ? named : null;
  const tensors = new Map([list.section, ...list.placed].map((soil) => [soil, tensorIn(soil, frame.map)]));
  const tensorOf = (soil: Soil) => tensors.get(soil) ?? null;
  const crossings = used.length > 1 ? crossingsOf(model, regions.soilAt, tensorOf, inputs) : [];
  const kc = counted === null ? null : equivalentK(counted);
  return {
    soilAt: regions.soilAt,
    tensorAt: tensorsOf(used, regions.soilAt, tensorOf),
    boundaries: regions.boundaries,
    relativeK: ([x, y]) =>
      ratioOrNull(
        equivalentK(used.length > 1 ? regions.soilAt(x, y) : (used[0] ?? list.section)),
        kc,
        used.length <= 1,
      ),
    permeability: countedPermeability(counted, inputs.permeability),
    reading: {
      counted: counted?.id ?? null,
      expectedRatios: used.map((soil) => ({
        id: soil.id,
        label: soil.label,
        cellRatio: counted === null ? null : expectedCellRatio(soil, counted, cellRatio),
      })),
      crossings: crossings.map((crossing) => crossingOnSheet(crossing, frame)),
    },
    findings: [
      ...regions.findings,
      ...questionSoilList(list, impliedRatio),
      ...questionUsedSoils({ list, used, counted, countedIn, frame, model, crossings }),
    ],
  };
}

/** In a net of one soil every place is as permeable as the counted one, whether or not its figure is entered. */
function ratioOrNull(k: number | null, counted: number | null, isOnly: boolean): number | null {
  if (isOnly) return 1;
  return k === null || counted === null ? null : k / counted;
}

/** The soil in which channels are counted; null when the one that was named is not there any more. */
function countedSoil({ section, placed }: SoilList, countedIn: string | null): Soil | null {
  if (countedIn === null || countedIn === section.id) return section;
  return placed.find(({ id }) => id === countedIn) ?? null;
}

function countedPermeability(
  counted: Soil | null,
  section: EntityOf<'permeability'>,
): EntityOf<'permeability'> {
  if (counted === null) return { ...section, k: null, kv: null };
  const { value, kh, kv } = counted;
  const ratio = kh === null || kv === null ? 1 : kv / kh;
  return { ...value, kind: 'permeability', kv: value.k === null || ratio === 1 ? null : value.k * ratio };
}

/** Null where one permeability without direction holds all over, in which case heads do not depend on it. */
function tensorsOf(
  used: readonly Soil[],
  soilAt: SoilGround['soilAt'],
  tensorOf: (soil: Soil) => Tensor | null,
): SoilGround['tensorAt'] {
  const tensors = used.map(tensorOf);
  const [first] = tensors;
  if (first === undefined || first === null || tensors.some((tensor) => tensor === null)) return null;
  const isOne = tensors.every(
    (tensor) => tensor !== null && same(tensor, { xx: first.xx, xy: 0, yy: first.xx }),
  );
  if (isOne) return null;
  if (used.length === 1) return () => first;
  return (x, y) => tensorOf(soilAt(x, y)) ?? first;
}

function same(a: Tensor, b: Tensor): boolean {
  const size = 1e-6 * (Math.abs(b.xx) + Math.abs(b.yy));
  return Math.abs(a.xx - b.xx) <= size && Math.abs(a.xy - b.xy) <= size && Math.abs(a.yy - b.yy) <= size;
}

function crossingsOf(
  model: NetModel,
  soilAt: SoilGround['soilAt'],
  tensorOf: (soil: Soil) => Tensor | null,
  inputs: SingleInputs,
): InterfaceCrossing[] {
  const equipotentials = linesOfKind(model.lines, 'equipotential');
  const lines = [...equipotentials, ...linesOfKind(model.lines, 'flowLine')];
  return interfaceCrossings(
    lines.map(({ id, kind, shape }) => ({ id, shape, isFlow: kind === 'flowLine' })),
    linesOfKind(model.lines, 'soilBoundary'),
    {
      soilAt,
      tensorOf,
      window: Math.max(LEAST_WINDOW_PX, WINDOW_PART * medianLength(equipotentials)),
      accuracyPx: inputs.count.tracingAccuracyPx,
    },
  );
}

function crossingOnSheet(
  { at, from, to, ...rest }: InterfaceCrossing,
  frame: WorkingFrame,
): SoilsReading['crossings'][number] {
  const [x, y] = frame.toSheet(at);
  return { ...rest, at: [x, y], from: from.label, to: to.label };
}
