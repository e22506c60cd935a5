import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { entitiesOf, type LineKind, type SheetPoint, type TracedLine } from '#shared/contract/document.ts';
import { withAdded } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const document = exactNetDocument(net, { pxPerUnit, jitterPx: 1.5 });
const pointsOf = (kind: LineKind): SheetPoint[][] =>
  entitiesOf(document, 'line')
    .filter(({ value }) => value.line === kind)
    .map(({ value }) => value.points);

/** What is found about soils once soil boundaries are traced through these places. */
function soilsIn(...boundaries: SheetPoint[][]) {
  const lines = boundaries.map(
    (points): TracedLine => ({
      kind: 'line',
      origin: 'traced',
      line: 'soilBoundary',
      name: '',
      points,
      finished: true,
      water: null,
      head: null,
      drops: null,
    }),
  );
  return readNet(withAdded(document, ...lines)).findings.filter((found) => found.code === 'severalSoils');
}

describe('a soil boundary', () => {
  // From the middle of the second equipotential to the middle of the seventh.
  const across = [1, 6].map((i) => {
    const points = pointsOf('equipotential')[i]!;
    return points[points.length >> 1]!;
  });

  it('within the net questions the seepage, which counts one permeability', () => {
    const [found] = soilsIn(across);
    expect(found).toMatchObject({ weight: 'question', cell: 'seepage' });
    expect(found?.text).toContain('the seepage counts one permeability for all of it');
    expect(found?.at).not.toBeNull();
  });

  it('is one within the net too when it runs along an equipotential, as the side of a core may', () => {
    expect(soilsIn(pointsOf('equipotential')[4]!.map(([x, y]): SheetPoint => [x + 3, y]))).toHaveLength(1);
  });

  it('makes one question together with others, which names them all', () => {
    const found = soilsIn(across, [...across].reverse());
    expect(found.map((each) => each.entityIds.length)).toEqual([2]);
  });

  it('below the net, along its base or along the face is nothing to the seepage', () => {
    const base = pointsOf('impervious')[0]!;
    const face = pointsOf('submergedFace')[0]!;
    expect(soilsIn(face)).toEqual([]);
    expect(soilsIn(base)).toEqual([]);
    expect(soilsIn(base.map(([x, y]): SheetPoint => [x, y + 150]))).toEqual([]);
  });
});
