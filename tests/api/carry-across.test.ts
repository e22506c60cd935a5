import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf, type SheetPoint, singleOf, UNSAID } from '#shared/contract/document.ts';
import { addFinishedNet, addSheet, batchesOf, openNet, put, putSingle } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

/** The new scan: at another resolution, turned by 2°, shifted. */
const onNewScan = ([x, y]: readonly [number, number]): SheetPoint => {
  const [c, s] = [1.3 * Math.cos(Math.PI / 90), 1.3 * Math.sin(Math.PI / 90)];
  return [c * x - s * y + 210, s * x + c * y + 35];
};
const PLACES = (
  [
    [150, 120],
    [4700, 200],
    [4600, 3300],
    [200, 3200],
  ] as const
).map((from) => ({
  from: [...from],
  to: onNewScan(from),
}));

async function withNewSheet() {
  const place = await addFinishedNet(app);
  const newSheetId = await addSheet(app, place.damId, place.engineer.id);
  const input = (change: object = {}) => ({
    id: uuidv7(),
    name: 'B–B',
    fromSectionId: place.sectionId,
    shape: 'similarity',
    places: PLACES,
    nets: [{ fromNetId: place.netId, id: uuidv7() }],
    ...change,
  });
  return { ...place, newSheetId, input };
}

describe('a section carried to a new scan', () => {
  it('keeps its figures, its drawers and its name; the old one stays as it was', async () => {
    const { caller, netId, newSheetId, input, engineer } = await withNewSheet();
    const before = await caller.get(`/nets/${netId}/schedule`).expect(200);
    const sent = input();
    const { body } = await caller.post(`/sheets/${newSheetId}/carried-sections`, sent).expect(201);
    expect(body.section).toMatchObject({ id: sent.id, sheetId: newSheetId, name: 'B–B', chainage: '212' });
    expect(body.section.calibrated).toBe(true);
    expect(Math.max(...body.residualsPx)).toBeLessThan(1e-6);
    const carried = await openNet(caller, sent.nets[0]!.id);
    expect(carried.drawnBy).toEqual([{ id: engineer.id, name: engineer.name }]);
    const after = await caller.get(`/nets/${sent.nets[0]!.id}/schedule`).expect(200);
    const heads = (schedule: typeof before) =>
      schedule.body.points.map((point: { totalHead: number }) => point.totalHead);
    expect(heads(before).length).toBe(3);
    expect(heads(before).every(Number.isFinite)).toBe(true);
    // A field reading turned with its sheet is the same to 0.015 drop: its elements lie otherwise.
    const drop = before.body.quantities.headPerDrop;
    heads(after).forEach((head: number, i: number) => {
      expect(Math.abs(head - heads(before)[i])).toBeLessThan(0.015 * drop);
    });
    const again = await caller.get(`/nets/${netId}/schedule`).expect(200);
    expect(heads(again)).toEqual(heads(before));
  });

  it('moves every place on the sheet, and takes the error of the match into the accuracy of the known points', async () => {
    const { caller, netId, newSheetId, input } = await withNewSheet();
    const [first, ...others] = PLACES;
    const slipped = [{ ...first!, to: [first!.to[0] + 6, first!.to[1]] }, ...others];
    const sent = input({ places: slipped });
    const { body } = await caller.post(`/sheets/${newSheetId}/carried-sections`, sent).expect(201);
    expect(Math.max(...body.residualsPx)).toBeGreaterThan(2);
    const [old, now] = [await openNet(caller, netId), await openNet(caller, sent.nets[0]!.id)];
    const line = entitiesOf(old.document, 'line')[0]!.value.points[0]!;
    const moved = entitiesOf(now.document, 'line')[0]!.value.points[0]!;
    const [x, y] = onNewScan(line);
    expect(Math.hypot(moved[0] - x, moved[1] - y)).toBeLessThan(6);
    const count = singleOf(now.document, 'netCount')!.value;
    expect(count.tracingAccuracyPx).toBeCloseTo(
      1.3 * singleOf(old.document, 'netCount')!.value.tracingAccuracyPx,
      1,
    );
    // Σv² of a slip of 6 px at a corner of nearly a rectangle is some 6²/2, over 8 − 4.
    expect(count.knownPointAccuracyPx).toBeGreaterThan(2);
    expect(count.knownPointAccuracyPx).toBeLessThan(3);
  });

  it('gives the soil that the channels are counted in its new id, as a copy does', async () => {
    const { caller, netId, newSheetId, input } = await withNewSheet();
    const { document } = await openNet(caller, netId);
    const soilId = uuidv7();
    const soil = {
      kind: 'soil' as const,
      name: 'Filter',
      places: [[10, 10] as SheetPoint],
      ...UNSAID.soil,
      k: 1e-5,
      unit: 'm/s' as const,
      factor: null,
      source: '',
    };
    const ops = [put(soil, soilId), putSingle(document, 'netCount', { countedIn: soilId })];
    await caller.post(`/nets/${netId}/commands`, batchesOf()(ops, 'named the soil')).expect(200);
    const sent = input();
    await caller.post(`/sheets/${newSheetId}/carried-sections`, sent).expect(201);
    const copyId = uuidv7();
    await caller.post(`/nets/${netId}/copy`, { id: copyId, name: 'Flood' }).expect(201);
    for (const id of [sent.nets[0]!.id, copyId]) {
      const copy = (await openNet(caller, id)).document;
      const counted = singleOf(copy, 'netCount')!.value.countedIn;
      expect(counted).toBe(entitiesOf(copy, 'soil')[0]!.id);
      expect(counted).not.toBe(soilId);
    }
  });

  it('types the coordinates of known points where the old sheet itself was level', async () => {
    const { caller, netId, newSheetId, input } = await withNewSheet();
    const { document } = await openNet(caller, netId);
    const ops = [
      putSingle(document, 'setOut', {
        level: 'sheet',
        method: 'distance',
        distance: 30,
        offsetsGrow: 'right',
      }),
    ];
    await caller.post(`/nets/${netId}/commands`, batchesOf()(ops, 'set out by a length')).expect(200);
    const sent = input();
    const { body } = await caller.post(`/sheets/${newSheetId}/carried-sections`, sent).expect(201);
    expect(body.told.join()).toMatch(/level/);
    const carried = (await openNet(caller, sent.nets[0]!.id)).document;
    expect(singleOf(carried, 'setOut')!.value).toMatchObject({ method: 'points', level: 'line' });
    const fitted = entitiesOf(carried, 'knownPoint').filter(({ value }) => value.use === 'fit');
    expect(fitted.every(({ value }) => value.offset !== null && value.elevation !== null)).toBe(true);
  });

  it('refuses places that coincide or mirror, and a section or a net of somewhere else', async () => {
    const { caller, newSheetId, input, engineer } = await withNewSheet();
    const same = PLACES.map(() => PLACES[0]);
    const path = `/sheets/${newSheetId}/carried-sections`;
    const { body } = await caller.post(path, input({ places: same })).expect(400);
    expect(body.errors[0].path).toBe('places');
    const other = await addFinishedNet(app);
    await caller.post(path, input({ fromSectionId: other.sectionId, nets: [] })).expect(404);
    await caller.post(path, input({ nets: [{ fromNetId: other.netId, id: uuidv7() }] })).expect(404);
    const strange = await addDam(app.db, engineer.id);
    await addMember(app.db, strange, engineer.id, 'engineer');
    const strangeSheet = await addSheet(app, strange, engineer.id);
    await caller.post(`/sheets/${strangeSheet}/carried-sections`, input()).expect(404);
  });
});
