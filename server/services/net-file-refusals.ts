import { isDeepStrictEqual } from 'node:util';
import { AppError, conflict, invalidInput } from '#server/errors/app-error.ts';
import { entitiesOf, type FlowNetDocument, singleOf, type UnitSystem } from '#shared/contract/document.ts';
import type { NetFileQuestion } from '#shared/contract/net-files.ts';
import type { NetFile } from './net-file.ts';

/** Faults beyond these say nothing new. */
const FAULTS_TOLD = 20;
const UNITS: Record<UnitSystem, string> = { SI: 'SI units (metres)', US: 'US customary units (feet)' };

export interface OpenQuestion {
  code: NetFileQuestion;
  text: string;
}

/** The document of a file. @throws AppError invalid-input with each fault's line and field */
export function documentOf(file: NetFile): FlowNetDocument {
  if ('document' in file) return file.document;
  const errors = file.faults.slice(0, FAULTS_TOLD).map(({ line, field, message }) => ({
    path: field,
    message: `Line ${line}${field ? `, ${field}` : ''}: ${message}`,
  }));
  const more = file.faults.length - errors.length;
  if (more > 0) errors.push({ path: '', message: `There are ${more} more faults.` });
  throw new AppError(
    'invalid-input',
    400,
    'This file cannot be read as a net',
    'The file cannot be read as a net, so no net was made. Mend what is listed, or take the file out of the desk again.',
    { errors },
  );
}

/**
 * Values are kept as they were entered, and known points belong to all nets of a section.
 * @throws AppError invalid-input when the file is in the other unit system
 */
export function refuseOtherUnits(file: FlowNetDocument, unitSystem: UnitSystem): void {
  if (file.unitSystem === unitSystem) return;
  throw invalidInput([
    {
      path: 'unitSystem',
      message: `The file is in ${UNITS[file.unitSystem]}, and this dam in ${UNITS[unitSystem]}. Put it on a dam in the units of the file.`,
    },
  ]);
}

/** @throws AppError invalid-input when the net was traced on a sheet of another size */
export function refuseOtherSheet(file: FlowNetDocument, sheet: { widthPx: number; heightPx: number }): void {
  const { widthPx, heightPx } = file.sheet;
  if (widthPx === sheet.widthPx && heightPx === sheet.heightPx) return;
  throw invalidInput([
    {
      path: 'sheet',
      message: `The net of the file was traced on a sheet of ${widthPx} × ${heightPx} px, and this one has ${sheet.widthPx} × ${sheet.heightPx} px. Choose a section of that sheet, or put the file on an empty sheet from the dam's page.`,
    },
  ]);
}

/** What the file says of elevations and known points otherwise than the place where it is put. */
export function questionsOf(file: FlowNetDocument, place: FlowNetDocument): OpenQuestion[] {
  const questions: OpenQuestion[] = [];
  if (file.datum !== place.datum) {
    const text = `Elevations in the file are above ${datumName(file.datum)}, those of this dam above ${datumName(place.datum)}. They are taken as they stand, without an offset between the two.`;
    questions.push({ code: 'datum', text });
  }
  if (setOutChoice(file, place) === 'differs') {
    const text =
      'This section has known points of its own. They are kept, and those of the file are left out: the lines stay where they are on the sheet, and their offsets and elevations follow the section.';
    questions.push({ code: 'setOut', text });
  }
  return questions;
}

/** Asks what is still open. @throws AppError conflict with the questions */
export function askOpen(questions: readonly OpenQuestion[], accepted: readonly NetFileQuestion[]): void {
  const open = questions.filter(({ code }) => !accepted.includes(code));
  if (open.length === 0) return;
  throw conflict(
    'conflict',
    'The file differs from where it is put',
    'The file differs from where it is put, so no net was made yet. Read what differs and decide.',
    { questions: open },
  );
}

/**
 * Whose set-out holds: the file's where the section has no known points yet; the section's where it has, be they the
 * same as the file's, or others.
 */
export function setOutChoice(file: FlowNetDocument, section: FlowNetDocument): 'file' | 'same' | 'differs' {
  if (entitiesOf(section, 'knownPoint').length === 0) return 'file';
  return isDeepStrictEqual(setOutOf(file), setOutOf(section)) ? 'same' : 'differs';
}

const setOutOf = (document: FlowNetDocument) => [
  singleOf(document, 'setOut')?.value ?? null,
  ...entitiesOf(document, 'knownPoint').map(({ value }) => value),
];

const datumName = (datum: string) => (datum ? `"${datum}"` : 'a datum without a name');
