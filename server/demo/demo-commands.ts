import { v7 as uuidv7 } from 'uuid';
import {
  type DocumentEntity,
  entitiesOf,
  type FlowNetDocument,
  singleOf,
} from '#shared/contract/document.ts';
import type { NetOp } from '#shared/contract/nets.ts';
import type { DemoNet, SingleValues } from './demo-nets.ts';

const put = (entityId: string, baseVersion: number, value: DocumentEntity): NetOp => ({
  op: 'put',
  entityId,
  baseVersion,
  value,
});

/** Entries of the single entities, changed where the demo says something. */
function singleOps(document: FlowNetDocument, singles: SingleValues): NetOp[] {
  const kinds = ['setOut', 'waterLevels', 'permeability', 'netCount'] as const;
  return kinds.flatMap((kind) => {
    const held = singleOf(document, kind);
    const said = singles[kind];
    return held && said ? [put(held.id, held.version, { ...held.value, ...said } as DocumentEntity)] : [];
  });
}

/** The operations that make a fresh document into the demo's net, as the desk would send them. */
export function demoOps(document: FlowNetDocument, demo: DemoNet): NetOp[] {
  // The section's points are there already when another of its nets was traced before.
  const section = entitiesOf(document, 'knownPoint').length > 0 ? [] : demo.section;
  return [
    ...[...section, ...demo.entities].map((value) => put(uuidv7(), 0, value)),
    ...singleOps(document, demo.singles),
  ];
}
