import { useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { useParams, useSearchParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { damActivityQuery } from '#client/features/activity/api/activity-queries.ts';
import { ActivityFilterBar } from '#client/features/activity/components/activity-filter-bar.tsx';
import { ActivityTable } from '#client/features/activity/components/activity-list.tsx';
import {
  type ActivityFilterName,
  activityFiltersIn,
  eventFilterOf,
} from '#client/features/activity/model/activity-filters.ts';
import { damQuery, memberListQuery } from '#client/features/dams/api/dam-queries.ts';
import { csvUrl } from '#client/lib/csv-url.ts';
import { downloadFrom } from '#client/lib/download.ts';
import { paths } from '#client/lib/paths.ts';
import { activityText } from '#client/text/activity.ts';
import { damsText as text } from '#client/text/dams.ts';
import { downloadsText } from '#client/text/downloads.ts';
import type { EventFilter } from '#shared/contract/events.ts';
import { AppFrame } from '../app-frame.tsx';

/** What happened on a dam, of everybody or as filtered; the address holds the filters. */
export function DamActivityPage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  const { data: members = [] } = useQuery(memberListQuery(damId));
  const [address, setAddress] = useSearchParams();
  const filters = activityFiltersIn(address);
  const filter = eventFilterOf(filters);
  const change = (name: ActivityFilterName, value: string) => {
    const changed = new URLSearchParams(address);
    if (value === '') changed.delete(name);
    else changed.set(name, value);
    setAddress(changed, { replace: true });
  };
  const trail = [
    { label: text.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: text.activity },
  ];
  const isFiltered = Object.keys(filters).length > 0;
  return (
    <AppFrame trail={trail}>
      <Page
        title={text.activityOf(dam.name)}
        heading={text.activity}
        lead={dam.name}
        action={<DownloadActivity damId={dam.id} filter={filter} />}
      >
        <ActivityFilterBar filters={filters} people={members.map(({ person }) => person)} onChange={change} />
        <Panel title={text.activity} look="register">
          <Part>
            <ActivityTable
              of={damActivityQuery(dam.id, filter)}
              none={isFiltered ? activityText.noMatch : activityText.none}
            />
          </Part>
        </Panel>
      </Page>
    </AppFrame>
  );
}

/** The file holds what the list shows. */
function DownloadActivity({ damId, filter }: { damId: string; filter: EventFilter }) {
  return (
    <Button look="quiet" onClick={() => downloadFrom(csvUrl(`/dams/${damId}/events.csv`, filter))}>
      {downloadsText.activity}
    </Button>
  );
}
