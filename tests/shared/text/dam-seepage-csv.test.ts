import { describe, expect, it } from 'vitest';
import { damSeepageCsv } from '#shared/text/dam-seepage-csv.ts';
import { chosenNet, ids, seepageAlongDam } from '#tests/support/seepage-along-dam.ts';

const found = seepageAlongDam({
  chosen: [
    chosenNet(ids.a),
    chosenNet(ids.b, { sectionName: 'B–B', chainage: '0+100', chainageMetres: 100, tracedOnly: true }),
    chosenNet(ids.axis, {
      sectionName: '=Axis',
      chainage: '',
      chainageMetres: null,
      seepage: null,
      factor: null,
      leftOut: { code: 'chainageUnreadable', text: 'Its chainage is no number.' },
    }),
  ],
  reaches: [{ from: 0, to: 100, length: 100, flow: 1e-4 }],
  total: { length: 100, flow: 1e-4, factor: 2, figures: 1 },
  cautions: [{ code: 'leftOut', text: 'Not in the total: =Axis.' }],
});

describe('the seepage along a dam as CSV', () => {
  it('has the nets, the reaches with the total in every unit, and the cautions', () => {
    // gal/day and ft³/s by NIST SP 811: 1 m³ is 264.172052358 US gallons and 35.3146667215 ft³.
    expect(damSeepageCsv(found).split('\r\n')).toEqual([
      'Section,Chainage as written,"Chainage, m",Net,"Headwater, m LD","Tailwater, m LD","Seepage, m³/s per m",Factor (×/÷) at 95 %,In the total,Remark',
      'A–A,0,0,Full supply,30,,0.000001,2,yes,',
      'B–B,0+100,100,Full supply,30,,0.000001,2,yes,Traced channels only.',
      "'=Axis,,,Full supply,30,,,,no,Its chainage is no number.",
      '',
      '"From, m","To, m","Length, m","Seepage, m³/s","Seepage, L/s","Seepage, m³/day","Seepage, gal/day","Seepage, ft³/s",Factor (×/÷) at 95 %',
      '0,100,100,0.0001,0.1,8.64,2282.44653237,0.00353146667215,',
      'Total,,100,0.0001,0.1,8.64,2282.44653237,0.00353146667215,2',
      '',
      'To be known',
      'Not in the total: =Axis.',
      '',
    ]);
  });

  it('gives a dam in feet its lengths in feet and its seepage per foot', () => {
    const [, row] = damSeepageCsv({ ...found, unitSystem: 'US' }).split('\r\n');
    // 30 m are 98.4251968504 ft, and 10⁻⁶ m²/s are 1.07639104167·10⁻⁵ ft²/s.
    expect(row).toBe('A–A,0,0,Full supply,98.4251968504,,0.0000107639104167,2,yes,');
  });
});
