import { useEffect, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { SheetView } from '#client/features/desk/components/sheet-view.tsx';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { SHEET_KINDS } from '#client/features/desk/model/sheet-kinds.ts';
import { BlindForm } from '#client/features/revisions/components/blind-form.tsx';
import { parseKept, type TypedReading } from '#client/features/revisions/components/blind-typed.ts';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { keptLocally } from '#client/lib/kept-locally.ts';
import { paths } from '#client/lib/paths.ts';
import { useMedia } from '#client/lib/use-media.ts';
import { NARROW_QUERY } from '#client/lib/width-queries.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import { deskPageText } from '#client/text/desk-page.ts';
import { checkText } from '#client/text/revisions.ts';
import { blankReading } from '#shared/compute/blank-reading.ts';
import type { BlindView } from '#shared/contract/review.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { AppFrame } from '../app-frame.tsx';
import { PaneSwitch } from '../desk/pane-switch.tsx';
import { useBlindMarks } from './use-blind-marks.ts';
import { usePlacing } from './use-placing.ts';

const PANES = ['reading', 'sheet'] as const;

/** The net alone, for a reviewer who may still read it blind: the server sends no figure of the engineer's. */
export function BlindPage({ view }: { view: BlindView }) {
  const narrow = useMedia(NARROW_QUERY);
  const [pane, setPane] = useState<(typeof PANES)[number]>('reading');
  const store = useMemo(() => netAlone(view), [view]);
  const kept = useKeptReading(view);
  const typed = useStore(kept);
  const placing = usePlacing(store, view, typed, (next) => kept.setState(next, true));
  useBlindMarks(store, view, typed);
  useEffect(() => {
    if (placing.pointId !== null) setPane('sheet');
    else setPane('reading');
  }, [placing.pointId]);
  const section = sectionLabel(view.section);
  const drawing = deskPageText.drawingRevision(
    view.drawing.number || deskPageText.untitledDrawing,
    view.drawing.revision,
  );
  const place = (own: (typeof PANES)[number]) =>
    classNames(
      'flex min-h-0 min-w-0 flex-col',
      narrow && 'col-start-1 row-start-1',
      narrow && pane !== own && 'invisible',
    );
  return (
    <div className="flex h-dvh flex-col overflow-hidden">
      <title>{`${text.title(view.label)}, ${section} – ${commonText.product}`}</title>
      <AppFrame
        trail={[
          { label: view.dam.name, to: paths.dam(view.dam.id) },
          { label: drawing, to: paths.drawing(view.drawing.id, view.pageNumber) },
          { label: checkText.crumb(view.label) },
        ]}
      >
        <main id="content" className="flex min-h-0 flex-1 flex-col">
          <h1 className="sr-only">{`${text.title(view.label)}, ${section}`}</h1>
          <div
            className={classNames(
              'grid min-h-0 flex-1 grid-rows-[minmax(0,1fr)]',
              narrow ? 'grid-cols-[minmax(0,1fr)]' : 'grid-cols-[minmax(0,1fr)_372px]',
            )}
          >
            <div className={classNames(place('sheet'), 'relative')}>
              {placing.name === null ? null : (
                // Over the sheet, which must not move under the hand that is about to press.
                <p
                  role="status"
                  className="pointer-events-none absolute bottom-14 left-3 z-10 m-0 rounded-sheet border border-ink bg-film px-3 py-1.5"
                >
                  {text.placing(placing.name)}
                </p>
              )}
              <SheetView
                store={store}
                sheet={view.sheet}
                frame={null}
                notes={[]}
                label={deskPageText.sheetLabel(section, drawing)}
                className="min-h-0 flex-1"
              />
            </div>
            <aside className={classNames(place('reading'), 'overflow-y-auto bg-film')}>
              <BlindForm
                view={view}
                typed={typed}
                onType={(next) => kept.setState(next, true)}
                placing={placing.pointId}
                onPlace={placing.begin}
                onSealed={() => kept.setState(parseKept(null, view), true)}
              />
            </aside>
          </div>
          {narrow ? <PaneSwitch panes={PANES} names={text.panes} pane={pane} onPane={setPane} /> : null}
        </main>
      </AppFrame>
    </div>
  );
}

/** Lines are shown and not taken hold of, so that a press gives the place itself. */
function netAlone({ document, setOut }: BlindView) {
  const store = createDeskStore({ document }, { reading: blankReading(setOut), readOnly: true });
  store.setLocked(SHEET_KINDS);
  return store;
}

/** What is typed survives a closed page; it belongs to one reader and one revision. */
function useKeptReading(view: BlindView) {
  const { person } = useSession();
  const owner = person?.id ?? '';
  const [store] = useState(() =>
    keptLocally<TypedReading>(`blind reading ${view.revisionId} ${owner}`, (kept) => parseKept(kept, view)),
  );
  return store;
}
