import { useSearchParams } from 'react-router-dom';
import { ButtonLink } from '#client/components/button.tsx';
import { SelectField } from '#client/components/field.tsx';
import { Page } from '#client/components/page.tsx';
import { Panel } from '#client/components/panel.tsx';
import { Part } from '#client/components/part.tsx';
import { MailTable } from '#client/features/mails/components/mail-table.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import { type MailState, mailState } from '#shared/contract/mails.ts';
import { AppFrame } from '../app-frame.tsx';

export function MailsPage() {
  const session = useSession();
  const [search, setSearch] = useSearchParams();
  const state = mailState.options.find((each) => each === search.get('state')) ?? null;
  const maySendAgain = session.can.includes('mail.read');
  return (
    <AppFrame trail={[{ label: text.title }]}>
      <Page
        title={text.title}
        heading={text.title}
        lead={session.outboxReadable ? text.leadOutbox : text.lead}
        action={maySendAgain ? <ButtonLink to={paths.mailTemplates}>{text.templates}</ButtonLink> : undefined}
      >
        <Panel
          title={text.title}
          look="register"
          action={
            <StateChoice
              state={state}
              onChoose={(chosen) => setSearch(chosen ? { state: chosen } : {}, { replace: true })}
            />
          }
        >
          {state === 'failed' && maySendAgain ? (
            <p className="m-0 border-b border-rule-2 px-3.5 py-2">{text.undeliveredLead}</p>
          ) : null}
          <Part>
            <MailTable state={state} maySendAgain={maySendAgain} />
          </Part>
        </Panel>
      </Page>
    </AppFrame>
  );
}

const StateChoice = ({ state, onChoose }: { state: MailState | null; onChoose: (state: string) => void }) => (
  <SelectField
    label={text.show}
    className="flex-row! items-center gap-2"
    value={state ?? ''}
    onChange={(event) => onChoose(event.target.value)}
  >
    <option value="">{text.all}</option>
    {mailState.options.map((each) => (
      <option key={each} value={each}>
        {text.stateName(each)}
      </option>
    ))}
  </SelectField>
);
