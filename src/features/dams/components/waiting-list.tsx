import { useSuspenseQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { Empty, PanelItem, PanelList } from '#client/components/panel.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { WaitingDto } from '#shared/contract/dams.ts';
import { waitingQuery } from '../api/dam-queries.ts';

type Waiting = WaitingDto['items'][number];

/** Where the waiting work is done: the revision to check, the net to trace, the drawing to put to scale. */
function placeOf(item: Waiting): string {
  if (item.revisionId && item.kind === 'check') return paths.revision(item.revisionId);
  if (item.netId) return paths.net(item.netId);
  if (item.drawingId) return paths.drawing(item.drawingId);
  return paths.dam(item.damId);
}

/** What waits for the reader: over all dams, or on one of them. */
export function WaitingList({ damId }: { damId?: string }) {
  const { data } = useSuspenseQuery(waitingQuery());
  const items = damId === undefined ? data : data.filter((item) => item.damId === damId);
  if (items.length === 0) return <Empty>{text.nothingWaits}</Empty>;
  return (
    <PanelList>
      {items.map((item) => (
        <PanelItem key={`${item.kind} ${placeOf(item)}`}>
          <Link to={placeOf(item)} className="touch block">
            {item.text}
          </Link>
          <span className="block text-ink-2">
            {[damId === undefined ? item.damName : null, item.detail].filter(Boolean).join(', ')}
            {damId === undefined || item.detail ? ', ' : ''}
            <time dateTime={item.at} title={formatMoment(item.at)}>
              {formatAgo(item.at)}
            </time>
          </span>
        </PanelItem>
      ))}
    </PanelList>
  );
}
