import { useStore } from 'zustand';
import { independentText as text } from '#client/text/independent.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { isSolvedAlike } from '../model/adopt-lines.ts';
import type { DeskChecks, IndependentResult } from '../model/desk-checks.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { AdoptLines } from './adopt-lines.tsx';
import { FormPane } from './form-pane.tsx';
import { SolutionQuality, SolutionSwitches, SolveControl } from './independent-parts.tsx';
import { ExitTable, HeadTable, SeepageTable } from './independent-tables.tsx';
import { Aside, MarginSection } from './margin-section.tsx';

interface IndependentPaneProps {
  store: DeskStore;
  checks: DeskChecks;
  onClose: () => void;
  /** Shows the sheet, where it is not beside the pane already. */
  onSheet: () => void;
}

/** The section solved on its own, beside the traced net: asked for, followed, and laid over the sheet. */
export function IndependentPane({ store, checks, onClose, onSheet }: IndependentPaneProps) {
  const { independent, result } = useStore(checks);
  const revision = useStore(store, (state) => state.documentRevision);
  const document = useStore(store, (state) => state.document);
  const current = result !== null && isSolvedAlike(result.document, document, result.beside.usesPhreaticLine);
  const lookAt = (at: SheetPoint) => {
    store.lookAt(at);
    onSheet();
  };
  return (
    <FormPane title={text.title} onClose={onClose}>
      <Aside>{text.lead}</Aside>
      <SolveControl state={independent} again={result !== null} checks={checks} onPlace={lookAt} />
      {result && result.of !== revision ? (
        <p className="m-0 bg-doubt p-2 text-attention">{text.outOfDate}</p>
      ) : null}
      {result ? <Result {...{ result, store, checks, current }} onPlace={lookAt} /> : null}
    </FormPane>
  );
}

interface ResultProps {
  result: IndependentResult;
  store: DeskStore;
  checks: DeskChecks;
  /** False when the net has changed since. */
  current: boolean;
  onPlace: (at: SheetPoint) => void;
}

function Result({ result: { beside }, store, checks, current, onPlace }: ResultProps) {
  const document = useStore(store, (state) => state.document);
  return (
    <>
      <SolutionSwitches beside={beside} checks={checks} unit={unitNames(document.unitSystem).length} />
      <AdoptLines net={beside.net} store={store} current={current} />
      <MarginSection title={text.heads}>
        <HeadTable comparison={beside.comparison} document={document} />
      </MarginSection>
      <MarginSection title={text.seepage}>
        {beside.hasPermeability ? (
          <SeepageTable comparison={beside.comparison} unitSystem={document.unitSystem} />
        ) : (
          <p className="m-0 text-attention">{text.noPermeability}</p>
        )}
      </MarginSection>
      {beside.exits.length > 0 ? (
        <MarginSection title={text.exits}>
          <Aside>{text.exitsLead}</Aside>
          <ExitTable exits={beside.exits} document={document} onPlace={onPlace} />
        </MarginSection>
      ) : null}
      <SolutionQuality beside={beside} document={document} />
    </>
  );
}
