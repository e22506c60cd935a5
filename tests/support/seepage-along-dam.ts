import type { ChosenNet, DamSeepageDto } from '#shared/contract/dam-seepage.ts';

/** Ids that read as what they stand for. */
export const ids = { dam: 'dam', drawing: 'drawing', a: 'a', b: 'b', b2: 'b2', axis: 'axis', gone: 'gone' };

export function chosenNet(netId: string, change: Partial<ChosenNet> = {}): ChosenNet {
  return {
    netId,
    netName: 'Full supply',
    sectionId: `section ${netId}`,
    sectionName: 'A–A',
    chainage: '0',
    chainageMetres: 0,
    headwater: 30,
    tailwater: null,
    seepage: 1e-6,
    factor: 2,
    figures: 1,
    tracedOnly: false,
    leftOut: null,
    ...change,
  };
}

/** Sections at 100, at 0 and at none, in order of making; nothing chosen. */
export function seepageAlongDam(change: Partial<DamSeepageDto> = {}): DamSeepageDto {
  const section = (id: string, name: string, chainage: string, nets: string[]) => ({
    id: `section ${id}`,
    name,
    chainage,
    drawing: { id: ids.drawing, title: 'HF-114' },
    nets: nets.map((net) => ({ id: net, name: `Net ${net}` })),
  });
  return {
    damId: ids.dam,
    unitSystem: 'SI',
    datum: 'LD',
    sections: [
      section('axis', 'Axis', '', [ids.axis]),
      section('b', 'B–B', '100', [ids.b, ids.b2]),
      section('a', 'A–A', '0', [ids.a]),
    ],
    chosen: [],
    reaches: [],
    total: null,
    cautions: [],
    ...change,
  };
}
