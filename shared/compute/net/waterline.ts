import { makeFinding } from '#shared/compute/findings.ts';
import { distanceToPolyline, firstOf, lastOf, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import { elevationAt } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

/**
 * Compares the headwater with the waterline that was traced: the place where the phreatic line starts at the submerged
 * face. `headwater` and `tolerance` in the document's length unit. A net holds for the water level for which it was
 * drawn, so a departure beyond the tolerance withholds every reading; a section without a phreatic line is confined
 * and takes any headwater that covers its bed. `levelUnit`: unit of an elevation with its datum, for words.
 */
export function checkWaterline(
  lines: readonly NetLine[],
  map: SectionMap,
  headwater: number,
  tolerance: number,
  levelUnit: string,
): Finding[] {
  const faces = linesOfKind(lines, 'submergedFace').filter(
    ({ value }) => value.water === 'headwater' && value.head === null,
  );
  const phreatics = linesOfKind(lines, 'phreaticLine');
  const starts = phreatics.map((line) => ({ line, at: startOf(line, faces) }));
  if (starts.length === 0) return questionFaces(faces, map, headwater, tolerance, levelUnit);
  const highest = starts
    .map((start) => ({ ...start, elevation: elevationAt(map, ...start.at) }))
    .sort((a, b) => b.elevation - a.elevation)[0]!;
  if (Math.abs(highest.elevation - headwater) <= tolerance) return [];
  return [
    makeFinding(
      'wrong',
      'headwaterMoved',
      `The phreatic line starts at elevation ${fixedText(highest.elevation, 2)} ${levelUnit}, but the headwater is ${fixedText(headwater, 2)} ${levelUnit}. A net holds for the level it was drawn for: trace it again for this headwater, or correct the level.`,
      { cell: 'headwater', entityIds: [highest.line.id], at: highest.at },
    ),
  ];
}

/** Without a phreatic line a face that sticks out of the water may have been traced to another waterline. */
function questionFaces(
  faces: readonly NetLine[],
  map: SectionMap,
  headwater: number,
  tolerance: number,
  levelUnit: string,
): Finding[] {
  return faces.flatMap((face) => {
    const top = verticesOf(face.shape)
      .map((at) => ({ at, elevation: elevationAt(map, ...at) }))
      .reduce((high, vertex) => (vertex.elevation > high.elevation ? vertex : high));
    if (top.elevation <= headwater + tolerance) return [];
    return [
      makeFinding(
        'question',
        'faceSticksOut',
        `The submerged face is traced up to elevation ${fixedText(top.elevation, 2)} ${levelUnit} and is cut off at the headwater, ${fixedText(headwater, 2)} ${levelUnit}. If it was traced to the waterline, the net holds for that level.`,
        { cell: 'headwater', entityIds: [face.id], at: top.at },
      ),
    ];
  });
}

/** The end of the phreatic line that lies nearer to the submerged face. */
function startOf(line: NetLine, faces: readonly NetLine[]): Pair {
  const first = firstOf(line.shape);
  const last = lastOf(line.shape);
  const distance = (at: Pair) => Math.min(...faces.map((face) => distanceToPolyline(face.shape, ...at)));
  return distance(first) <= distance(last) ? first : last;
}
