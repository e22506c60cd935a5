import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type DamSeepageDto, damSeepageDto, MOST_SECTIONS } from '#shared/contract/dam-seepage.ts';
import { singleOf } from '#shared/contract/document.ts';
import {
  addFinishedNet,
  addNet,
  batchesOf,
  fillNet,
  finishedDocument,
  type NetPlaceFixture,
  openNet,
  putSingle,
} from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
/** Section B–B at chainage 212 with a finished net, C–C at 312 with another, D–D without a chainage. */
let place: NetPlaceFixture;
let further: { netAt312: string; second: string; sectionAt312: string; axis: string };

async function addSectionWithNet(
  chainage: string,
  name: string,
): Promise<{ sectionId: string; netId: string }> {
  const { caller, sheetId } = place;
  const [sectionId, netId] = [uuidv7(), uuidv7()];
  await caller
    .post(`/sheets/${sheetId}/sections`, { id: sectionId, name, chainage, frame: null })
    .expect(201);
  await caller.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Full supply' }).expect(201);
  await fillNet(caller, netId, finishedDocument());
  return { sectionId, netId };
}

/** Enters a permeability by which the seepages of the nets differ. */
async function enterPermeability(netId: string, k: number, factor: number | null): Promise<void> {
  const { document } = await openNet(place.caller, netId);
  const op = putSingle(document, 'permeability', { k, unit: 'm/s', factor });
  await place.caller.post(`/nets/${netId}/commands`, batchesOf()([op])).expect(200);
}

beforeAll(async () => {
  app = await createTestApp();
  place = await addFinishedNet(app);
  const at312 = await addSectionWithNet('312', 'C–C');
  const axis = await addSectionWithNet('', 'Axis');
  const second = uuidv7();
  await place.caller.post(`/sections/${at312.sectionId}/nets`, { id: second, name: 'Flood' }).expect(201);
  await enterPermeability(place.netId, 2e-6, 2);
  await enterPermeability(at312.netId, 4e-6, 3);
  further = { netAt312: at312.netId, sectionAt312: at312.sectionId, second, axis: axis.netId };
});
afterAll(() => app.close());

async function seepage(...nets: string[]): Promise<DamSeepageDto> {
  const { body } = await place.caller.get(`/dams/${place.damId}/seepage?nets=${nets.join(',')}`).expect(200);
  return damSeepageDto.parse(body);
}

