import { compareText } from '#client/text/compare.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { ComparedNet } from './compared-net.ts';

const text = compareText.cautions;
const normal = (datum: string) => datum.trim().toLowerCase();

/** Whether levels of both may be subtracted: only datums that are named and differ forbid it. */
export function haveSameDatum(one: ComparedNet, other: ComparedNet): boolean {
  const [a, b] = [normal(one.document.datum), normal(other.document.datum)];
  return a === '' || b === '' || a === b;
}

/** What has to be known before two nets are compared, the gravest first. */
export function compareCautions(one: ComparedNet, other: ComparedNet): string[] {
  const [a, b] = [normal(one.document.datum), normal(other.document.datum)];
  const shared = [...new Set([...sharedNames(one.reading), ...sharedNames(other.reading)])];
  const found: Array<[boolean, () => string]> = [
    [isSame(one, other), () => text.same],
    [one.reading.state === 'unfinished', () => text.unfinished(one.name)],
    [other.reading.state === 'unfinished' && !isSame(one, other), () => text.unfinished(other.name)],
    [!haveSameDatum(one, other), () => text.datums(one.document.datum.trim(), other.document.datum.trim())],
    [a !== b && (a === '' || b === ''), () => text.datumMissing],
    [one.section.id !== other.section.id, () => text.sections],
    [one.drawing.id !== other.drawing.id, () => text.drawings],
    [setOutsDiffer(one, other), () => text.setOut],
    [growOpposite(one.reading, other.reading), () => text.opposite],
    [one.engineVersion !== other.engineVersion, () => text.engines(one.engineVersion, other.engineVersion)],
    [shared.length > 0, () => text.sharedNames(shared.join(', '))],
  ];
  return found.flatMap(([holds, said]) => (holds ? [said()] : []));
}

const isSame = (one: ComparedNet, other: ComparedNet) =>
  one.side.kind === other.side.kind && one.side.id === other.side.id;

function sharedNames({ points }: NetReading): string[] {
  const names = points.map(({ name }) => name.trim()).filter((name) => name !== '');
  return names.filter((name, index) => names.indexOf(name) !== index);
}

/** On one sheet a place has one offset and one elevation only while the section is set out alike. */
function setOutsDiffer(one: ComparedNet, other: ComparedNet): boolean {
  if (one.sheet.id !== other.sheet.id || one.section.id !== other.section.id) return false;
  const [a, b] = [one.reading.setOut.unitsPerPx, other.reading.setOut.unitsPerPx];
  const sameUnits = one.document.unitSystem === other.document.unitSystem;
  return sameUnits && a !== null && b !== null && Math.abs(a / b - 1) > 1e-6;
}

function growOpposite(one: NetReading, other: NetReading): boolean {
  const [a, b] = [one.setOut.offsetsGrowLeft, other.setOut.offsetsGrowLeft];
  return a !== null && b !== null && a !== b;
}
