import { useSuspenseQuery } from '@tanstack/react-query';
import { type SyntheticEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { SelectField } from '#client/components/field.tsx';
import { Panel } from '#client/components/panel.tsx';
import { useMedia } from '#client/lib/use-media.ts';
import { NARROW_QUERY } from '#client/lib/width-queries.ts';
import { mailsText as text } from '#client/text/mails.ts';
import type { MailKind, MailTemplateDto } from '#shared/contract/mails.ts';
import { mailTemplatesQuery } from '../api/mail-queries.ts';

/** The body's own margin, and that of its last paragraph. */
const BELOW_PX = 24;
type View = 'html' | 'text';

/** The kinds of mail at the left, and the chosen one as it arrives. */
export function TemplatePreview() {
  const { data: templates } = useSuspenseQuery(mailTemplatesQuery());
  // The list of kinds would stand above the mail there, and push it out of sight.
  const narrow = useMedia(NARROW_QUERY);
  const [kind, setKind] = useState(templates[0]?.kind);
  const [view, setView] = useState<View>('html');
  const shown = templates.find((template) => template.kind === kind);
  if (!shown) return null;
  const kinds = templates.map((template) => template.kind);
  const Choice = narrow ? KindSelect : KindList;
  return (
    <div className="grid items-start gap-4 md:grid-cols-[15rem_minmax(0,1fr)]">
      <Choice kinds={kinds} chosen={shown.kind} onChoose={setKind} />
      <Preview template={shown} view={view} onView={setView} />
    </div>
  );
}

interface ChoiceProps {
  kinds: readonly MailKind[];
  chosen: MailKind;
  onChoose: (kind: MailKind) => void;
}

const KindSelect = ({ kinds, chosen, onChoose }: ChoiceProps) => (
  <SelectField
    label={text.kinds}
    value={chosen}
    onChange={({ target }) => onChoose(kinds.find((kind) => kind === target.value) ?? chosen)}
  >
    {kinds.map((kind) => (
      <option key={kind} value={kind}>
        {text.kindName(kind)}
      </option>
    ))}
  </SelectField>
);

const KindList = ({ kinds, chosen, onChoose }: ChoiceProps) => (
  <Panel title={text.kinds}>
    <ul className="m-0 list-none p-0">
      {kinds.map((kind) => (
        <li key={kind} className="border-b border-rule-2 last:border-b-0">
          <button
            type="button"
            aria-pressed={kind === chosen}
            className="touch w-full px-3.5 py-[5px] text-left hover:bg-hover aria-pressed:bg-chosen aria-pressed:font-semibold"
            onClick={() => onChoose(kind)}
          >
            {text.kindName(kind)}
          </button>
        </li>
      ))}
    </ul>
  </Panel>
);

interface PreviewProps {
  template: MailTemplateDto;
  view: View;
  onView: (view: View) => void;
}

function Preview({ template, view, onView }: PreviewProps) {
  return (
    <Panel
      look="register"
      title={template.subject}
      action={
        <fieldset className="m-0 flex gap-1.5 border-0 p-0">
          <legend className="sr-only">{text.view}</legend>
          <ViewButton label={text.asHtml} chosen={view === 'html'} onClick={() => onView('html')} />
          <ViewButton label={text.asText} chosen={view === 'text'} onClick={() => onView('text')} />
        </fieldset>
      }
    >
      <p className="m-0 border-b border-rule-2 px-3.5 py-2 text-sm text-ink-2">{whenSent(template)}</p>
      {view === 'html' ? (
        <HtmlPart template={template} />
      ) : (
        <pre className="m-0 overflow-x-auto p-3.5 font-mono text-sm whitespace-pre-wrap">{template.text}</pre>
      )}
    </Panel>
  );
}

function whenSent({ kind, mayWait }: MailTemplateDto): string {
  if (kind === 'digest') return text.atDigestHour;
  return mayWait ? text.mayWait : text.neverWaits;
}

/** The mail's HTML apart from the page, without scripts and without a way out, as high as it is. */
function HtmlPart({ template: { kind, html } }: { template: MailTemplateDto }) {
  const [height, setHeight] = useState(600);
  const fit = ({ currentTarget }: SyntheticEvent<HTMLIFrameElement>) => {
    const body = currentTarget.contentDocument?.body;
    if (body) setHeight(body.getBoundingClientRect().bottom + BELOW_PX);
  };
  return (
    <iframe
      key={kind}
      sandbox="allow-same-origin"
      title={text.preview(text.kindName(kind))}
      srcDoc={html}
      onLoad={fit}
      style={{ height }}
      className="block w-full border-0 bg-white"
    />
  );
}

const ViewButton = ({ label, chosen, onClick }: { label: string; chosen: boolean; onClick: () => void }) => (
  <Button look="quiet" aria-pressed={chosen} className="aria-pressed:bg-chosen" onClick={onClick}>
    {label}
  </Button>
);
