import { describe, expect, it } from 'vitest';
import { parseNetFile } from '#server/services/net-file.ts';
import { FLOW_NET_VERSION } from '#shared/contract/document.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';
import { FIRST_DOCUMENT_TEXT, firstDocument } from '#tests/support/first-version/first-version.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const text = JSON.stringify(finishedDocument(), null, 2);
const faultsOf = (source: string) => {
  const parsed = parseNetFile(source);
  return 'faults' in parsed ? parsed.faults : [];
};
/** Line of the first match, counted by hand. */
const lineWith = (source: string, part: string) =>
  source.split('\n').findIndex((line) => line.includes(part)) + 1;

describe('the text of a net file', () => {
  it.each(['', '  ', '{', '{"a": 1,}', '{} // a note', '[]', 'null', '"net"'])('%j is none', (source) => {
    expect(faultsOf(source).length).toBeGreaterThan(0);
  });

  it('of another format or a later version is refused with the field', () => {
    expect(faultsOf(text.replace('tracehead/flow-net', 'other')).map(({ field }) => field)).toEqual([
      'format',
    ]);
    const version = `"version": ${FLOW_NET_VERSION}`;
    const later = faultsOf(text.replace(version, `"version": ${FLOW_NET_VERSION + 1}`));
    expect(later).toMatchObject([{ line: lineWith(text, version), field: 'version' }]);
  });

  it('has each fault told with its line and field', () => {
    const wrong = text
      .replace(/"gammaW": [\d.]+/, '"gammaW": -1')
      .replace('"offsetsGrow": ', '"offsetsGrew": ');
    expect(faultsOf(wrong).map(({ line, field }) => [line, field.split('.').at(-1)])).toEqual(
      expect.arrayContaining([[lineWith(wrong, '"gammaW"'), 'gammaW']]),
    );
    expect(faultsOf(wrong).some(({ field }) => field.endsWith('offsetsGrow'))).toBe(true);
  });

  it('may not give one field twice', () => {
    const twice = text.replace('"name":', '"datum": "x",\n  "name":');
    expect(faultsOf(twice)).toMatchObject([{ message: 'is given twice' }]);
  });

  it('may not hold an entity under the id of another', () => {
    const { entities, ...frame } = finishedDocument();
    const [first, second] = Object.keys(entities) as [string, string];
    const swapped = { ...entities, [first]: entities[second], [second]: entities[first] };
    const source = JSON.stringify({ ...frame, entities: swapped }, null, 2);
    expect(faultsOf(source).map(({ field }) => field)).toEqual([
      `entities.${first}.id`,
      `entities.${second}.id`,
    ]);
  });

  it('may not hold one id in capitals and in small letters', () => {
    const { entities, ...frame } = finishedDocument();
    const [id, entity] = Object.entries(entities).find(([each]) => each !== each.toUpperCase()) ?? [];
    const shifted = id!.replace(/^0193/, 'abcd');
    const both = Object.fromEntries(
      [shifted, shifted.toUpperCase()].map((each) => [each, { ...entity!, id: each }]),
    );
    const source = JSON.stringify({ ...frame, entities: both });
    expect(faultsOf(source)).toMatchObject([{ message: 'is the id of another entity too' }]);
  });

  it('may not hold two of what a net has one of', () => {
    const { entities, ...frame } = finishedDocument();
    const levels = Object.values(entities).find(({ value }) => value.kind === 'waterLevels')!;
    const id = '01930000-0000-7000-8000-00000000ffff';
    const source = JSON.stringify({ ...frame, entities: { ...entities, [id]: { ...levels, id } } }, null, 2);
    expect(faultsOf(source)).toMatchObject([
      { field: `entities.${id}.value.kind`, message: 'is a second waterLevels, and a net has one' },
    ]);
  });

  it('is read with a byte order mark and with line ends of any system', () => {
    expect(parseNetFile(`\uFEFF${text.replaceAll('\n', '\r\n')}`)).toEqual({ document: finishedDocument() });
  });

  it('of version 1 is read in the terms of today', () => {
    const parsed = parseNetFile(FIRST_DOCUMENT_TEXT);
    expect('document' in parsed && parsed.document).toMatchObject(upgradeDocument(firstDocument()) as object);
  });
});
