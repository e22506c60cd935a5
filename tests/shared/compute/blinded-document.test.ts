import { expect, it } from 'vitest';
import * as z from 'zod/mini';
import { blankReading } from '#shared/compute/blank-reading.ts';
import { blindedDocument } from '#shared/compute/blinded-document.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import { entitiesOf, flowNetDocument, singleOf } from '#shared/contract/document.ts';
import { netReading } from '#shared/contract/reading.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const told = withLines(finishedDocument(), 'equipotential', (value, index) =>
  index === 0 ? { ...value, name: 'h = 47.111', head: 47.111 } : value,
);

it('holds the lines and the calibration, and nothing that was read, counted or named', () => {
  const blind = blindedDocument(told);
  expect(z.parse(flowNetDocument, blind)).toEqual(blind);
  const places = (of: typeof told) => entitiesOf(of, 'line').map(({ id, value }) => [id, value.points]);
  expect(places(blind)).toEqual(places(told));
  expect(fittedMap(blind)?.linear).toEqual(fittedMap(told)?.linear);
  expect(singleOf(blind, 'waterLevels')?.value).toMatchObject({
    headwater: singleOf(told, 'waterLevels')?.value.headwater,
    source: '',
  });
  expect(entitiesOf(blind, 'readingPoint')).toEqual([]);
  expect(entitiesOf(blind, 'profile')).toEqual([]);
  expect(singleOf(blind, 'netCount')?.value).toMatchObject({ drops: null, channels: null });
  expect(singleOf(blind, 'permeability')?.value).toMatchObject({ k: null, source: '' });
  expect(JSON.stringify(blind)).not.toContain('47.111');
});

it('is shown with a reading that tells the calibration only', () => {
  const { setOut } = readNet(told);
  const blank = blankReading(setOut);
  expect(z.parse(netReading, blank)).toEqual(blank);
  expect(blank.setOut).toBe(setOut);
  expect([blank.lines, blank.points, blank.profiles, blank.exits]).toEqual([[], [], [], []]);
});
