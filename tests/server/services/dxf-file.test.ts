import DxfParser from 'dxf-parser';
import { describe, expect, it } from 'vitest';
import { AppError } from '#server/errors/app-error.ts';
import { dxfText } from '#server/services/dxf-file.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import { entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import { LINE_LAYERS } from '#shared/text/net-dxf.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

interface ReadEntity {
  type: string;
  layer: string;
  shape?: boolean;
  vertices?: Array<{ x: number; y: number }>;
  position?: { x: number; y: number };
  startPoint?: { x: number; y: number };
  text?: string;
}

/** The file as a reader of another maker takes it. */
function read(text: string) {
  const dxf = new DxfParser().parseSync(text) as unknown as {
    header: Record<string, unknown>;
    tables: { layer: { layers: Record<string, unknown> } };
    entities: ReadEntity[];
  };
  return { ...dxf, layers: Object.keys(dxf.tables.layer.layers) };
}

const drawn = (document: FlowNetDocument) => read(dxfText(document, readNet(document)));

/** Every finished line of the document beside the polylines on its layer: the greatest distance in either coordinate. */
function worstOf(document: FlowNetDocument, entities: ReadEntity[]): number {
  const map = fittedMap(document);
  if (!map) throw new Error('The document is not set out.');
  const polylines = entities.filter(({ type }) => type === 'LWPOLYLINE');
  const lines = entitiesOf(document, 'line');
  expect(polylines).toHaveLength(lines.length);
  const gaps = lines.flatMap(({ value }, index) => {
    const polyline = polylines[index]!;
    expect(polyline.layer).toBe(LINE_LAYERS[value.line]);
    expect(polyline.shape).toBe(false);
    expect(polyline.vertices).toHaveLength(value.points.length);
    return value.points.flatMap((at, vertex) => {
      const [offset, elevation] = map.toSection(sheetPx(...at));
      const { x, y } = polyline.vertices![vertex]!;
      return [Math.abs(x - offset), Math.abs(y - elevation)];
    });
  });
  return Math.max(...gaps);
}

describe('the traces as DXF', () => {
  const document = finishedDocument();

  it('are refused with what to do while the section is not set out', () => {
    const entities = Object.fromEntries(
      Object.entries(document.entities).filter(([, { value }]) => value.kind !== 'knownPoint'),
    );
    const bare = { ...document, entities };
    expect(() => dxfText(bare, readNet(bare))).toThrowError(AppError);
    expect(() => dxfText(bare, readNet(bare))).toThrowError(/Set it out/);
  });

  it('lie on a layer for each kind, where the engine has them to a millionth', () => {
    const { entities, layers } = drawn(document);
    expect(worstOf(document, entities)).toBeLessThan(1e-6);
    for (const name of [...Object.values(LINE_LAYERS), 'Known points', 'Reading points', 'Profiles', 'Soils'])
      expect(layers).toContain(name);
  });

  it('say their unit: metres, or feet for a net in feet', () => {
    expect(drawn(document).header.$INSUNITS).toBe(6);
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const feet = exactNetDocument(net, { pxPerUnit, unitSystem: 'US', lengthFactor: 1 / 0.3048 });
    expect(drawn(feet).header.$INSUNITS).toBe(2);
  });

  it('have each reading point where the schedule has it, with its name and total head', () => {
    const reading = readNet(document);
    const { entities } = read(dxfText(document, reading));
    const on = entities.filter(({ layer }) => layer === 'Reading points');
    const [marks, texts] = ['POINT', 'TEXT'].map((type) => on.filter((each) => each.type === type));
    expect(marks).toHaveLength(reading.points.length);
    reading.points.forEach((point, index) => {
      const { x, y } = marks![index]!.position!;
      expect(Math.abs(x - point.offset!)).toBeLessThan(1e-6);
      expect(Math.abs(y - point.elevation!)).toBeLessThan(1e-6);
      expect(texts![index]!.text).toBe(`${point.name}  h = ${point.totalHead!.toFixed(2)}`);
    });
  });

  it('of a drawing with two scales are at one: the exaggeration is taken out', () => {
    // The same net on a sheet that is stretched upwards two and a half times.
    const stretched = structuredClone(upright());
    for (const { value } of Object.values(stretched.entities)) {
      if (value.kind === 'setOut') value.scales = 'plottingExaggeration';
      if (value.kind === 'line') value.points = value.points.map(([x, y]) => [x, 2.5 * y]);
      if (value.kind === 'knownPoint') value.at = [value.at[0], 2.5 * value.at[1]];
      if (value.kind === 'readingPoint' && value.place.on === 'sheet')
        value.place.at = [value.place.at[0], 2.5 * value.place.at[1]];
    }
    const { entities } = drawn(stretched);
    expect(worstOf(stretched, entities)).toBeLessThan(1e-6);
    const plain = drawn(upright()).entities.filter(({ type }) => type === 'LWPOLYLINE');
    const natural = entities.filter(({ type }) => type === 'LWPOLYLINE');
    for (const [index, { vertices }] of natural.entries())
      for (const [vertex, { x, y }] of (vertices ?? []).entries()) {
        const expected = plain[index]!.vertices![vertex]!;
        expect(Math.max(Math.abs(x - expected.x), Math.abs(y - expected.y))).toBeLessThan(1e-6);
      }
  });

  it('keep names on one line and free of the codes that CAD programs run', () => {
    const named = structuredClone(document);
    const [first] = entitiesOf(named, 'readingPoint');
    first!.value.name = 'S1\r\n0\r\nEOF %%u ^J';
    const { entities } = drawn(named);
    const text = entities.find(({ type, layer }) => type === 'TEXT' && layer === 'Reading points')!.text;
    expect(text).toMatch(/^S1 0 EOF % %u \^ J {2}h = /);
  });

  function upright(): FlowNetDocument {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const made = exactNetDocument(net, {
      pxPerUnit,
      turnDeg: 0,
      readings: [{ at: net.placeAt(3, 1), clicked: true }],
    });
    expect(singleOf(made, 'setOut')?.value.scales).toBe('equal');
    return made;
  }
});
