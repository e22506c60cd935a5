import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';
import { type CsvCell, csvText } from '#shared/text/csv.ts';
import type { DecimalMark } from '#shared/text/number-text.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

/** A profile as CSV for a stability program: its rows as `profileRows` gives them, with the decimal mark asked for. */
export function profileCsv(
  document: Pick<FlowNetDocument, 'unitSystem' | 'datum'>,
  profile: Pick<ProfileReading, 'name' | 'samples'>,
  mark: DecimalMark = '.',
): string {
  return csvText(profileRows(document, profile), mark);
}

/**
 * A profile as a table for a stability program: one row for each place in the order of the profile, units in the heads of
 * the columns, figures rounded to a tenth of what a reading can mean. Above the phreatic line the
 * pressure is 0 and the remark says so; where nothing could be read the cells are empty, never 0, and the remark says
 * why.
 */
export function profileRows(
  document: Pick<FlowNetDocument, 'unitSystem' | 'datum'>,
  profile: Pick<ProfileReading, 'name' | 'samples'>,
): CsvCell[][] {
  const units = unitNames(document.unitSystem);
  const elevation = elevationUnit(document.unitSystem, document.datum);
  const head: CsvCell[] = [
    'Profile',
    `Distance, ${units.length}`,
    `Offset, ${units.length}`,
    `Elevation, ${elevation}`,
    `Total head, ${elevation}`,
    `Pressure head, ${units.length}`,
    `Pore pressure, ${units.pressure}`,
    'r_u',
    'Remark',
  ];
  return [head, ...profile.samples.map((sample) => rowOf(profile.name, sample))];
}

function rowOf(name: string, sample: ProfileSample): CsvCell[] {
  return [
    name,
    rounded(sample.distance, 3),
    rounded(sample.offset, 3),
    rounded(sample.elevation, 3),
    rounded(sample.totalHead, 3),
    rounded(sample.pressureHead, 3),
    rounded(sample.porePressure, 2),
    rounded(sample.ru, 3),
    [sample.reason?.text, sample.doubtful?.text].filter(Boolean).join(' '),
  ];
}

function rounded(value: number | null, decimals: number): number | null {
  if (value === null) return null;
  const kept = Number(value.toFixed(decimals));
  return kept === 0 ? 0 : kept;
}
