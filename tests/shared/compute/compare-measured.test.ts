import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compareMeasured } from '#shared/compute/compare-measured.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

type Measured = EntityOf<'readingPoint'>['measured'];
type Levels = Partial<EntityOf<'waterLevels'>>;

/** What the net gives at its first reading point, whatever was measured there. */
const net = readNet(finishedDocument(1)).points[0]!;

/** The finished net with a value measured at its first reading point. */
function withMeasured(
  measured: Measured,
  levels: Levels = {},
  point: Partial<EntityOf<'readingPoint'>> = {},
) {
  const document = finishedDocument(1);
  const held = entitiesOf(document, 'readingPoint')[0]!;
  const water = singleOf(document, 'waterLevels')!;
  const entities = {
    ...document.entities,
    [held.id]: { ...held, value: { ...held.value, ...point, measured } },
    [water.id]: { ...water, value: { ...water.value, ...levels } },
  };
  const changed: FlowNetDocument = { ...document, entities };
  return { document: changed, found: compareMeasured(changed, [net])[0]! };
}

const shown = (
  value: number,
  as: 'totalHead' | 'pressureHead' | 'porePressure',
  plusMinus: number | null = null,
) => ({
  value,
  as,
  plusMinus,
  on: '1968-04-03',
});

describe('a measured value beside the net', () => {
  it('is none where nothing was measured, and no head where the elevation of a pressure is not known', () => {
    const { document } = withMeasured(null);
    expect(compareMeasured(document, [net])).toEqual([]);
    const { document: other } = withMeasured(shown(2, 'pressureHead'));
    const [found] = compareMeasured(other, [
      { ...net, elevation: null, totalHead: null, status: 'withheld' },
    ]);
    expect(found).toMatchObject({ head: null, difference: null, beyond: false, wetAboveNet: false });
  });

  it('has no difference where the net gives no head, and a pressure above its phreatic line is told', () => {
    const { document } = withMeasured(shown(0.4, 'pressureHead', 0.1));
    const above = { ...net, status: 'abovePhreatic' as const, totalHead: null, pressureHead: null };
    expect(compareMeasured(document, [above])[0]).toMatchObject({ difference: null, wetAboveNet: true });
    const { document: dry } = withMeasured(shown(0.05, 'pressureHead', 0.1));
    expect(compareMeasured(dry, [above])[0]).toMatchObject({ wetAboveNet: false });
  });

  // h = z + p = z + u/γw is the definition of total head; no source is needed.
  it('is one and the same total head, typed as total head, pressure head or pressure', () => {
    const z = net.elevation!;
    const heads = [shown(z + 3, 'totalHead'), shown(3, 'pressureHead'), shown(3 * 9.81, 'porePressure')].map(
      (measured) => withMeasured(measured, { gammaW: 9.81 }).found,
    );
    for (const { head, difference } of heads) {
      expect(head).toBeCloseTo(z + 3, 12);
      expect(difference).toBeCloseTo(z + 3 - net.totalHead!, 12);
    }
  });

  it('is adverse, positive, where the ground holds more than the net says, and beyond the ± or not', () => {
    const most = net.totalHeadPlusMinus!;
    const over = withMeasured(shown(net.totalHead! + 1.01 * most, 'totalHead')).found;
    expect(over).toMatchObject({ beyond: true, differencePlusMinus: most });
    expect(over.difference).toBeGreaterThan(0);
    const under = withMeasured(shown(net.totalHead! - 0.99 * most, 'totalHead')).found;
    expect(under.beyond).toBe(false);
    expect(under.difference).toBeLessThan(0);
  });

  // JCGM 100:2008, 5.1.2: independent sources add as squares. 0.3 and 0.4 give 0.5.
  it('takes the ± of tip, pressure and γw together as independent sources', () => {
    const place = { on: 'section' as const, offset: 0, elevation: 1 };
    const { found } = withMeasured(shown(3, 'pressureHead', 0.3), {}, { place, elevationPlusMinus: 0.4 });
    expect(found.headPlusMinus).toBeCloseTo(0.5, 12);
    const clicked = withMeasured(shown(3, 'pressureHead', 0.3), {}, { elevationPlusMinus: 0.4 }).found;
    expect(clicked.headPlusMinus).toBe(0.3);
    // u/γw = 10 with 1 % of γw is ±0.1; the ± of u is 0.
    const weight = withMeasured(shown(100, 'porePressure', 0), { gammaW: 10, gammaWPlusMinus: 0.1 }).found;
    expect(weight.headPlusMinus).toBeCloseTo(0.1, 12);
  });

  it('differs by as much more as is measured more, whatever is measured', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -100, max: 100, noNaN: true }),
        fc.double({ min: 0, max: 50, noNaN: true }),
        (value, more) => {
          const { document } = withMeasured(shown(value, 'totalHead'));
          const [lower] = compareMeasured(document, [net]);
          const { document: raised } = withMeasured(shown(value + more, 'totalHead'));
          const [higher] = compareMeasured(raised, [net]);
          expect(higher!.difference! - lower!.difference!).toBeCloseTo(more, 9);
        },
      ),
      { numRuns: 10 },
    );
  });
});

it('a whole reading holds every point with a measured value, and no other', () => {
  const { document } = withMeasured(shown(3, 'pressureHead'));
  const [point] = entitiesOf(document, 'readingPoint');
  expect(readNet(document).measured.map(({ id }) => id)).toEqual([point!.id]);
});
