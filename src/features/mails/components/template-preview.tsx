import { useSuspenseQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Panel } from '#client/components/panel.tsx';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailTemplateDto } from '#shared/contract/mails.ts';
import { mailTemplatesQuery } from '../api/mail-queries.ts';

type View = 'html' | 'text';

/** The kinds of mail at the left, and the chosen one as it arrives. */
export function TemplatePreview() {
  const { data: templates } = useSuspenseQuery(mailTemplatesQuery());
  const [kind, setKind] = useState(templates[0]?.kind);
  const [view, setView] = useState<View>('html');
  const shown = templates.find((template) => template.kind === kind);
  return (
    <div className="grid items-start gap-4 md:grid-cols-[240px_minmax(0,1fr)]">
      <Panel title={text.kinds}>
        <ul className="m-0 list-none p-0">
          {templates.map((template) => (
            <li key={template.kind} className="border-b border-rule-2 last:border-b-0">
              <button
                type="button"
                aria-pressed={template.kind === kind}
                className="touch w-full px-3.5 py-[5px] text-left hover:bg-hover aria-pressed:bg-chosen aria-pressed:font-semibold"
                onClick={() => setKind(template.kind)}
              >
                {text.kindName(template.kind)}
              </button>
            </li>
          ))}
        </ul>
      </Panel>
      {shown ? <Preview template={shown} view={view} onView={setView} /> : null}
    </div>
  );
}

interface PreviewProps {
  template: MailTemplateDto;
  view: View;
  onView: (view: View) => void;
}

function Preview({ template, view, onView }: PreviewProps) {
  const { kind, subject, mayWait } = template;
  return (
    <Panel
      look="register"
      title={subject}
      action={
        <fieldset className="m-0 flex gap-1.5 border-0 p-0">
          <legend className="sr-only">{text.view}</legend>
          <ViewButton label={text.asHtml} chosen={view === 'html'} onClick={() => onView('html')} />
          <ViewButton label={text.asText} chosen={view === 'text'} onClick={() => onView('text')} />
        </fieldset>
      }
    >
      <p className="m-0 border-b border-rule-2 px-3.5 py-2 text-sm text-ink-2">
        {mayWait ? text.mayWait : text.neverWaits}
      </p>
      {view === 'html' ? (
        // Without any right of its own: a mail holds no script, and the page is not for its links.
        <iframe
          sandbox=""
          title={text.preview(text.kindName(kind))}
          srcDoc={template.html}
          className="block h-[640px] w-full border-0 bg-white"
        />
      ) : (
        <pre className="m-0 overflow-x-auto p-3.5 font-mono text-sm whitespace-pre-wrap">{template.text}</pre>
      )}
    </Panel>
  );
}

const ViewButton = ({ label, chosen, onClick }: { label: string; chosen: boolean; onClick: () => void }) => (
  <Button look="quiet" aria-pressed={chosen} className="aria-pressed:bg-chosen" onClick={onClick}>
    {label}
  </Button>
);
