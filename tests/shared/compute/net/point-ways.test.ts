import { describe, expect, it } from 'vitest';
import { nearestOnPolyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { pointWays } from '#shared/compute/net/point-ways.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const [, apron, pile] = EXACT_NETS;

function tracedFrom(document: FlowNetDocument, id: string, at: Pair): number {
  const value = document.entities[id]!.value;
  const shape = value.kind === 'line' ? polylineOf(value.points) : null;
  return nearestOnPolyline(shape!, at[0], at[1]).distance;
}

const along = (way: readonly Pair[]) =>
  way.slice(1).reduce((sum, [x, y], i) => sum + Math.hypot(x - way[i]![0], y - way[i]![1]), 0);

describe('the ways by which a point is read by hand', () => {
  it('lead from the point to its two neighbouring lines, and their lengths give the fraction', () => {
    const { net, pxPerUnit } = apron!;
    const document = exactNetDocument(net, {
      pxPerUnit,
      readings: [{ at: net.placeAt(3.4, 2.5), clicked: true }],
    });
    const [point] = readNet(document).points;
    const ways = pointWays(document, point!.id)!;
    const { before, after, fraction } = point!.between!;
    expect(ways.toBefore[0]).toEqual(point!.sheetAt);
    expect(ways.toAfter[0]).toEqual(point!.sheetAt);
    // Traces are smoothed by less than the tracing accuracy before they are read.
    expect(tracedFrom(document, before, ways.toBefore.at(-1)!)).toBeLessThan(1.5);
    expect(tracedFrom(document, after, ways.toAfter.at(-1)!)).toBeLessThan(1.5);
    const [near, far] = [along(ways.toBefore), along(ways.toAfter)];
    expect(near / (near + far)).toBeCloseTo(fraction, 9);
    expect(ways.strip.length).toBeGreaterThan(3);
  });

  it('give the fraction close beside a wall too', () => {
    const { net, pxPerUnit } = pile!;
    const document = exactNetDocument(net, {
      pxPerUnit,
      readings: [{ at: net.placeAt(4.6, 0.02), clicked: true }],
    });
    const [point] = readNet(document).points;
    const ways = pointWays(document, point!.id)!;
    const [near, far] = [along(ways.toBefore), along(ways.toAfter)];
    expect(near / (near + far)).toBeCloseTo(point!.between!.fraction, 9);
  });

  it('are those of the transformed section where the ground is anisotropic', () => {
    const { net, pxPerUnit } = apron!;
    const drawn = exactNetDocument(net, {
      pxPerUnit,
      readings: [{ at: net.placeAt(5.3, 3.5), clicked: true }],
    });
    const document = changed(drawn, 'permeability', (value) => ({ ...value, k: 4e-6, kv: 1e-6 }));
    const [point] = readNet(document).points;
    const ways = pointWays(document, point!.id)!;
    const [dx, dy] = [ways.toBefore, ways.toAfter].map((way) => [
      way.at(-1)![0] - way[0]![0],
      way.at(-1)![1] - way[0]![1],
    ]) as [number[], number[]];
    const length = ([x, y]: number[]) => Math.hypot(x! * Math.sqrt(1 / 4), y!);
    expect(length(dx) / (length(dx) + length(dy))).toBeCloseTo(point!.between!.fraction, 2);
  });

  it('are not given for a net that is unfinished', () => {
    const { net, pxPerUnit } = apron!;
    const drawn = exactNetDocument(net, {
      pxPerUnit,
      readings: [{ at: net.placeAt(5.3, 3.5), clicked: true }],
    });
    const { id } = readNet(drawn).points[0]!;
    const document = changed(drawn, 'waterLevels', (value) => ({ ...value, headwater: null }));
    expect(pointWays(document, id)).toBeNull();
  });
});
