import { Page } from '#client/components/page.tsx';
import { Part } from '#client/components/part.tsx';
import { TemplatePreview } from '#client/features/mails/components/template-preview.tsx';
import { paths } from '#client/lib/paths.ts';
import { mailsText as text } from '#client/text/mails.ts';
import { AppFrame } from '../app-frame.tsx';

export function MailTemplatesPage() {
  return (
    <AppFrame trail={[{ label: text.title, to: paths.mails }, { label: text.templates }]}>
      <Page title={text.templatesTitle} heading={text.templatesTitle} lead={text.templatesLead}>
        <Part>
          <TemplatePreview />
        </Part>
      </Page>
    </AppFrame>
  );
}
