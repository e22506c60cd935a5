import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import {
  entitiesOf,
  FLOW_NET_VERSION,
  flowNetDocument,
  singleOf,
  UNSAID,
} from '#shared/contract/document.ts';
import { completeEntity, upgradeDocument } from '#shared/contract/document-versions.ts';
import { firstDocument, firstReading } from '#tests/support/first-version/first-version.ts';

describe('a document of an older version', () => {
  it.each([null, 'text', 3, [], { version: '1' }, { version: 0.5 }, { version: FLOW_NET_VERSION + 1 }])(
    'that is none (%j) comes back as it is, and the schema refuses it',
    (json) => {
      expect(upgradeDocument(json)).toEqual(json);
      expect(flowNetDocument.safeParse(upgradeDocument(json)).success).toBe(false);
    },
  );

  it('is not read before it has been brought up', () => {
    expect(flowNetDocument.safeParse(firstDocument()).success).toBe(false);
  });

  it('of version 1 keeps all it says, and says of what was added that nobody has said it', () => {
    const before = firstDocument();
    const document = flowNetDocument.parse(upgradeDocument(before));
    expect(before).toEqual(firstDocument());
    expect(document.version).toBe(FLOW_NET_VERSION);
    const { entities } = before as { entities: Record<string, { value: object }> };
    expect(Object.keys(document.entities)).toEqual(Object.keys(entities));
    for (const [id, entity] of Object.entries(document.entities)) {
      expect(entity.value).toMatchObject(entities[id]!.value);
    }
    expect(singleOf(document, 'setOut')?.value.scales).toBe('equal');
    expect(singleOf(document, 'netCount')?.value.countedIn).toBeNull();
    expect(singleOf(document, 'waterLevels')?.value).toMatchObject(UNSAID.waterLevels);
    expect(singleOf(document, 'permeability')?.value).toMatchObject(UNSAID.soil);
    expect(entitiesOf(document, 'line').map(({ value }) => value.origin)).not.toContain('guessed');
    for (const { value } of entitiesOf(document, 'readingPoint')) {
      expect(value).toMatchObject(UNSAID.readingPoint);
    }
  });

  it('of version 1 is read: drops within the 0.25 that a hand reading is off at worst from what engine 1 read', () => {
    const reading = readNet(flowNetDocument.parse(upgradeDocument(firstDocument())));
    expect(reading.state).toBe('read');
    const then = firstReading().points as unknown as Array<{ id: string; dropsLost: number }>;
    for (const { id, dropsLost } of then) {
      const now = reading.points.find((point) => point.id === id);
      expect(Math.abs((now?.dropsLost ?? Number.NaN) - dropsLost)).toBeLessThan(0.25);
    }
  });
});

describe('an entity kept by an older version of the page', () => {
  it('gets the fields that were added since', () => {
    const { entities } = firstDocument() as { entities: Record<string, { value: { kind: string } }> };
    const levels = Object.values(entities).find(({ value }) => value.kind === 'waterLevels')!.value;
    expect(levels).not.toHaveProperty('datumPlusMinus');
    expect(completeEntity(levels)).toEqual({ ...levels, ...UNSAID.waterLevels });
  });

  it('comes back as it is when it is none, so that nothing typed is lost', () => {
    expect(completeEntity({ kind: 'waterLevels', headwater: 'high' })).toEqual({
      kind: 'waterLevels',
      headwater: 'high',
    });
  });
});
