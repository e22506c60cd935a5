import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import { differs, type FigureBeside, figuresBeside, type GroupBeside } from './figures-beside.ts';
import { figuresOf } from './net-figures.ts';

/** A frozen reading beside one of the same document by another engine. */
export type RunAgain = {
  /** What has figures in either reading, in the order of the record. */
  readonly groups: readonly GroupBeside[];
  readonly counts: {
    readonly all: number;
    /** Not the same, but equal to the last digit shown. */
    readonly shown: number;
    readonly differ: number;
  };
  /** What only the one reading says. */
  readonly newFindings: readonly Finding[];
  readonly goneFindings: readonly Finding[];
};

/**
 * Sets the reading that was frozen with a document beside a later one of the same document, figure by figure, frozen
 * first. What neither has is left out; a place that one engine reads and the other withholds differs. Figures are
 * taken as both readings have them. Pure and total.
 */
export function besideFrozen(document: FlowNetDocument, frozen: NetReading, now: NetReading): RunAgain {
  const results = (reading: NetReading) =>
    // The inputs are the document's, and the same by the nature of the thing.
    figuresOf({ document, reading }).filter(({ kind }) => kind !== 'levels');
  const options = { unitSystem: document.unitSystem, sameDatum: true };
  const groups = figuresBeside(results(frozen), results(now), options)
    .map((group) => ({ ...group, figures: group.figures.filter(hasAny) }))
    .filter((group) => group.figures.length > 0);
  const figures = groups.flatMap((group) => group.figures);
  return {
    groups,
    counts: {
      all: figures.length,
      shown: figures.filter((each) => !differs(each) && !isSame(each)).length,
      differ: figures.filter(differs).length,
    },
    newFindings: without(allFindings(now), allFindings(frozen)),
    goneFindings: without(allFindings(frozen), allFindings(now)),
  };
}

const hasAny = ({ values, plusMinuses }: FigureBeside) => values !== 'none' || plusMinuses !== 'none';
const isSame = ({ values, plusMinuses }: FigureBeside) => values !== 'shown' && plusMinuses !== 'shown';

const allFindings = ({ findings, points }: NetReading) => [
  ...findings,
  ...points.flatMap((point) => point.findings),
];

/** By what they are about: engines may word the same finding differently. */
function without(findings: readonly Finding[], others: readonly Finding[]): Finding[] {
  const keyOf = ({ code, entityIds }: Finding) => `${code} ${[...entityIds].sort().join(' ')}`;
  const known = new Set(others.map(keyOf));
  return findings.filter((finding) => !known.has(keyOf(finding)));
}
