import { useSuspenseQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { classNames } from '#client/components/class-names.ts';
import { Empty, PanelItem, PanelList } from '#client/components/panel.tsx';
import { formatAgo, formatDay, formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { waitingText as text } from '#client/text/waiting.ts';
import type { WaitingDto } from '#shared/contract/dams.ts';
import { waitingQuery } from '../api/dam-queries.ts';

type Waiting = WaitingDto['items'][number];

/** Shown at first, so that the dams below stay in sight. */
const SHOWN = 8;

/** Where the waiting work is done: the revision to check, the note to answer, the drawing to put to scale. */
export function placeOf(item: Waiting): string {
  if (item.revisionId && item.kind === 'check') return paths.revision(item.revisionId);
  if (item.netId) return `${paths.net(item.netId)}${item.noteId ? `#note-${item.noteId}` : ''}`;
  if (item.drawingId) return paths.drawing(item.drawingId);
  return paths.dam(item.damId);
}

interface WaitingListProps {
  /** On one dam only. */
  damId?: string;
  /** Room for what waits and where side by side. */
  wide?: boolean;
}

/** What waits for the reader: over all dams, or on one of them. */
export function WaitingList({ damId, wide = false }: WaitingListProps) {
  const { data } = useSuspenseQuery(waitingQuery());
  const [isWhole, setIsWhole] = useState(false);
  const items = damId === undefined ? data : data.filter((item) => item.damId === damId);
  if (items.length === 0) return <Empty>{text.nothing}</Empty>;
  return (
    <>
      <PanelList>
        {(isWhole ? items : items.slice(0, SHOWN)).map((item) => (
          <PanelItem key={`${item.kind} ${placeOf(item)}`}>
            <div
              className={classNames(
                wide && 'grid gap-x-4 md:grid-cols-[minmax(0,1fr)_minmax(0,1fr)] md:items-baseline',
              )}
            >
              <span>
                <Link
                  to={placeOf(item)}
                  className={classNames('touch inline-flex items-center', wide && 'font-semibold')}
                >
                  {item.text}
                </Link>
                <Urgent item={item} />
              </span>
              <span className="block text-ink-2">
                {[damId === undefined ? item.damName : null, item.detail].filter(Boolean).join(', ')}
                {damId === undefined || item.detail ? ', ' : ''}
                <time dateTime={item.at} title={formatMoment(item.at)}>
                  {formatAgo(item.at)}
                </time>
              </span>
            </div>
          </PanelItem>
        ))}
      </PanelList>
      {!isWhole && items.length > SHOWN ? (
        <div className="px-3.5 pb-3">
          <Button look="quiet" onClick={() => setIsWhole(true)}>
            {text.showAll(items.length)}
          </Button>
        </div>
      ) : null}
    </>
  );
}

/** The day of the reader's own calendar, as the server writes days. */
const dayOf = (at: Date) =>
  [at.getFullYear(), at.getMonth() + 1, at.getDate()].map((part) => String(part).padStart(2, '0')).join('-');

/** By when it is due, or that an acceptance waits for it. */
function Urgent({ item: { dueOn, mustAnswer } }: { item: Waiting }) {
  if (dueOn === null)
    return mustAnswer ? (
      <span className="ml-2 text-sm font-semibold text-attention">{text.mustAnswer}</span>
    ) : null;
  const isLate = dueOn < dayOf(new Date());
  const day = formatDay(`${dueOn}T12:00:00`);
  return (
    <span
      className={`ml-2 text-sm font-semibold whitespace-nowrap ${isLate ? 'text-wrong' : 'text-attention'}`}
    >
      {isLate ? text.wasDue(day) : text.due(day)}
    </span>
  );
}
