import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { netReading } from '#shared/contract/reading.ts';
import { completeReading } from '#shared/contract/reading-versions.ts';
import { firstReading } from '#tests/support/first-version/first-version.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

describe('a reading frozen by engine 1', () => {
  it('is completed to what is shown today, and every figure in it stays', () => {
    const completed = completeReading(firstReading());
    expect(netReading.parse(completed)).toEqual(completed);
    expect(completed).toMatchObject(firstReading());
  });

  it('is not touched twice', () => {
    const once = completeReading(firstReading());
    expect(completeReading(once)).toEqual(once);
  });

  it('of today is complete as it is', () => {
    const reading = readNet(finishedDocument());
    expect(completeReading(reading)).toEqual(reading);
  });

  it.each([null, 'text', [], 7])('that is none (%j) stays none', (json) => {
    expect(completeReading(json)).toEqual(json);
    expect(netReading.safeParse(completeReading(json)).success).toBe(false);
  });

  it('that lost a figure is not made whole', () => {
    const { points, ...rest } = firstReading();
    expect(netReading.safeParse(completeReading(rest)).success).toBe(false);
    const torn = { ...rest, points: points.map(({ porePressure: _lost, ...point }) => point) };
    expect(netReading.safeParse(completeReading(torn)).success).toBe(false);
  });
});
