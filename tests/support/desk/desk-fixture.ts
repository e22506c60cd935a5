import type {
  DocumentEntity,
  FlowNetDocument,
  TracedLine,
  VersionedEntity,
} from '#shared/contract/document.ts';
import type { OpOutcome } from '#shared/contract/nets.ts';

/** Ids in the order asked for, so that a failing test can be read. */
export function countedIds(): () => string {
  let n = 0;
  return () => {
    n += 1;
    return `00000000-0000-7000-8000-${String(n).padStart(12, '0')}`;
  };
}

export const LINE_A = '0000000a-0000-7000-8000-000000000000';
export const LINE_B = '0000000b-0000-7000-8000-000000000000';
export const POINT_A = '000000a0-0000-7000-8000-000000000000';

export function tracedLine(points: Array<[number, number]>, changes: Partial<TracedLine> = {}): TracedLine {
  return {
    kind: 'line',
    origin: 'traced',
    line: 'equipotential',
    name: '',
    points,
    finished: true,
    water: null,
    head: null,
    drops: null,
    ...changes,
  };
}

/** A document of a 1,000 × 700 px sheet with the entities given, each at version 1. */
export function documentWith(values: Record<string, DocumentEntity>): FlowNetDocument {
  const entities: Record<string, VersionedEntity> = {};
  for (const [id, value] of Object.entries(values)) entities[id] = { id, version: 1, value };
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: '00000000-0000-7000-8000-00000000d0c0',
    name: 'Full supply level',
    unitSystem: 'SI',
    datum: 'LD',
    sheet: { widthPx: 1000, heightPx: 700, dpi: 300 },
    entities,
  };
}

export function appliedAt(entityId: string, version: number): OpOutcome {
  return { entityId, outcome: 'applied', version, current: null, changedBy: null };
}
