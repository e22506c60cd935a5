import { useSuspenseQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { mailQuery } from '#client/features/mails/api/mail-queries.ts';
import { MailText } from '#client/features/mails/components/mail-text.tsx';
import { SendAgain } from '#client/features/mails/components/send-again.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { formatMoment } from '#client/lib/dates.ts';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailDto } from '#shared/contract/mails.ts';
import { AppFrame } from '../app-frame.tsx';

export function MailPage() {
  const { mailId = '' } = useParams();
  const { data: mail } = useSuspenseQuery(mailQuery(mailId));
  const session = useSession();
  return (
    <AppFrame trail={[{ label: text.title, to: paths.mails }, { label: text.mail }]}>
      <Page title={mail.subject} heading={mail.subject} lead={`${text.to} ${mail.to}`}>
        <Panel
          title={stateOf(mail)}
          look="register"
          action={session.can.includes('mail.read') ? <SendAgain mail={mail} /> : null}
        >
          <div className="p-3.5">
            <MailText text={mail.text} />
            <p className="mt-5 mb-0 border-t border-rule-2 pt-2 text-sm break-all text-ink-2">
              {text.messageId} {mail.messageId}
            </p>
          </div>
        </Panel>
      </Page>
    </AppFrame>
  );
}

function stateOf(mail: MailDto): string {
  if (mail.state === 'failed') return text.failed(mail.lastError);
  if (mail.state === 'held' || mail.state === 'inDigest' || mail.state === 'dropped') return text[mail.state];
  return mail.sentAt ? text.sentAt(formatMoment(mail.sentAt)) : text.waiting;
}
