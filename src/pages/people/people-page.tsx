import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { peopleActivityQuery } from '#client/features/activity/api/activity-queries.ts';
import { ActivityTable } from '#client/features/activity/components/activity-list.tsx';
import { InvitePersonForm } from '#client/features/people/components/invite-person-form.tsx';
import { PeopleTable } from '#client/features/people/components/people-table.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { peopleText as text } from '#client/text/people.ts';
import { AppFrame } from '../app-frame.tsx';

export function PeoplePage() {
  const { person } = useSession();
  return (
    <AppFrame trail={[{ label: text.title }]}>
      <Page title={text.title} heading={text.title} lead={text.lead}>
        <div className="grid grid-cols-[minmax(0,1fr)] gap-7 lg:grid-cols-[minmax(0,1fr)_330px]">
          <Panel title={text.title} look="register" className="min-w-0 self-start">
            <Part>
              <PeopleTable ownPersonId={person?.id ?? ''} />
            </Part>
          </Panel>
          <Panel title={text.invite} className="self-start">
            <div className="p-3.5">
              <InvitePersonForm />
            </div>
          </Panel>
          <Panel title={text.activity} look="register" className="min-w-0 self-start">
            <Part>
              <ActivityTable of={peopleActivityQuery()} />
            </Part>
          </Panel>
        </div>
      </Page>
    </AppFrame>
  );
}
