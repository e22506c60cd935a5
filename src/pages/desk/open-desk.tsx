import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { netDownloadUrl } from '#client/features/desk/api/net-downloads.ts';
import { netQuery } from '#client/features/desk/api/net-queries.ts';
import { ChosenLineBar } from '#client/features/desk/components/chosen-line-bar.tsx';
import { ConflictDialog } from '#client/features/desk/components/conflict-dialog.tsx';
import { FiguresPane } from '#client/features/desk/components/figures-pane.tsx';
import { MarginFormPane } from '#client/features/desk/components/margin-form.tsx';
import { PresenceLine } from '#client/features/desk/components/presence-line.tsx';
import { ReadOnlyLine } from '#client/features/desk/components/read-only-line.tsx';
import { SavingLine } from '#client/features/desk/components/saving-line.tsx';
import { ShownSheet } from '#client/features/desk/components/shown-sheet.tsx';
import { StoreNotice } from '#client/features/desk/components/store-notice.tsx';
import { ToolPalette } from '#client/features/desk/components/tool-palette.tsx';
import { useDeskChecks } from '#client/features/desk/components/use-desk-checks.ts';
import { useKeptView } from '#client/features/desk/components/use-kept-view.ts';
import { useSavingMoments } from '#client/features/desk/components/use-saving-moments.ts';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { downloadFrom } from '#client/lib/download.ts';
import { paths } from '#client/lib/paths.ts';
import { useMedia } from '#client/lib/use-media.ts';
import { NARROW_QUERY } from '#client/lib/width-queries.ts';
import { commonText } from '#client/text/common.ts';
import { deskPageText as text } from '#client/text/desk-page.ts';
import { sendingText } from '#client/text/revisions.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { namesText } from '#shared/text/names-text.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { AppFrame } from '../app-frame.tsx';
import { DeskGrid } from './desk-grid.tsx';
import { DeskTitleBlock } from './desk-title-block.tsx';
import { NetNotes } from './net-notes.tsx';
import { pictureFactsOf } from './picture-facts.ts';
import { RevisionsPane } from './revisions-pane.tsx';
import { SendForChecking } from './send-for-checking.tsx';
import { SheetUnderWay } from './sheet-under-way.tsx';
import { useDeskLive } from './use-desk-live.ts';
import { useDeskNotes } from './use-desk-notes.ts';
import { useDeskPresence } from './use-desk-presence.ts';
import { useMargin } from './use-margin.ts';
import { usePanes } from './use-panes.ts';

/** Below this the parts of the desk do not fit side by side; the same measure as the styles' `md`. */

interface OpenDeskProps {
  netId: string;
  session: DeskSession;
  takeOver: () => void;
}

export function OpenDesk(props: OpenDeskProps) {
  const detail = useQuery(netQuery(props.netId)).data;
  return detail ? <DeskParts {...props} detail={detail} /> : null;
}

