import { makeFinding } from '#shared/compute/findings.ts';
import type { Finding, NetReading, PointReading } from '#shared/contract/reading.ts';

/** What is open at the reading points of a finished net: points without a figure, figures in question, no point at all. */
export function openPoints({ points }: NetReading): Finding[] {
  if (points.length === 0) {
    return [
      makeFinding('question', 'noReadingPoints', 'No reading point is placed, so the schedule is empty.'),
    ];
  }
  return points.flatMap(openAt);
}

function openAt(point: PointReading): Finding[] {
  const name = point.name.trim() === '' ? 'A point without a name' : point.name;
  const about = { entityIds: [point.id], at: point.sheetAt };
  const withheld =
    point.status === 'withheld'
      ? [makeFinding('question', 'pointWithoutFigure', `${name}: ${point.reason?.text ?? ''}`, about)]
      : [];
  return [...withheld, ...point.findings.map((found) => ({ ...found, text: `${name}: ${found.text}` }))];
}
