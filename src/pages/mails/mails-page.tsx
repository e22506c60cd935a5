import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { MailTable } from '#client/features/mails/components/mail-table.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { mailsText as text } from '#client/text/mails.ts';
import { AppFrame } from '../app-frame.tsx';

export function MailsPage() {
  const session = useSession();
  return (
    <AppFrame trail={[{ label: text.title }]}>
      <Page
        title={text.title}
        heading={text.title}
        lead={session.outboxReadable ? text.leadOutbox : text.lead}
      >
        <Panel title={text.title} look="register">
          <Part>
            <MailTable />
          </Part>
        </Panel>
      </Page>
    </AppFrame>
  );
}
