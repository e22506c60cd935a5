import { describe, expect, it } from 'vitest';
import { sectionRows, withNet } from '#client/pages/dam-seepage/section-rows.ts';
import { chosenNet, ids, seepageAlongDam } from '#tests/support/seepage-along-dam.ts';

describe('the sections of the table', () => {
  it('come by chainage, those without one last, and nothing is chosen by itself', () => {
    const rows = sectionRows(seepageAlongDam(), []);
    expect(rows.map(({ name, netId }) => [name, netId])).toEqual([
      ['A–A', null],
      ['B–B', null],
      ['Axis', null],
    ]);
  });

  it('show what the address names before it is read, and what was read only while it is named', () => {
    const found = seepageAlongDam({ chosen: [chosenNet(ids.b, { sectionId: 'section b' })] });
    const before = sectionRows(found, [ids.b2])[1];
    expect(before).toMatchObject({ netId: ids.b2, chosen: null });
    expect(sectionRows(found, [ids.b])[1]).toMatchObject({ netId: ids.b, chosen: { netId: ids.b } });
  });

  it('keep a net that was put away since it was chosen, and a section too', () => {
    const leftOut = { code: 'putAway', text: 'put away' };
    const found = seepageAlongDam({
      chosen: [
        chosenNet(ids.gone, { sectionId: 'section b', leftOut }),
        chosenNet('other', { sectionId: 'section gone', chainage: '50', leftOut }),
      ],
    });
    const rows = sectionRows(found, [ids.gone, 'other']);
    expect(rows.map(({ id }) => id)).toEqual(['section a', 'section gone', 'section b', 'section axis']);
    expect(rows[1]).toMatchObject({ drawing: null, netId: 'other', nets: [{ putAway: true }] });
    expect(rows[2]?.nets.map(({ id, putAway }) => [id, putAway])).toEqual([
      [ids.b, false],
      [ids.b2, false],
      [ids.gone, true],
    ]);
  });
});

describe('choosing a net', () => {
  const row = (netIds: string[]) => sectionRows(seepageAlongDam(), netIds)[1]!;

  it('takes the place of another one of its section only', () => {
    const held = [ids.a, ids.b];
    expect(withNet(held, row(held), ids.b2)).toEqual([ids.a, ids.b2]);
    expect(withNet([ids.a], row([ids.a]), ids.b)).toEqual([ids.a, ids.b]);
  });

  it('can be taken back, also for a net that was put away', () => {
    const held = [ids.a, ids.b];
    expect(withNet(held, row(held), null)).toEqual([ids.a]);
    const found = seepageAlongDam({ chosen: [chosenNet(ids.gone, { sectionId: 'section b' })] });
    const away = sectionRows(found, [ids.a, ids.gone])[1]!;
    expect(withNet([ids.a, ids.gone], away, null)).toEqual([ids.a]);
  });
});
