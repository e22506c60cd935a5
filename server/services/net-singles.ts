import { v7 as uuidv7 } from 'uuid';
import type { DocumentEntityRow } from '#server/entities/net-entity.ts';
import { type DocumentEntity, UNSAID, type UnitSystem } from '#shared/contract/document.ts';

/** Who makes the first entities of a section or a net, and under which change number. */
export interface Making {
  personId: string;
  changeNumber: number;
  at: Date;
}

/** What a section starts with: a set-out that waits for its known points. */
export function firstSectionEntities(): DocumentEntity[] {
  return [
    {
      kind: 'setOut',
      scales: 'equal',
      method: 'points',
      distance: null,
      level: 'line',
      offsetsGrow: null,
      upstream: null,
      upQuarterTurns: null,
      statedScale: null,
    },
  ];
}

/** What a net starts with: water levels, permeability and count, all still to be said. */
export function firstNetEntities(unitSystem: UnitSystem, gammaW: number): DocumentEntity[] {
  return [
    { kind: 'waterLevels', ...UNSAID.waterLevels, headwater: null, tailwater: null, gammaW, source: '' },
    {
      kind: 'permeability',
      ...UNSAID.soil,
      k: null,
      unit: unitSystem === 'SI' ? 'm/s' : 'ft/day',
      factor: null,
      source: '',
    },
    {
      kind: 'netCount',
      countedIn: null,
      drops: null,
      channels: null,
      cellRatio: 1,
      tracingAccuracyPx: 1.5,
      knownPointAccuracyPx: 1,
    },
  ];
}

/** Rows of new entities of a net or a section, at version 1. */
export function newEntityRows(
  owner: { netId: string } | { sectionId: string },
  values: DocumentEntity[],
  making: Making,
): DocumentEntityRow[] {
  const netId = 'netId' in owner ? owner.netId : null;
  const sectionId = 'sectionId' in owner ? owner.sectionId : null;
  return values.map((value) => ({
    ownerId: netId ?? sectionId ?? '',
    entityId: uuidv7(),
    netId,
    sectionId,
    kind: value.kind,
    version: 1,
    value,
    removed: false,
    changeNumber: String(making.changeNumber),
    clientId: null,
    changedBy: making.personId,
    changedAt: making.at,
  }));
}
