import { independentText } from '#client/text/independent.ts';
import { type BesideSolution, besideSolution } from '#shared/compute/beside/beside-solution.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import { sectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import type { SectionFailure } from '#shared/compute/independent/section-problem.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** `reading` is that of the document, or null where it is not worked out yet. */
export type IndependentQuestion = {
  readonly document: FlowNetDocument;
  readonly reading: NetReading | null;
};
export type IndependentStage = 'outline' | 'solving' | 'comparing';
export type IndependentAnswer =
  | { readonly state: 'working'; readonly stage: IndependentStage }
  | { readonly state: 'failed'; readonly text: string; readonly at: SheetPoint | null }
  | { readonly state: 'done'; readonly beside: BesideSolution };

const scope = globalThis as unknown as DedicatedWorkerGlobalScope;
const tell = (answer: IndependentAnswer) => scope.postMessage(answer);

scope.onmessage = (event: MessageEvent<IndependentQuestion>) => tell(answerTo(event.data));

function answerTo({ document, reading }: IndependentQuestion): IndependentAnswer {
  tell({ state: 'working', stage: 'outline' });
  const section = sectionOfDocument(document);
  if (!section.ok) return failed(section, document);
  tell({ state: 'working', stage: 'solving' });
  const solution = solveSection(section.problem);
  if (!solution.ok) return failed(solution, document);
  tell({ state: 'working', stage: 'comparing' });
  const beside = besideSolution(document, reading ?? readNet(document), section, solution);
  if (beside === null) return failed(NOT_SET_OUT, document);
  return { state: 'done', beside };
}

const NOT_SET_OUT: Pick<SectionFailure, 'text' | 'at'> = {
  text: independentText.notSetOut,
  at: null,
};

function failed(
  { text, at }: Pick<SectionFailure, 'text' | 'at'>,
  document: FlowNetDocument,
): IndependentAnswer {
  const place = at === null ? undefined : readSetOut(document).map?.toSheet(sectionPt(at[0], at[1]));
  return { state: 'failed', text, at: place === undefined ? null : [place[0], place[1]] };
}
