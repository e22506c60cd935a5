import { describe, expect, it } from 'vitest';
import { addPlace, addSoil, removePlace, removeSoil } from '#client/features/desk/components/soil-edits.ts';
import { type DocumentEntity, documentEntity, type EntityOf, UNSAID } from '#shared/contract/document.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const SOIL = '000000b0-0000-7000-8000-000000000000';
const COUNT = '000000c0-0000-7000-8000-000000000000';
const PERMEABILITY = '000000d0-0000-7000-8000-000000000000';
const soil = (changes: Partial<EntityOf<'soil'>> = {}): EntityOf<'soil'> => ({
  kind: 'soil',
  name: 'Soil 1',
  places: [],
  ...UNSAID.soil,
  k: null,
  unit: 'm/s',
  factor: null,
  source: '',
  ...changes,
});
const countIn = (countedIn: string | null): EntityOf<'netCount'> => ({
  kind: 'netCount',
  drops: null,
  channels: null,
  cellRatio: 1,
  countedIn,
  tracingAccuracyPx: 1.5,
  knownPointAccuracyPx: 1,
});
const valueIn = (edit: ReturnType<typeof addSoil>): DocumentEntity | null =>
  edit.ops[0]?.op === 'put' ? edit.ops[0].value : null;

describe('adding a soil', () => {
  it('gives it the first free name and the unit of the section', () => {
    const { kind: _kind, name: _name, places: _places, ...properties } = soil({ unit: 'ft/year' });
    const document = documentWith({
      [SOIL]: soil(),
      [PERMEABILITY]: { kind: 'permeability', ...properties },
    });
    const value = valueIn(addSoil('id', document));
    expect(value).toMatchObject({ name: 'Soil 2', unit: 'ft/year', k: null, places: [] });
    expect(documentEntity.safeParse(value).success).toBe(true);
  });
});

describe('removing a soil', () => {
  it('does nothing to what is no soil', () => {
    expect(removeSoil(LINE_A, documentWith({ [LINE_A]: tracedLine([[0, 0]]) }))).toBeNull();
    expect(removeSoil(SOIL, documentWith({}))).toBeNull();
  });

  it('takes the count out of it', () => {
    const document = documentWith({ [SOIL]: soil(), [COUNT]: countIn(SOIL) });
    expect(removeSoil(SOIL, document)?.ops).toEqual([
      { op: 'put', entityId: COUNT, value: countIn(null) },
      { op: 'remove', entityId: SOIL },
    ]);
  });

  it('leaves a count in another soil alone', () => {
    const document = documentWith({ [SOIL]: soil(), [COUNT]: countIn(LINE_A) });
    expect(removeSoil(SOIL, document)?.ops).toEqual([{ op: 'remove', entityId: SOIL }]);
  });
});

describe('places of a soil', () => {
  it('are marked once each', () => {
    const held = soil({ places: [[1, 2]] });
    expect(addPlace(SOIL, held, [1, 2])).toBeNull();
    expect(valueIn(addPlace(SOIL, held, [3, 4])!)).toMatchObject({
      places: [
        [1, 2],
        [3, 4],
      ],
    });
  });

  it('are removed one by one', () => {
    const held = soil({
      places: [
        [1, 2],
        [3, 4],
      ],
    });
    expect(valueIn(removePlace(SOIL, held, held.places[0]!))).toMatchObject({ places: [[3, 4]] });
  });
});
