import type { RevisionFacts } from '#server/mail/templates/checking-mails.ts';
import type { Figures } from '#server/mail/templates/letter.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { fixedText, plusMinusText } from '#shared/text/number-text.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';

/** Rows of figures in a mail; a longer schedule is for the page. */
const MOST_ROWS = 30;

/** What the letters about a revision say it is of. */
export function revisionFacts({ dam, drawing, section, netName, label }: RevisionPayload): RevisionFacts {
  const { number, title, revision } = drawing;
  return {
    damName: dam.name,
    drawing: [number || title || 'drawing without a number', revision && `rev ${revision}`]
      .filter(Boolean)
      .join(' '),
    section: sectionLabel(section),
    netName,
    revision: label,
  };
}

/** The frozen schedule as a letter shows it; null without reading points. */
export function scheduleFigures({ document, reading }: RevisionPayload): Figures | null {
  if (reading.points.length === 0) return null;
  const { unitSystem, datum } = document;
  const decimals = DECIMALS[unitSystem];
  const rows = reading.points
    .slice(0, MOST_ROWS)
    .map((point) => [
      point.name || 'unnamed',
      fixedText(point.elevation, decimals.elevation),
      fixedText(point.dropsLost, decimals.drops),
      plusMinusText(point.totalHead, point.totalHeadPlusMinus, decimals.head),
      pressureText(point, decimals.pressure),
    ]);
  const more = reading.points.length - rows.length;
  const elevation = elevationUnit(unitSystem, datum);
  return {
    heads: [
      'Point',
      `Elevation, ${elevation}`,
      'Drops lost',
      `Total head, ${elevation}, ± at 95 %`,
      `Pore pressure, ${unitNames(unitSystem).pressure}, ± at 95 %`,
    ],
    rows: more > 0 ? [...rows, [`and ${more} more`, '', '', '', '']] : rows,
  };
}

function pressureText(point: PointReading, decimals: number): string {
  const { status, porePressure, porePressurePlusMinus } = point;
  if (status === 'withheld') return 'not read';
  if (status === 'abovePhreatic') return `${fixedText(porePressure, decimals)}, above the phreatic line`;
  return plusMinusText(porePressure, porePressurePlusMinus, decimals);
}
