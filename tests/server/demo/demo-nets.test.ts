import { v7 as uuidv7 } from 'uuid';
import { describe, expect, it } from 'vitest';
import { demoOps } from '#server/demo/demo-commands.ts';
import { apronNet, type DemoNet, fullSupplyNet, halfTracedNet } from '#server/demo/demo-nets.ts';
import { BASE, netPoint, sectionBB, seepage } from '#server/demo/embankment.ts';
import type { SheetFrame } from '#server/demo/sheet-frame.ts';
import {
  apronPoint,
  CHANNELS,
  DROPS,
  spillwayFrame,
  TAILWATER,
  underseepage,
} from '#server/demo/spillway-apron.ts';
import { firstNetEntities, firstSectionEntities } from '#server/services/net-singles.ts';
import { readNet } from '#shared/compute/read-net.ts';
import {
  type DocumentEntity,
  type EntityOf,
  type FlowNetDocument,
  UNSAID,
} from '#shared/contract/document.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

const versioned = (values: Array<readonly [string, DocumentEntity]>) =>
  Object.fromEntries(values.map(([id, value]) => [id, { id, version: 1, value }]));

/** The demo's net as the server would hold it once the seed's commands are applied. */
function documentOf(demo: DemoNet, frame: SheetFrame, more: DocumentEntity[] = []): FlowNetDocument {
  const fresh: FlowNetDocument = {
    format: 'tracehead/flow-net',
    version: 3,
    id: uuidv7(),
    name: 'demo',
    unitSystem: 'SI',
    datum: 'LD',
    sheet: { widthPx: frame.widthPx, heightPx: frame.heightPx, dpi: 300 },
    entities: versioned(
      [...firstSectionEntities(), ...firstNetEntities('SI', 9.81)].map((value) => [uuidv7(), value] as const),
    ),
  };
  const put = demoOps(fresh, { ...demo, entities: [...demo.entities, ...more] }).flatMap((op) =>
    op.op === 'put' ? [[op.entityId, op.value] as const] : [],
  );
  return { ...fresh, entities: { ...fresh.entities, ...versioned(put) } };
}

/** Points spread evenly over drops and channels, kept off the outline by a fiftieth of a drop. */
function readingsAt(
  count: number,
  place: (drop: number, channel: number) => [number, number],
  drops: number,
) {
  const random = seededRandom(7);
  return Array.from({ length: count }, (_, index) => {
    const drop = 0.02 + random() * (drops - 0.04);
    const [offset, elevation] = place(drop, 0.02 + random() * 0.96);
    const value: EntityOf<'readingPoint'> = {
      kind: 'readingPoint',
      ...UNSAID.readingPoint,
      name: `T${index}`,
      order: 100 + index,
      place: { on: 'section', offset, elevation },
    };
    return { drop, value };
  });
}

/** Holds the drops lost at each reading against the ones its place was made from. */
function expectAgreement(demo: DemoNet, frame: SheetFrame, readings: ReturnType<typeof readingsAt>): void {
  const document = documentOf(
    demo,
    frame,
    readings.map(({ value }) => value),
  );
  const expected = new Map(readings.map(({ drop, value }) => [value.name, drop]));
  const errors = readNet(document)
    .points.filter((point) => expected.has(point.name))
    .map((point) => Math.abs((point.dropsLost ?? Number.NaN) - (expected.get(point.name) ?? Number.NaN)))
    .sort((a, b) => a - b);
  expect(errors).toHaveLength(readings.length);
  expect(errors[Math.floor(0.95 * errors.length)]).toBeLessThan(0.08);
  expect(errors.at(-1)).toBeLessThan(0.25);
}

describe('the demo nets', () => {
  it('the full-supply net agrees with the basic parabola (Kozeny 1931) within 0.08 drop at P95 and 0.25 at worst', () => {
    const place = (drop: number, channel: number) => netPoint(seepage.H * (1 - drop / 10), channel);
    expectAgreement(fullSupplyNet(), sectionBB, readingsAt(250, place, 10));
  });

  it('the apron net agrees with the confocal solution (Harr 1962) within 0.08 drop at P95 and 0.25 at worst', () => {
    const place = (drop: number, channel: number) =>
      apronPoint(underseepage.H * (1 - drop / DROPS), (channel * CHANNELS * Math.PI) / DROPS);
    expectAgreement(apronNet(), spillwayFrame, readingsAt(250, place, DROPS));
  });

  it('the finished net gives ten drops of two metres, three channels and q = k·S', () => {
    const { state, quantities } = readNet(documentOf(fullSupplyNet(), sectionBB));
    expect(state).toBe('read');
    expect(quantities.drops).toBe(10);
    expect(quantities.channels).toBe(3);
    // The drain's elevation is read off the sheet, to a tenth of a pixel (4 mm).
    expect(quantities.headPerDrop).toBeCloseTo(2, 3);
    // Kozeny (1931): q = k·S, with k = 2e-7 m/s and S = 6 m.
    expect(quantities.seepage! / (2e-7 * 6)).toBeCloseTo(1, 3);
  });

  it('pressures at the instruments are γw(h − z) of the closed form within a tenth of a drop', () => {
    const { points } = readNet(documentOf(fullSupplyNet(), sectionBB));
    for (const point of points) {
      const x = 20 - point.offset!;
      const y = point.elevation! - BASE;
      // Kozeny (1931): u² = (x + √(x² + y²))/2 and h = 2·v0·u above the base.
      const head = 2 * Math.sqrt(seepage.S / 2) * Math.sqrt((x + Math.hypot(x, y)) / 2);
      expect(Math.abs(point.porePressure! - 9.81 * (head - y))).toBeLessThan(9.81 * 0.1 * 2);
    }
    expect(points.map((point) => point.name)).toEqual(['P1', 'P2', 'P3', 'P4']);
  });

  it('the half-traced net gives no figure and says what is missing', () => {
    const reading = readNet(documentOf({ ...halfTracedNet(), section: fullSupplyNet().section }, sectionBB));
    expect(reading.state).toBe('unfinished');
    expect(reading.points.every((point) => point.porePressure === null)).toBe(true);
    expect(reading.findings.some((finding) => finding.weight === 'missing')).toBe(true);
  });

  it.each([
    ['full supply', fullSupplyNet(), sectionBB],
    ['half traced', { ...halfTracedNet(), section: fullSupplyNet().section }, sectionBB],
    ['apron', apronNet(), spillwayFrame],
  ] as const)('the lines of the net %s end at their boundaries', (_name, demo, frame) => {
    const codes = readNet(documentOf(demo, frame)).findings.map((found) => found.code);
    expect(codes).not.toContain('gapAtBoundary');
  });

  it('tailwater is above the ground, so the apron is confined throughout', () => {
    const { points } = readNet(documentOf(apronNet(), spillwayFrame));
    expect(points.every((point) => point.status === 'read' && point.totalHead! >= TAILWATER)).toBe(true);
  });
});
