import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { AS_SCANNED } from '#shared/contract/renditions.ts';
import { useMakeRendition } from '../api/rendition-queries.ts';
import { isAsScanned, keepSettings } from '../model/kept-settings.ts';
import { CleanUpPicture } from './clean-up-picture.tsx';
import { CloseUp } from './close-up.tsx';
import { GeometryFields } from './geometry-fields.tsx';
import { PictureList } from './picture-list.tsx';
import { ToneFields } from './tone-fields.tsx';
import { useCleanUp } from './use-clean-up.ts';
import { useSmallSheet } from './use-small-sheet.ts';

/** A sheet being cleaned up: its picture at the left, what is done to it at the right, the pictures made of it below. */
export function CleanUp({ sheet: now, onBack }: { sheet: SheetDto; onBack: () => void }) {
  // Another picture by which the sheet is shown changes nothing of what is cleaned up, the scan.
  const [sheet] = useState(now);
  const { small, failed } = useSmallSheet(sheet);
  const work = useCleanUp(sheet, AS_SCANNED);
  const [asScanned, setAsScanned] = useState(false);
  const make = useMakeRendition(sheet.id);
  const notice = useNotice();
  const { settings, setting } = work;
  const nothingSet = isAsScanned(settings);
  const use = () =>
    make.mutate(settings, {
      onSuccess: () => {
        keepSettings(sheet.id, null);
        notice(text.asked);
      },
    });
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4 lg:grid-cols-[minmax(0,1fr)_360px]">
      <Panel
        look="register"
        className="min-w-0 self-start lg:sticky lg:top-3"
        title={text.title(sheet.pageNumber)}
        action={
          <>
            <Button
              look="quiet"
              aria-pressed={asScanned}
              disabled={setting !== null}
              onClick={() => setAsScanned(!asScanned)}
            >
              {text.compare}
            </Button>
            <Button look="quiet" onClick={onBack}>
              {text.back}
            </Button>
          </>
        }
      >
        <p className="m-0 border-b border-rule px-3.5 py-2 text-ink-2">{text.lead}</p>
        <div className="bg-desk p-3.5 max-sm:p-1.5">
          {small ? (
            <CleanUpPicture
              small={small}
              pageNumber={sheet.pageNumber}
              settings={work.shown}
              asScanned={asScanned && setting === null}
              handles={work.handles}
              onHandles={work.moveHandles}
              onLookAt={work.lookAt}
            />
          ) : (
            <p role="status" className="m-0 px-3.5 py-6 text-center">
              {failed ? text.loadFailed : text.loading}
            </p>
          )}
        </div>
      </Panel>
      <div className="flex min-w-0 flex-col gap-4 self-start">
        <section className="flex flex-col gap-4 border border-rule bg-film px-3.5 py-3">
          <GeometryFields
            settings={settings}
            setting={setting}
            refused={work.refused}
            onSettings={work.setSettings}
            onSetting={work.begin}
            onApply={work.apply}
          />
          <ToneFields
            settings={settings}
            onChange={(change) => work.setSettings({ ...settings, ...change })}
          />
          {small ? <CloseUp sheet={sheet} small={small} settings={settings} at={work.closeUpAt} /> : null}
          <ProblemNote error={make.error} />
          <div className="flex flex-wrap items-center gap-2">
            <Button look="main" busy={make.isPending} disabled={nothingSet || setting !== null} onClick={use}>
              {text.use}
            </Button>
            <Button
              look="quiet"
              disabled={nothingSet || setting !== null}
              onClick={() => work.setSettings(AS_SCANNED)}
            >
              {text.reset}
            </Button>
            {nothingSet ? <span className="text-sm text-ink-2">{text.nothingSet}</span> : null}
          </div>
        </section>
        <PictureList sheetId={sheet.id} onStartFrom={work.setSettings} />
      </div>
    </div>
  );
}
