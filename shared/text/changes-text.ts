import type { UnitSystem } from '#shared/contract/document.ts';
import type { ChangedFact, ComparedPoint, RevisionComparison } from '#shared/contract/revision-comparison.ts';
import { NO_FIGURE, plainText, signedText } from './number-text.ts';
import { DECIMALS, unitNames } from './unit-text.ts';

/** Facts told one by one; beyond that their number is told. */
const MOST_FACTS = 12;

/** What changed from the revision before, in sentences, the lines first and the pressures last. */
export function changesText(comparison: RevisionComparison, unitSystem: UnitSystem): string[] {
  const { lines, points, inputs, quantities, figures } = comparison;
  const told = [
    countsText('line', lines),
    countsText('reading point', points),
    ...factsText([...inputs, ...quantities]),
  ].filter((text) => text !== null);
  const pressure = pressureText(figures, unitSystem);
  return told.length === 0 ? ['No line, point or input changed.', ...pressure] : [...told, ...pressure];
}

const CHANGES = ['changed', 'added', 'removed'] as const;

function countsText(
  what: string,
  changes: ReadonlyArray<{ change: (typeof CHANGES)[number] }>,
): string | null {
  const parts = CHANGES.flatMap((change) => {
    const count = changes.filter((each) => each.change === change).length;
    return count === 0 ? [] : [`${count} ${count === 1 ? what : `${what}s`} ${change}`];
  });
  return parts.length === 0 ? null : `${parts.join(', ')}.`;
}

function factsText(facts: readonly ChangedFact[]): string[] {
  const told = facts.slice(0, MOST_FACTS).map(changedFactText);
  const more = facts.length - told.length;
  return more > 0 ? [...told, `And ${more} more.`] : told;
}

/** A fact as it was and as it is. */
export const changedFactText = ({ label, before, after }: ChangedFact) =>
  `${label}: ${factValue(before)} before, now ${factValue(after)}.`;

const factValue = (value: ChangedFact['before']) =>
  typeof value === 'number' ? plainText(value, 6) : value === null || value === '' ? 'not given' : value;

function pressureText(figures: readonly ComparedPoint[], unitSystem: UnitSystem): string[] {
  const widest = figures.reduce<ComparedPoint | null>(
    (most, each) => (sizeOf(each) > (most ? sizeOf(most) : 0) ? each : most),
    null,
  );
  if (widest === null) return figures.length === 0 ? [] : ['No pore pressure changed.'];
  const { difference } = widest.porePressure;
  const text = signedText(difference, DECIMALS[unitSystem].pressure);
  return [
    `The pore pressure changes most at ${widest.name || NO_FIGURE}: ${text} ${unitNames(unitSystem).pressure}.`,
  ];
}

const sizeOf = ({ porePressure }: ComparedPoint) => Math.abs(porePressure.difference ?? 0);
