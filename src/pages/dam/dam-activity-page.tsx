import { useSuspenseQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { damActivityQuery } from '#client/features/activity/api/activity-queries.ts';
import { ActivityTable } from '#client/features/activity/components/activity-list.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { csvUrl } from '#client/lib/csv-url.ts';
import { downloadFrom } from '#client/lib/download.ts';
import { paths } from '#client/lib/paths.ts';
import { damsText as text } from '#client/text/dams.ts';
import { downloadsText } from '#client/text/downloads.ts';
import { AppFrame } from '../app-frame.tsx';

export function DamActivityPage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  const trail = [
    { label: text.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: text.activity },
  ];
  return (
    <AppFrame trail={trail}>
      <Page
        title={text.activityOf(dam.name)}
        heading={text.activity}
        lead={dam.name}
        action={<DownloadActivity damId={dam.id} />}
      >
        <Panel title={text.activity} look="register">
          <Part>
            <ActivityTable of={damActivityQuery(dam.id)} />
          </Part>
        </Panel>
      </Page>
    </AppFrame>
  );
}

function DownloadActivity({ damId }: { damId: string }) {
  return (
    <Button look="quiet" onClick={() => downloadFrom(csvUrl(`/dams/${damId}/events.csv`))}>
      {downloadsText.activity}
    </Button>
  );
}
