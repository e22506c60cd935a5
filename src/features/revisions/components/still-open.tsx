import { sendingText as text } from '#client/text/revisions.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';

const SHOWN = 6;

/** What the checks found and how many notes are open: to be known before sending, not to forbid it. */
export function StillOpen({ sending }: { sending: SendingDto }) {
  const findings = sending.findings.filter((found) => found.weight !== 'note');
  return (
    <section>
      <h3 className="m-0 text-sm font-semibold">{text.missing}</h3>
      {findings.length === 0 ? <p className="m-0">{text.nothingMissing}</p> : null}
      <ul className="m-0 max-h-[180px] list-disc overflow-y-auto pl-5">
        {findings.slice(0, SHOWN).map((found) => (
          <li key={`${found.code} ${found.entityIds.join(' ')} ${found.text}`}>{found.text}</li>
        ))}
        {findings.length > SHOWN ? <li>{text.more(findings.length - SHOWN)}</li> : null}
      </ul>
      <p className={`m-0 ${sending.openNotes > 0 ? 'text-attention' : ''}`}>
        {text.openNotes(sending.openNotes)}
      </p>
    </section>
  );
}
