import { useSuspenseQuery } from '@tanstack/react-query';
import { Link, useParams, useSearchParams } from 'react-router-dom';
import { ButtonLink } from '#client/components/button.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { RecentActivity } from '#client/features/activity/components/activity-list.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { DamFacts } from '#client/features/dams/components/dam-facts.tsx';
import { PeopleList } from '#client/features/dams/components/people-panel.tsx';
import { WaitingList } from '#client/features/dams/components/waiting-list.tsx';
import { paths } from '#client/lib/paths.ts';
import { compareText } from '#client/text/compare.ts';
import { damSeepageText } from '#client/text/dam-seepage.ts';
import { damsText as text } from '#client/text/dams.ts';
import { waitingText } from '#client/text/waiting.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import { AppFrame } from '../app-frame.tsx';
import { useDamLive } from '../use-dam-live.ts';
import { DrawingsPanel } from './drawings-panel.tsx';

export function DamPage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  useDamLive(damId);
  const [search] = useSearchParams();
  return (
    <AppFrame trail={[{ label: text.title, to: paths.dams }, { label: dam.name }]}>
      <Page
        title={dam.name}
        heading={dam.name}
        lead={<DamFacts dam={dam} />}
        action={
          <>
            <ButtonLink look="quiet" to={paths.damSeepage(dam.id)}>
              {damSeepageText.title}
            </ButtonLink>
            <ButtonLink look="quiet" to={paths.compare(dam.id)}>
              {compareText.title}
            </ButtonLink>
            <ButtonLink look="quiet" to={paths.damSettings(dam.id)}>
              {text.settings}
            </ButtonLink>
          </>
        }
      >
        {dam.archivedAt === null ? null : (
          <p className="mt-0 mb-4 border-l-[3px] border-attention bg-film px-3 py-2">{text.isPutAway}</p>
        )}
        <div className="grid grid-cols-[minmax(0,1fr)] gap-7 lg:grid-cols-[minmax(0,1fr)_330px]">
          <DrawingsPanel dam={dam} archived={search.get('show') === 'put-away'} />
          <SidePanels dam={dam} />
        </div>
      </Page>
    </AppFrame>
  );
}

function SidePanels({ dam }: { dam: DamDto }) {
  return (
    <div className="flex flex-col gap-4">
      <Panel title={waitingText.title}>
        <Part>
          <WaitingList damId={dam.id} />
        </Part>
      </Panel>
      <Panel title={text.people}>
        <Part>
          <PeopleList damId={dam.id} />
        </Part>
        {dam.can.includes('dam.manageMembers') ? (
          <p className="m-0 border-t border-rule-2 px-3.5 py-2 text-sm">
            <Link to={paths.damSettings(dam.id)}>{text.managePeople}</Link>
          </p>
        ) : null}
      </Panel>
      <Panel title={text.activity}>
        <Part>
          <RecentActivity damId={dam.id} />
        </Part>
        <p className="m-0 border-t border-rule-2 px-3.5 py-2 text-sm">
          <Link to={paths.damActivity(dam.id)}>{text.allActivity}</Link>
        </p>
      </Panel>
    </div>
  );
}
