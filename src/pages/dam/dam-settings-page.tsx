import { useSuspenseQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { ArchivePanel } from '#client/features/archive/components/archive-panel.tsx';
import { useArchiveDam, useEditDam } from '#client/features/dams/api/dam-mutations.ts';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { CheckListPanel } from '#client/features/dams/components/check-list-panel.tsx';
import { DamFacts } from '#client/features/dams/components/dam-facts.tsx';
import { DamForm } from '#client/features/dams/components/dam-form.tsx';
import { InviteMemberForm } from '#client/features/dams/components/invite-member-form.tsx';
import { MemberTable } from '#client/features/dams/components/member-table.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { paths } from '#client/lib/paths.ts';
import { checkListSettingsText } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import { damSettingsText as settings } from '#client/text/dam-settings.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import { AppFrame } from '../app-frame.tsx';

export function DamSettingsPage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  const { person } = useSession();
  const canManage = dam.can.includes('dam.manageMembers');
  const trail = [
    { label: text.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: text.settings },
  ];
  return (
    <AppFrame trail={trail}>
      <Page
        title={settings.settingsOf(dam.name)}
        heading={text.settings}
        lead={canManage ? dam.name : settings.cannotManage}
      >
        <div className="grid grid-cols-[minmax(0,1fr)] gap-7 lg:grid-cols-[minmax(0,1fr)_400px]">
          <div className="flex min-w-0 flex-col gap-4">
            <Panel title={text.people} look="register">
              <Part>
                <MemberTable damId={dam.id} ownPersonId={person?.id ?? ''} canManage={canManage} />
              </Part>
            </Panel>
            {canManage ? (
              <Panel title={settings.addPerson}>
                <div className="p-3.5">
                  <InviteMemberForm damId={dam.id} />
                </div>
              </Panel>
            ) : null}
            <Panel title={checkListSettingsText.title}>
              <Part>
                <div className="p-3.5">
                  <CheckListPanel
                    damId={dam.id}
                    canEdit={dam.can.includes('dam.edit') && dam.archivedAt === null}
                  />
                </div>
              </Part>
            </Panel>
          </div>
          <div className="flex flex-col gap-4">
            <FactsPanel dam={dam} />
            {dam.can.includes('dam.archive') ? <ArchivePanel damId={dam.id} /> : null}
            {dam.can.includes('dam.archive') ? <PutAwayPanel dam={dam} /> : null}
          </div>
        </div>
      </Page>
    </AppFrame>
  );
}

function FactsPanel({ dam }: { dam: DamDto }) {
  const edit = useEditDam(dam.id);
  const notice = useNotice();
  const canEdit = dam.can.includes('dam.edit') && dam.archivedAt === null;
  return (
    <Panel title={settings.facts}>
      <div className="p-3.5">
        {canEdit ? (
          <DamForm
            dam={dam}
            error={edit.error}
            busy={edit.isPending}
            submitLabel={commonText.save}
            onSubmit={(input) => edit.mutate(input, { onSuccess: () => notice(settings.nameDone) })}
          />
        ) : (
          <DamFacts dam={dam} />
        )}
      </div>
    </Panel>
  );
}

function PutAwayPanel({ dam }: { dam: DamDto }) {
  const archive = useArchiveDam(dam.id);
  const isAway = dam.archivedAt !== null;
  return (
    <Panel title={isAway ? settings.bringBackDam : settings.putAwayTitle}>
      <div className="flex flex-col items-start gap-3 p-3.5">
        <p className="m-0">{isAway ? text.isPutAway : settings.putAwayLead}</p>
        <ProblemNote error={archive.error} />
        <Button busy={archive.isPending} onClick={() => archive.mutate(!isAway)}>
          {isAway ? settings.bringBackDam : settings.putAwayDam}
        </Button>
      </div>
    </Panel>
  );
}
