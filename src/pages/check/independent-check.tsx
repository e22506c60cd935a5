import type { ReactNode } from 'react';
import { useStore } from 'zustand';
import {
  SolutionQuality,
  SolutionSwitches,
  SolveControl,
} from '#client/features/desk/components/independent-parts.tsx';
import { ExitTable, HeadTable, SeepageTable } from '#client/features/desk/components/independent-tables.tsx';
import { Aside, MarginSection } from '#client/features/desk/components/margin-section.tsx';
import type { DeskChecks } from '#client/features/desk/model/desk-checks.ts';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { independentText } from '#client/text/independent.ts';
import { runAgainText } from '#client/text/run-again.ts';
import type { BesideSolution } from '#shared/compute/beside/beside-solution.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { unitNames } from '#shared/text/unit-text.ts';

interface IndependentCheckProps {
  payload: RevisionPayload;
  store: DeskStore;
  checks: DeskChecks;
  views: ReactNode;
  /** Shows the sheet, where it is not beside the table already. */
  onSheet: () => void;
}

/** The section of a frozen revision solved now, beside the frozen figures and over the frozen traces. */
export function IndependentCheck({ payload, store, checks, views, onSheet }: IndependentCheckProps) {
  const { independent, result } = useStore(checks);
  const lookAt = (at: SheetPoint) => {
    store.lookAt(at);
    onSheet();
  };
  return (
    <section aria-label={independentText.title} className="h-full overflow-auto bg-film">
      <div className="flex flex-col gap-2 px-2.5 py-2">
        <div className="flex flex-wrap items-start gap-x-3 gap-y-1">
          <div className="mr-auto py-1">{views}</div>
          <SolveControl state={independent} again={result !== null} checks={checks} onPlace={lookAt} />
        </div>
        <Aside>
          {runAgainText.independent.notRecord(payload.label, payload.engineVersion, ENGINE_VERSION)}{' '}
          {result ? '' : independentText.lead}
        </Aside>
        {result ? <Result beside={result.beside} payload={payload} checks={checks} onPlace={lookAt} /> : null}
      </div>
    </section>
  );
}

interface ResultProps {
  beside: BesideSolution;
  payload: RevisionPayload;
  checks: DeskChecks;
  onPlace: (at: SheetPoint) => void;
}

/** With room the heads stand beside everything else: they are what is looked at first. */
function Result({ beside, payload: { document, reading }, checks, onPlace }: ResultProps) {
  const { unitSystem } = document;
  const { comparison, exits, hasPermeability } = beside;
  return (
    <div className="@container">
      <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-x-6 gap-y-3 @3xl:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
        <MarginSection title={independentText.heads}>
          <HeadTable comparison={comparison} document={document} reading={reading} />
        </MarginSection>
        <div className="flex flex-col gap-3">
          <SolutionSwitches beside={beside} checks={checks} unit={unitNames(unitSystem).length} />
          <MarginSection title={independentText.seepage}>
            {hasPermeability ? (
              <SeepageTable comparison={comparison} unitSystem={unitSystem} />
            ) : (
              <p className="m-0 text-attention">{independentText.noPermeability}</p>
            )}
          </MarginSection>
          {exits.length > 0 ? (
            <MarginSection title={independentText.exits}>
              <Aside>{independentText.exitsLead}</Aside>
              <ExitTable exits={exits} document={document} onPlace={onPlace} />
            </MarginSection>
          ) : null}
          <SolutionQuality beside={beside} document={document} />
          <Aside>{independentText.lead}</Aside>
        </div>
      </div>
    </div>
  );
}