describe('seepage along a dam', () => {
  it('adds nothing before anything is chosen, and shows what may be', async () => {
    const { body } = await place.caller.get(`/dams/${place.damId}/seepage`).expect(200);
    const found = damSeepageDto.parse(body);
    expect(found).toMatchObject({ chosen: [], reaches: [], total: null, cautions: [], unitSystem: 'SI' });
    expect(found.sections.map(({ name, chainage, nets }) => [name, chainage, nets.length])).toEqual([
      ['B–B', '212', 1],
      ['C–C', '312', 2],
      ['Axis', '', 1],
    ]);
    expect(found.sections[0]?.drawing.title).toBe('HF-114');
  });

  it('is half the sum of the two schedules times the length between them, within the greater factor', async () => {
    const schedules = await Promise.all(
      [place.netId, further.netAt312].map(async (netId) => {
        const { body } = await place.caller.get(`/nets/${netId}/schedule`).expect(200);
        return body.quantities.seepage as number;
      }),
    );
    const factors = await Promise.all(
      [place.netId, further.netAt312].map(
        async (netId) => (await place.caller.get(`/nets/${netId}/schedule`)).body.doubt.seepageFactor,
      ),
    );
    const found = await seepage(further.netAt312, place.netId);
    expect(found.chosen.map(({ seepage: q }) => q)).toEqual(schedules);
    expect(schedules[1]! / schedules[0]!).toBeCloseTo(2, 9);
    expect(found.total?.length).toBe(100);
    expect(found.total?.flow).toBeCloseTo(50 * (schedules[0]! + schedules[1]!), 12);
    expect(found.total?.factor).toBe(Math.max(...factors));
    const levels = singleOf(finishedDocument(), 'waterLevels')?.value;
    expect(found.chosen[0]).toMatchObject({
      chainageMetres: 212,
      headwater: levels?.headwater,
      tailwater: levels?.tailwater,
      leftOut: null,
    });
  });

  it('says when the water levels of the chosen nets differ', async () => {
    const { document } = await openNet(place.caller, further.netAt312);
    const held = singleOf(document, 'waterLevels')?.value.headwater ?? 0;
    const send = async (headwater: number) => {
      const { document: now } = await openNet(place.caller, further.netAt312);
      const op = putSingle(now, 'waterLevels', { headwater });
      await place.caller.post(`/nets/${further.netAt312}/commands`, batchesOf()([op])).expect(200);
    };
    await send(held + 0.02);
    const differing = await seepage(place.netId, further.netAt312);
    await send(held);
    expect(differing.cautions.map(({ code }) => code)).toContain('headwatersDiffer');
    const alike = await seepage(place.netId, further.netAt312);
    expect(alike.cautions.map(({ code }) => code)).not.toContain('headwatersDiffer');
  });

  it('leaves out a net that is not finished and one without a chainage, and says why', async () => {
    const found = await seepage(place.netId, further.second, further.axis);
    expect(found.chosen.map(({ netId, leftOut }) => [netId, leftOut?.code ?? null])).toEqual([
      [place.netId, null],
      [further.second, 'noSeepage'],
      [further.axis, 'chainageUnreadable'],
    ]);
    expect(found.total).toBeNull();
  });

  it('leaves out a net that was put away since it was chosen, and offers it no more', async () => {
    await place.caller.post(`/nets/${further.second}/archive`, {}).expect(200);
    const found = await seepage(place.netId, further.second);
    await place.caller.post(`/nets/${further.second}/restore`, {}).expect(200);
    expect(found.chosen.find(({ netId }) => netId === further.second)?.leftOut?.code).toBe('putAway');
    expect(found.sections.flatMap(({ nets }) => nets.map(({ id }) => id))).not.toContain(further.second);
  });

  it('puts a net in feet and one in metres into one unit', async () => {
    const { netId } = await addSectionWithNet('412', 'E–E');
    await enterPermeability(netId, 2e-6, 2);
    await app.db.query(`UPDATE net SET unit_system = 'US' WHERE id = $1`, [netId]);
    const { body } = await place.caller.get(`/nets/${netId}/schedule`).expect(200);
    const net = (await seepage(netId)).chosen[0];
    const headwater = singleOf(finishedDocument(), 'waterLevels')?.value.headwater ?? Number.NaN;
    // A foot is 0.3048 m by definition (NIST SP 811).
    expect(net?.seepage).toBeCloseTo(body.quantities.seepage * 0.3048 ** 2, 14);
    expect(net?.headwater).toBeCloseTo(headwater * 0.3048, 9);
    await place.caller.post(`/nets/${netId}/archive`, {}).expect(200);
  });

  it('refuses two nets of one section, and takes one that is named twice once', async () => {
    const both = `${further.netAt312},${further.second}`;
    const { body } = await place.caller.get(`/dams/${place.damId}/seepage?nets=${both}`).expect(400);
    expect(body).toMatchObject({ code: 'invalid-input' });
    expect((await seepage(place.netId, place.netId.toUpperCase())).chosen).toHaveLength(1);
    await place.caller.get(`/dams/${place.damId}/seepage?nets=all`).expect(400);
    const many = Array.from({ length: MOST_SECTIONS + 1 }, () => uuidv7()).join(',');
    const refused = await place.caller.get(`/dams/${place.damId}/seepage?nets=${many}`).expect(400);
    expect(refused.body.detail).toContain('at most');
  });

  it('hides nets of another dam as if they did not exist, also from who may read both', async () => {
    const other = await addNet(app, 'Ove Lund');
    const elsewhere = await place.caller.get(`/dams/${place.damId}/seepage?nets=${other.netId}`).expect(404);
    const nowhere = await place.caller.get(`/dams/${place.damId}/seepage?nets=${uuidv7()}`).expect(404);
    expect(elsewhere.body.detail).toBe(nowhere.body.detail);
    const admin = (await app.signIn('Ada Quist', { admin: true })).caller;
    await admin.get(`/dams/${place.damId}/seepage?nets=${other.netId}`).expect(404);
  });
});
