import { useNavigate } from 'react-router-dom';
import { useNotice } from '#client/components/notice.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { RestorePanel } from '#client/features/archive/components/restore-panel.tsx';
import { useCreateDam } from '#client/features/dams/api/dam-mutations.ts';
import { DamForm } from '#client/features/dams/components/dam-form.tsx';
import { paths } from '#client/lib/paths.ts';
import { archivesText } from '#client/text/archives.ts';
import { damSettingsText as settings } from '#client/text/dam-settings.ts';
import { damsText as text } from '#client/text/dams.ts';
import { AppFrame } from '../app-frame.tsx';

export function NewDamPage() {
  const create = useCreateDam();
  const navigate = useNavigate();
  const notice = useNotice();
  return (
    <AppFrame trail={[{ label: text.title, to: paths.dams }, { label: text.newDam }]}>
      <Page title={text.newDam} heading={text.newDam} lead={settings.newDamLead} narrow>
        <Panel title={settings.facts} look="register">
          <div className="p-3.5">
            <DamForm
              isMain
              error={create.error}
              busy={create.isPending}
              submitLabel={settings.create}
              onSubmit={(input) =>
                create.mutate(input, {
                  onSuccess: (dam) => {
                    notice(settings.created);
                    void navigate(paths.damSettings(dam.id));
                  },
                })
              }
            />
          </div>
        </Panel>
        <div className="mt-5">
          <RestorePanel
            onRestored={({ damId, name }) => {
              notice(archivesText.done(name));
              void navigate(paths.dam(damId));
            }}
          />
        </div>
      </Page>
    </AppFrame>
  );
}
