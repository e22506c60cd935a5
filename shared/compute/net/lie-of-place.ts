import type { SheetPx } from '#shared/compute/frames.ts';
import { distanceToRing, ringContains } from '#shared/compute/geometry/polygon.ts';
import { distanceToPolyline } from '#shared/compute/geometry/polyline.ts';
import { liesAbovePhreatic } from '#shared/compute/net/above-phreatic.ts';
import { stripAt } from '#shared/compute/net/hand-rule.ts';
import type { HeadOfLine } from '#shared/compute/net/net-heads.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Why there is no figure at a place. */
export type Withheld = { readonly in: 'nothing'; readonly code: string; readonly text: string };

/** Where in a net a place lies: between two lines, above the phreatic line, or where nothing is read. */
export type LieOfPlace =
  | {
      readonly in: 'strip';
      readonly strip: Strip;
      readonly before: HeadOfLine;
      readonly after: HeadOfLine;
      readonly onFreeFace: boolean;
    }
  | { readonly in: 'air' }
  | Withheld;

export const CUT_OFF: Withheld = {
  in: 'nothing',
  code: 'acrossWall',
  text: 'A wall, or a maze of walls, lies between the point and its neighbouring lines. Check the boundary there.',
};

/** Where a place, in working pixels, lies in an ordered net. */
export function lieOf(at: SheetPx, ground: ReadingGround): LieOfPlace {
  if (liesAbovePhreatic(at, ground.map.up, ground.phreaticLines, ground.faces, ground.slack)) {
    return { in: 'air' };
  }
  if (isInsideBody(at, ground)) {
    return nothing(
      'acrossWall',
      'The point lies inside an impervious body. No water flows there, and nothing is read.',
    );
  }
  const strip = stripAt(ground.strips, at, ground.slack);
  if (strip === null) {
    return nothing('outsideNet', 'The point lies outside the traced net. Nothing is read beyond the lines.');
  }
  const before = ground.heads.byId.get(strip.before);
  const after = ground.heads.byId.get(strip.after);
  if (before === undefined || after === undefined) {
    return nothing(
      'linesOutOfOrder',
      'The lines beside the point are not in order. Check the equipotentials there.',
    );
  }
  const onFreeFace = ground.freeFaces.some((face) => distanceToPolyline(face, at[0], at[1]) <= ground.slack);
  return { in: 'strip', strip, before, after, onFreeFace };
}

function nothing(code: string, text: string): Withheld {
  return { in: 'nothing', code, text };
}

/** A point on the outline itself, to the accuracy of tracing, is read from outside: there the water presses. */
function isInsideBody([x, y]: SheetPx, { bodies, slack }: ReadingGround): boolean {
  return bodies.some((body) => ringContains(body, x, y) && distanceToRing(body, x, y) > slack);
}