function DeskParts({ netId, session, takeOver, detail }: OpenDeskProps & { detail: NetDetailDto }) {
  const { store, saving, readOnly } = session;
  const narrow = useMedia(NARROW_QUERY);
  const { person } = useSession();
  const panes = usePanes(person?.id ?? '');
  useKeptView(store, person?.id ?? '');
  const [dialog, setDialog] = useState<'none' | 'send' | 'compare'>('none');
  const notes = useDeskNotes(netId, store);
  const { margin, pane, setPane, show, close } = useMargin(store, narrow, notes, panes.bring);
  const checks = useDeskChecks(store);
  const notice = useNotice();
  const flush = async () => saving?.flush();
  const presence = useDeskPresence(netId, session);
  useDeskLive(netId, session);
  useSavingMoments(saving);

  const { section, drawing, sheet } = detail;
  const sectionName = sectionLabel(section);
  const drawingName = text.drawingRevision(drawing.number || text.untitledDrawing, drawing.revision);
  const closeForm = () => {
    close();
    setPane('block');
  };

  return (
    <div className="flex h-dvh flex-col overflow-hidden">
      <title>{`${sectionName}, ${detail.net.name} – ${commonText.product}`}</title>
      <AppFrame
        isFull
        trail={[
          { label: detail.dam.name, to: paths.dam(detail.dam.id) },
          { label: drawingName, to: paths.drawing(drawing.id, sheet.pageNumber) },
          { label: `${sectionName}, ${detail.net.name}` },
        ]}
        end={
          <>
            {presence ? <PresenceLine presence={presence} store={store} ownId={person?.id ?? null} /> : null}
            {saving ? (
              <SavingLine saving={saving} store={store} onCompare={() => setDialog('compare')} />
            ) : null}
            {detail.can.includes('net.send') && readOnly === null ? (
              <Button look="main" aria-label={sendingText.button} onClick={() => setDialog('send')}>
                <span className="lg:hidden">{sendingText.short}</span>
                <span className="max-lg:hidden">{sendingText.button}</span>
              </Button>
            ) : null}
          </>
        }
      >
        <DeskGrid
          heading={`${sectionName}, ${detail.net.name}`}
          marginIsForm={margin.shows !== 'notes'}
          narrow={narrow}
          pane={pane}
          onPane={setPane}
          panes={panes}
          tools={
            <ToolPalette
              store={store}
              layout={narrow ? 'row' : 'column'}
              keeping={session.history}
              className={narrow ? '' : 'flex-1'}
            />
          }
          lines={
            <>
              {readOnly ? <ReadOnlyLine reason={readOnly} onTakeOver={takeOver} /> : null}
              <SheetUnderWay detail={detail} />
              <StoreNotice store={store} />
              {narrow && pane === 'sheet' ? (
                <ChosenLineBar store={store} onOpen={(form) => show({ shows: 'form', form })} />
              ) : null}
            </>
          }
          sheet={
            <ShownSheet
              key={sheet.id}
              store={store}
              sheet={sheet}
              frame={section.frame}
              notes={notes.balloons}
              label={text.sheetLabel(sectionName, drawingName)}
              className="min-h-0 flex-1"
              picture={() => pictureFactsOf(detail, session, person, drawingName)}
            />
          }
          schedule={
            <FiguresPane
              store={store}
              netName={`${sectionName} ${detail.net.name}`}
              onDownload={(what) => void flush().then(() => downloadFrom(netDownloadUrl(netId, what)))}
              onForm={readOnly ? null : (form) => show({ shows: 'form', form })}
              onSheet={() => setPane('sheet')}
            />
          }
          notes={
            margin.shows === 'form' ? (
              <MarginFormPane
                open={margin.form}
                store={store}
                checks={checks}
                detail={detail}
                flush={flush}
                onOpen={(form) => show({ shows: 'form', form })}
                onClose={closeForm}
                onSheet={() => setPane('sheet')}
              />
            ) : margin.shows === 'revisions' ? (
              <RevisionsPane netId={netId} damId={detail.dam.id} flush={flush} onClose={closeForm} />
            ) : (
              <NetNotes
                netId={netId}
                damId={detail.dam.id}
                notes={notes}
                can={detail.can}
                onSheet={() => setPane('sheet')}
              />
            )
          }
          block={
            <DeskTitleBlock
              detail={detail}
              session={session}
              margin={margin}
              onShow={show}
              notes={notes.notes}
            />
          }
        />
      </AppFrame>
      {dialog === 'compare' && saving ? (
        <ConflictDialog store={store} saving={saving} onClose={() => setDialog('none')} />
      ) : null}
      {dialog === 'send' ? (
        <SendForChecking
          netId={netId}
          session={session}
          onClose={() => setDialog('none')}
          onSent={(revision) => {
            setDialog('none');
            notice(sendingText.sent(revision.label, namesText(revision.reviewers)));
          }}
        />
      ) : null}
    </div>
  );
}
