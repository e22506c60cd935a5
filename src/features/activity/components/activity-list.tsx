import { useSuspenseInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { MoreButton } from '#client/components/more-button.tsx';
import { Empty, PanelItem, PanelList } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { paths } from '#client/lib/paths.ts';
import { activityText as text } from '#client/text/activity.ts';
import type { EventDto } from '#shared/contract/dams.ts';
import { type ActivityQuery, damActivityQuery } from '../api/activity-queries.ts';

const SHORT_LENGTH = 6;

function EventText({ event }: { event: EventDto }) {
  const to = event.netId ? paths.net(event.netId) : event.drawingId ? paths.drawing(event.drawingId) : null;
  return to ? (
    <Link to={to} className="decoration-rule underline-offset-2 hover:decoration-ink">
      {event.text}
    </Link>
  ) : (
    event.text
  );
}

/** The newest few, for the side of the dam's page. */
export function RecentActivity({ damId }: { damId: string }) {
  const { data } = useSuspenseInfiniteQuery(damActivityQuery(damId));
  const events = data.pages.flatMap((page) => page.items).slice(0, SHORT_LENGTH);
  if (events.length === 0) return <Empty>{text.none}</Empty>;
  return (
    <PanelList>
      {events.map((event) => (
        <PanelItem key={event.id}>
          <EventText event={event} />
          <span className="block text-ink-2">
            {event.person ? shortName(event.person.name) : text.somebody},{' '}
            <time dateTime={event.at} title={formatMoment(event.at)}>
              {formatAgo(event.at)}
            </time>
          </span>
        </PanelItem>
      ))}
    </PanelList>
  );
}

interface ActivityTableProps {
  of: ActivityQuery;
  /** Said when there is nothing. */
  none?: string;
}

/** All of it as a table, a page at a time. */
export function ActivityTable({ of, none = text.none }: ActivityTableProps) {
  const query = useSuspenseInfiniteQuery(of);
  const events = query.data.pages.flatMap((page) => page.items);
  if (events.length === 0) return <Empty>{none}</Empty>;
  return (
    <>
      <Table caption={text.caption}>
        <thead>
          <tr>
            <HeadCell>{text.when}</HeadCell>
            <HeadCell>{text.who}</HeadCell>
            <HeadCell>{text.what}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {events.map((event) => (
            <tr key={event.id}>
              <Cell className="align-top whitespace-nowrap">{formatMoment(event.at)}</Cell>
              <Cell className="align-top">{event.person?.name ?? text.somebody}</Cell>
              <Cell>
                <EventText event={event} />
              </Cell>
            </tr>
          ))}
        </tbody>
      </Table>
      <MoreButton label={text.more} query={query} />
    </>
  );
}
