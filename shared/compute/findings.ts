import type { Finding, TitleBlockCell } from '#shared/contract/reading.ts';

type FindingDetails = {
  cell?: TitleBlockCell;
  entityIds?: readonly string[];
  at?: readonly [number, number] | null;
};

/** A finding with its optional parts filled in. `at`: base-raster pixels. */
export function makeFinding(
  weight: Finding['weight'],
  code: string,
  text: string,
  details: FindingDetails = {},
): Finding {
  const at = details.at;
  return {
    code,
    weight,
    text,
    cell: details.cell ?? null,
    entityIds: [...(details.entityIds ?? [])],
    at: at && Number.isFinite(at[0]) && Number.isFinite(at[1]) ? [at[0], at[1]] : null,
  };
}

/** True when any of the findings withholds the figures. */
export function withholdsFigures(findings: readonly Finding[]): boolean {
  return findings.some((found) => found.weight === 'missing' || found.weight === 'wrong');
}
