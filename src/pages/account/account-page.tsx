import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { MailChoiceForm } from '#client/features/mails/components/mail-choice-form.tsx';
import {
  EndAllSessions,
  NameForm,
  PasswordForm,
} from '#client/features/session/components/account-forms.tsx';
import { LocaleForm } from '#client/features/session/components/locale-form.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { accountMenuText } from '#client/text/account-menu.ts';
import { localeText } from '#client/text/locale.ts';
import { mailChoiceText } from '#client/text/mail-choice.ts';
import { sessionText as text } from '#client/text/session.ts';
import { AppFrame } from '../app-frame.tsx';

export function AccountPage() {
  const { person } = useSession();
  if (!person) return null;
  return (
    <AppFrame trail={[{ label: accountMenuText.accountTitle }]}>
      <Page
        title={accountMenuText.accountTitle}
        heading={accountMenuText.accountTitle}
        lead={person.email}
        narrow
      >
        <div className="flex flex-col gap-4">
          <Panel title={text.name}>
            <div className="p-3.5">
              <NameForm name={person.name} />
            </div>
          </Panel>
          <Panel title={localeText.title}>
            <div className="p-3.5">
              <LocaleForm />
            </div>
          </Panel>
          <Panel title={mailChoiceText.title}>
            <Part>
              <div className="p-3.5">
                <MailChoiceForm />
              </div>
            </Part>
          </Panel>
          <Panel title={text.password}>
            <div className="p-3.5">
              <PasswordForm />
            </div>
          </Panel>
          <Panel title={text.endAllTitle}>
            <div className="p-3.5">
              <EndAllSessions />
            </div>
          </Panel>
        </div>
      </Page>
    </AppFrame>
  );
}
