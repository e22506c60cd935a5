import { type DocumentEntity, type FlowNetDocument, UNSAID } from '#shared/contract/document.ts';

/**
 * The document without what the engineer read, counted or named: lines, known points, set-out and the water levels stay,
 * since nobody can read a net without them; typed drops and heads of equipotentials, names (which may tell a head),
 * counts, permeability, soils, points, profiles and what was measured go.
 */
export function blindedDocument(document: FlowNetDocument): FlowNetDocument {
  const entities = Object.values(document.entities).flatMap((entity) => {
    const value = blinded(entity.value);
    return value === null ? [] : [[entity.id, { ...entity, value }] as const];
  });
  return { ...document, entities: Object.fromEntries(entities) };
}

function blinded(value: DocumentEntity): DocumentEntity | null {
  switch (value.kind) {
    case 'knownPoint':
    case 'setOut':
      return value;
    case 'line':
      return value.line === 'equipotential'
        ? { ...value, name: '', drops: null, head: null }
        : { ...value, name: '', drops: null };
    case 'waterLevels':
      return { ...value, source: '' };
    case 'netCount':
      return { ...value, drops: null, channels: null, countedIn: null };
    case 'permeability':
      return { kind: value.kind, ...UNSAID.soil, k: null, unit: value.unit, factor: null, source: '' };
    default:
      return null;
  }
}
