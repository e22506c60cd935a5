import { useQuery } from '@tanstack/react-query';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { Panel, PanelItem, PanelList } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { ProgressBar } from '#client/components/progress-bar.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import type { RenditionDto, RenditionSettings } from '#shared/contract/renditions.ts';
import { isBeingMade, renditionsQuery, useShowRendition } from '../api/rendition-queries.ts';
import { settingsWords } from '../model/settings-words.ts';

type PictureListProps = {
  sheetId: string;
  /** The scan is what the sheet is shown by. */
  onStartFrom: (settings: RenditionSettings) => void;
};

/** The scan and every picture made of it: which one the sheet is shown by, and a press to show another. */
export function PictureList({ sheetId, onStartFrom }: PictureListProps) {
  const { data: renditions, error } = useQuery(renditionsQuery(sheetId));
  const show = useShowRendition(sheetId);
  const notice = useNotice();
  const showBy = (id: string | null) => show.mutate(id, { onSuccess: () => notice(text.nowShown) });
  const scanIsShown = renditions?.every((each) => !each.shown) ?? false;
  return (
    <Panel title={text.pictures}>
      <ProblemNote error={error ?? show.error} />
      <PanelList>
        {renditions?.map((rendition) => (
          <PanelItem key={rendition.id}>
            <PictureRow
              rendition={rendition}
              busy={show.isPending}
              onShow={() => showBy(rendition.id)}
              onStartFrom={() => onStartFrom(rendition.settings)}
            />
          </PanelItem>
        ))}
        <PanelItem>
          <Row what={text.scan} facts={text.scanLead} shown={scanIsShown}>
            {scanIsShown || !renditions ? null : (
              <Button look="quiet" busy={show.isPending} onClick={() => showBy(null)}>
                {text.showOriginal}
              </Button>
            )}
          </Row>
        </PanelItem>
      </PanelList>
    </Panel>
  );
}

type PictureRowProps = {
  rendition: RenditionDto;
  busy: boolean;
  onShow: () => void;
  onStartFrom: () => void;
};

function PictureRow({ rendition, busy, onShow, onStartFrom }: PictureRowProps) {
  const { settings, state, progress, message, shown, madeBy, madeAt } = rendition;
  const what = settingsWords(settings);
  return (
    <Row what={what} facts={text.madeBy(madeBy.name, formatMoment(madeAt))} shown={shown}>
      {isBeingMade(rendition) ? (
        <div className="w-full">
          <p role="status" className="m-0 text-sm text-ink-2">
            {state === 'running' ? text.being.running : text.being.waiting}
          </p>
          <ProgressBar label={text.making(what)} value={state === 'running' ? progress : null} />
        </div>
      ) : null}
      {message ? <p className="m-0 w-full text-wrong">{message}</p> : null}
      {state === 'done' && !shown ? (
        <Button look="quiet" aria-label={text.showOf(what)} busy={busy} onClick={onShow}>
          {text.show}
        </Button>
      ) : null}
      <Button look="text" aria-label={text.startFromOf(what)} onClick={onStartFrom}>
        {text.startFrom}
      </Button>
    </Row>
  );
}

function Row({
  what,
  facts,
  shown,
  children,
}: {
  what: string;
  facts: string;
  shown: boolean;
  children?: React.ReactNode;
}) {
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1.5">
      <div className="min-w-0 grow">
        <p className="m-0 font-semibold first-letter:uppercase">
          {what}
          {shown ? <span className="ml-2 text-sm font-normal text-good">{text.shown}</span> : null}
        </p>
        <p className="m-0 text-sm text-ink-2">{facts}</p>
      </div>
      {children}
    </div>
  );
}
