import { type EntityOf, type FlowNetDocument, singleOf, UNSAID } from '#shared/contract/document.ts';

/** The inputs of which a net has one each. */
export type SingleInputs = {
  readonly water: EntityOf<'waterLevels'>;
  readonly permeability: EntityOf<'permeability'>;
  readonly count: EntityOf<'netCount'>;
};

/** Unit weight of water by custom: 9.81 kN/m³, or 62.4 lb/ft³; never one for the other (they differ by 0.08 %). */
export const CUSTOMARY_GAMMA_W = { SI: 9.81, US: 62.4 } as const;

/** The single inputs of a document; one that is lacking counts as not filled in, with the customary defaults. */
export function singleInputs(document: FlowNetDocument): SingleInputs {
  return {
    water: singleOf(document, 'waterLevels')?.value ?? {
      kind: 'waterLevels',
      ...UNSAID.waterLevels,
      headwater: null,
      tailwater: null,
      gammaW: CUSTOMARY_GAMMA_W[document.unitSystem],
      source: '',
    },
    permeability: singleOf(document, 'permeability')?.value ?? {
      kind: 'permeability',
      ...UNSAID.soil,
      k: null,
      unit: document.unitSystem === 'SI' ? 'm/s' : 'ft/day',
      factor: null,
      source: '',
    },
    count: singleOf(document, 'netCount')?.value ?? {
      kind: 'netCount',
      countedIn: null,
      drops: null,
      channels: null,
      cellRatio: 1,
      tracingAccuracyPx: 1.5,
      knownPointAccuracyPx: 1,
    },
  };
}
