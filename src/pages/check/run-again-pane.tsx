import type { ReactNode } from 'react';
import { Button } from '#client/components/button.tsx';
import { besideRows } from '#client/features/desk/components/beside-rows.ts';
import { Aside, MarginSection } from '#client/features/desk/components/margin-section.tsx';
import { downloadText } from '#client/lib/download.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { localeStore } from '#client/lib/locale.ts';
import { runAgainText as text } from '#client/text/run-again.ts';
import type { RunAgain } from '#shared/compute/compare-figures/run-again.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { Finding } from '#shared/contract/reading.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { BYTE_ORDER_MARK, csvText } from '#shared/text/csv.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { RunAgainTable } from './run-again-table.tsx';
import type { RunAgainState } from './use-run-again.ts';

interface RunAgainPaneProps {
  payload: RevisionPayload;
  again: RunAgainState;
  views: ReactNode;
}

/** The buttons stand beside the names of the tables, as on the desk. */
const SMALL = 'px-2 py-[2px] text-sm';

/** A frozen revision computed with the present engine, beside its record, which stays as it was. */
export function RunAgainPane({ payload, again, views }: RunAgainPaneProps) {
  const { label, engineVersion } = payload;
  const working = again.state === 'working';
  return (
    <section aria-label={text.views.again} className="h-full overflow-auto bg-film">
      <div className="flex flex-col gap-2 px-2.5 py-2">
        <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
          <div className="mr-auto">{views}</div>
          <span role="status">{working ? text.working : ''}</span>
          {working ? (
            <Button look="quiet" className={SMALL} onClick={again.cancel}>
              {text.cancel}
            </Button>
          ) : (
            <Button look={again.result ? 'quiet' : 'plain'} className={SMALL} onClick={again.run}>
              {again.result ? text.runAnew : text.run}
            </Button>
          )}
          {again.result && !working ? (
            <Button look="quiet" className={SMALL} onClick={() => download(payload, again.result!)}>
              {text.download}
            </Button>
          ) : null}
        </div>
        <Aside>
          {text.lead(label, engineVersion, ENGINE_VERSION)} {text.notStored}
        </Aside>
        {again.state === 'failed' ? (
          <p role="alert" className="m-0 bg-doubt p-2 text-wrong">
            {text.failed}
          </p>
        ) : null}
        {again.result && !working ? <Result payload={payload} result={again.result} /> : null}
      </div>
    </section>
  );
}

function Result({ payload, result }: { payload: RevisionPayload; result: RunAgain }) {
  const { all, differ, shown } = result.counts;
  if (all === 0) return <p className="m-0">{text.noFigures}</p>;
  return (
    <>
      <p role="status" className={`m-0 font-semibold ${differ === 0 ? 'text-good' : 'text-attention'}`}>
        {differ === 0 ? text.allEqual(all) : text.someDiffer(differ, all)}
      </p>
      {shown > 0 ? <Aside>{text.roundedEqual(shown)}</Aside> : null}
      <Findings title={text.newFindings} findings={result.newFindings} />
      <Findings title={text.goneFindings} findings={result.goneFindings} />
      <RunAgainTable
        result={result}
        units={payload.document}
        engines={[payload.engineVersion, ENGINE_VERSION]}
      />
    </>
  );
}

function Findings({ title, findings }: { title: string; findings: readonly Finding[] }) {
  if (findings.length === 0) return null;
  return (
    <MarginSection title={title}>
      <ul className="m-0 list-disc pl-5">
        {findings.map(({ code, entityIds, text: said }) => (
          <li key={`${code} ${entityIds.join(' ')} ${said}`}>{sentenceText(said)}</li>
        ))}
      </ul>
    </MarginSection>
  );
}

function download(payload: RevisionPayload, result: RunAgain): void {
  const name = cleanFileName(text.fileName(payload.drawing.number || 'net', payload.label));
  const { figure, frozen, now, difference } = text.head;
  const heads = { figure, one: frozen(payload.engineVersion), other: now(ENGINE_VERSION), difference };
  const rows = besideRows(result.groups, payload.document, heads);
  downloadText(BYTE_ORDER_MARK + csvText(rows, localeStore.getState().mark), name, 'text/csv;charset=utf-8');
}
