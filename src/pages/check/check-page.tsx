import { useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useParams } from 'react-router-dom';
import { ButtonLink } from '#client/components/button.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { SheetView } from '#client/features/desk/components/sheet-view.tsx';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { blindQuery } from '#client/features/revisions/api/blind-queries.ts';
import { revisionListQuery, revisionQuery } from '#client/features/revisions/api/revision-queries.ts';
import { BlindBeside } from '#client/features/revisions/components/blind-beside.tsx';
import { CheckList } from '#client/features/revisions/components/check-list.tsx';
import { CheckWork } from '#client/features/revisions/components/check-work.tsx';
import { DecisionPanel } from '#client/features/revisions/components/decision-panel.tsx';
import { FiguresChecked } from '#client/features/revisions/components/figures-checked.tsx';
import { RecordFacts } from '#client/features/revisions/components/record-facts.tsx';
import { ReviewRecord } from '#client/features/revisions/components/review-record.tsx';
import { RevisionChanges } from '#client/features/revisions/components/revision-changes.tsx';
import { RevisionHistory } from '#client/features/revisions/components/revision-history.tsx';
import { StayedOpenList } from '#client/features/revisions/components/stayed-open.tsx';
import { CalculationSheetPanel } from '#client/features/sheets/components/calculation-sheet-panel.tsx';
import { paths } from '#client/lib/paths.ts';
import { useMedia } from '#client/lib/use-media.ts';
import { NARROW_QUERY } from '#client/lib/width-queries.ts';
import { calculationSheetText } from '#client/text/calculation-sheet.ts';
import { commonText } from '#client/text/common.ts';
import { deskPageText } from '#client/text/desk-page.ts';
import { checkText as text } from '#client/text/revisions.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { AppFrame } from '../app-frame.tsx';
import { NetNotes } from '../desk/net-notes.tsx';
import { BlindPage } from './blind-page.tsx';
import { CheckGrid, type CheckPane } from './check-grid.tsx';
import { CheckTables } from './check-tables.tsx';
import { FrozenTitleBlock } from './frozen-title-block.tsx';
import { useCheckLive } from './use-check-live.ts';
import { useFrozenNotes } from './use-frozen-notes.ts';
import { useRevisionBefore } from './use-revision-before.ts';

/** The reviewer's view of a revision: the frozen record, and apart from it what is worked out when that is asked for. */
export function CheckPage() {
  const { revisionId = '' } = useParams();
  const { data: blind } = useSuspenseQuery(blindQuery(revisionId));
  return blind.view ? (
    <BlindPage key={revisionId} view={blind.view} />
  ) : (
    <OpenCheck key={revisionId} revisionId={revisionId} />
  );
}

function OpenCheck({ revisionId }: { revisionId: string }) {
  const { data: revision } = useSuspenseQuery(revisionQuery(revisionId));
  return (
    <CheckWork revision={revision}>
      <Check revision={revision} />
    </CheckWork>
  );
}

function Check({ revision }: { revision: RevisionDto }) {
  const { payload, sheet, summary } = revision;
  const narrow = useMedia(NARROW_QUERY);
  const [pane, setPane] = useState<CheckPane>('sheet');
  const store = useFrozenStore(revision);
  const notes = useFrozenNotes(revision, store);
  const history = useQuery(revisionListQuery(payload.netId)).data ?? [summary];
  const since = useRevisionBefore(revision, history, store);
  useCheckLive(revision);
  const section = sectionLabel(payload.section);
  const drawing = deskPageText.drawingRevision(
    payload.drawing.number || deskPageText.untitledDrawing,
    payload.drawing.revision,
  );
  return (
    <div className="flex h-dvh flex-col overflow-hidden">
      <title>{`${text.heading(summary.label)}, ${section} – ${commonText.product}`}</title>
      <AppFrame
        trail={[
          { label: payload.dam.name, to: paths.dam(payload.dam.id) },
          { label: drawing, to: paths.drawing(payload.drawing.id, payload.sheet.pageNumber) },
          { label: `${section}, ${payload.netName}`, to: paths.net(payload.netId) },
          { label: text.crumb(summary.label) },
        ]}
        end={
          <>
            <ButtonLink to={paths.revisionSheet(summary.id)}>{calculationSheetText.printView}</ButtonLink>
            <ButtonLink to={paths.net(payload.netId)}>{text.openNet}</ButtonLink>
          </>
        }
      >
        <CheckGrid
          heading={`${text.heading(summary.label)}, ${section}`}
          narrow={narrow}
          pane={pane}
          onPane={setPane}
          sheet={
            <SheetView
              store={store}
              sheet={sheet}
              frame={null}
              notes={notes.balloons}
              label={deskPageText.sheetLabel(section, drawing)}
              className="min-h-0 flex-1"
            />
          }
          schedule={<CheckTables payload={payload} store={store} onSheet={() => setPane('sheet')} />}
          notes={
            <NetNotes
              netId={payload.netId}
              damId={payload.dam.id}
              notes={notes}
              can={revision.can}
              onSheet={() => setPane('sheet')}
            />
          }
          block={<FrozenTitleBlock revision={revision} />}
          check={
            <>
              <BlindBeside revision={revision} />
              <FiguresChecked />
              <CheckList />
              <DecisionPanel revision={revision} />
              <ReviewRecord review={revision.review} />
              <ProblemNote error={since.error} />
              {since.before && since.comparison ? (
                <RevisionChanges
                  comparison={since.comparison}
                  label={since.before.label}
                  unitSystem={payload.document.unitSystem}
                  drawnOver={since.drawnOver}
                  onDrawnOver={since.setDrawnOver}
                />
              ) : null}
              <StayedOpenList stayedOpen={payload.stayedOpen} />
              <RecordFacts revision={revision} />
              <CalculationSheetPanel netId={payload.netId} revisionId={summary.id} />
              <section aria-labelledby="history" className="border-t border-rule px-3 py-2">
                <h2 id="history" className="m-0 text-base font-bold">
                  {text.historyTitle}
                </h2>
                <RevisionHistory
                  revisions={history}
                  presentId={summary.id}
                  compareWith={(id) =>
                    paths.compare(
                      payload.dam.id,
                      { kind: 'revision', id },
                      { kind: 'revision', id: summary.id },
                    )
                  }
                />
              </section>
            </>
          }
        />
      </AppFrame>
    </div>
  );
}

/** A desk that only shows: the frozen document with the frozen reading. */
function useFrozenStore({ payload }: RevisionDto) {
  return useMemo(
    () => createDeskStore({ document: payload.document }, { reading: payload.reading, readOnly: true }),
    [payload],
  );
}
